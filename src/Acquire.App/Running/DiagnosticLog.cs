using Acquire.App.Files;
using Serilog;
using Serilog.Extensions.Logging;
using Serilog.Formatting.Compact;

namespace Acquire.App.Running;

/// <summary>Diagnostics as JSON lines in the state folder, one file a day, two weeks kept. Best effort: never in the way of a run.</summary>
internal sealed class DiagnosticLog : IDisposable
{
    private readonly Serilog.Core.Logger _serilog;
    private readonly SerilogLoggerFactory _factory;

    private DiagnosticLog(Serilog.Core.Logger serilog)
    {
        _serilog = serilog;
        _factory = new SerilogLoggerFactory(serilog);
        Logger = _factory.CreateLogger("engine");
    }

    /// <summary>Where the files are.</summary>
    public static string Folder => Path.Combine(Folders.State, "logs");

    /// <summary>The logger that libraries take.</summary>
    public Microsoft.Extensions.Logging.ILogger Logger { get; }

    /// <summary>Opens today's file.</summary>
    public static DiagnosticLog Open() => new(new LoggerConfiguration()
        .WriteTo.File(new CompactJsonFormatter(), Path.Combine(Folder, "acquire-.jsonl"), rollingInterval: RollingInterval.Day, retainedFileCountLimit: 14, shared: true)
        .CreateLogger());

    /// <inheritdoc/>
    public void Dispose()
    {
        _factory.Dispose();
        _serilog.Dispose();
    }
}
