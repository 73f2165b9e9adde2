using Acquire.App.CommandLine;

return await AcquireProgram.RunAsync(args, Terminal.OfProcess());
