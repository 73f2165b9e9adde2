using Acquire.Bench.Text;
using Acquire.Drivers.Replies;
using Acquire.Wire;

namespace Acquire.Drivers.Files;

/// <summary>What a driver file says about one kind of instrument: how to talk to it, and how to make it safe.</summary>
public sealed record DriverFile
{
    /// <summary>The name that bench files use.</summary>
    public required string Name { get; init; }

    /// <summary>The language it speaks, for people.</summary>
    public required string Speaks { get; init; }

    /// <summary>The file and its exact text, kept in every run.</summary>
    public required SourceText Source { get; init; }

    /// <summary>How messages are cut out of bytes.</summary>
    public required TextFraming Framing { get; init; }

    /// <summary>Who is there.</summary>
    public required Check Identity { get; init; }

    /// <summary>Sent once, after the identity was found right.</summary>
    public required IReadOnlyList<string> Start { get; init; }

    /// <summary>Asked after every setting; null for instruments without an error queue. Matches when the queue is empty.</summary>
    public Check? Errors { get; init; }

    /// <summary>De-energises the instrument and reads back that it is.</summary>
    public required IReadOnlyList<SafeStep> MakeSafe { get; init; }

    /// <summary>What it can do as a temperature loop; exactly one of the three roles is not null.</summary>
    public LoopCommands? Loop { get; init; }

    /// <summary>What it can do as a source-meter.</summary>
    public MeterCommands? Meter { get; init; }

    /// <summary>What it can do as a lamp.</summary>
    public LampCommands? Lamp { get; init; }

    /// <summary>Reads a driver file.</summary>
    public static Parsed<DriverFile> Read(string path)
    {
        var source = SourceText.Read(path);
        return source.Value is null ? Parsed.Bad<DriverFile>(source.Diagnostics) : Parse(source.Value);
    }

    /// <summary>Parses the text of a driver file.</summary>
    public static Parsed<DriverFile> Parse(SourceText source)
    {
        var document = YamlDocument.Parse(source);
        if (document.Value is null) return Parsed.Bad<DriverFile>(document.Diagnostics);
        var report = new ShapeReport(source.File);
        DriverFileShape.Shape.Check(document.Value, report);
        if (report.Diagnostics.Count > 0) return Parsed.Bad<DriverFile>(report.Diagnostics);
        var driver = new DriverFileReading(source, (YamlMap)document.Value, report).Model();
        return report.Diagnostics.Count > 0 ? Parsed.Bad<DriverFile>(report.Diagnostics) : Parsed.Good(driver);
    }
}

/// <summary>One step of a make-safe: something sent, or something asked that must be answered as expected.</summary>
/// <param name="Send">Sent as it is; null for a question.</param>
/// <param name="ReadBack">Asked; null for a command.</param>
public sealed record SafeStep(string? Send, Check? ReadBack);

/// <summary>A question that is answered by several numbers.</summary>
/// <param name="Ask">The question.</param>
/// <param name="Reply">The form of the answer.</param>
/// <param name="Fields">How each field of the template is read, in the template's order.</param>
public sealed record Poll(string Ask, ReplyTemplate Reply, IReadOnlyList<FieldReader> Fields);

/// <summary>A command with a number in it.</summary>
/// <param name="Send">The message; <c>{value}</c> is where the number goes.</param>
/// <param name="Scale">The instrument's unit.</param>
/// <param name="Decimals">Decimals of a number without exponent; null to send up to 12 significant digits, with an exponent where that is shorter.</param>
public sealed record Setting(string Send, UnitScale Scale, int? Decimals);

/// <summary>A command with two positions.</summary>
/// <param name="Send">The message; <c>{value}</c> is where the position goes.</param>
/// <param name="On">The word for on.</param>
/// <param name="Off">The word for off.</param>
public sealed record Switch(string Send, string On, string Off);

/// <summary>The commands of a temperature loop.</summary>
public sealed record LoopCommands(Poll Poll, Setting SetPoint, Setting Ramp, Switch Heater);

/// <summary>The commands of a source-meter.</summary>
public sealed record MeterCommands
{
    /// <summary>One reading with the fields current, voltage and, when there are status bits, status.</summary>
    public required Poll Read { get; init; }

    /// <summary>The bit of the status field that says the source was limiting; null when there is none.</summary>
    public int? ComplianceBit { get; init; }

    /// <summary>The bit of the status field that says the range was exceeded; null when there is none.</summary>
    public int? OverloadBit { get; init; }

    public required Setting CurrentLimit { get; init; }

    public required Setting Integration { get; init; }

    /// <summary>Sent to keep the range where it is put.</summary>
    public required string AutorangeOff { get; init; }

    public required Setting Range { get; init; }

    public required Setting Bias { get; init; }

    public required Switch Output { get; init; }

    /// <summary>Full scales [A], ascending.</summary>
    public required IReadOnlyList<double> RangesA { get; init; }
}

/// <summary>The commands of a lamp.</summary>
public sealed record LampCommands(Poll Poll, Setting Drive, Switch Output);
