using System.Globalization;
using System.Text.Json;
using Acquire.Benchmarks;

// dotnet run -c Release --project tests/Acquire.Benchmarks [-- --json] [--with-main]
// Ratios are measured side by side in one run; the exit code is 1 when a limit is missed.
var figures = new List<Figure> { ReadingCost.Measure(), CommitAge.Measure() };
figures.AddRange(WholeProgram.Rehearsal());
if (args.Contains("--with-main"))
{
    figures.Add(WholeProgram.MainJob());
}

if (args.Contains("--json"))
{
    Console.WriteLine(JsonSerializer.Serialize(figures, new JsonSerializerOptions { WriteIndented = true, NumberHandling = System.Text.Json.Serialization.JsonNumberHandling.AllowNamedFloatingPointLiterals }));
}
else
{
    foreach (var figure in figures)
    {
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture,
            $"{figure.Name,-58} {figure.Value,8:G4} {figure.Unit,-3} limit {figure.Limit:G4}, goal {figure.Goal:G4}   {figure.Detail}"));
    }
}

return figures.Exists(figure => figure.Value > figure.Limit) ? 1 : 0;
