using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using System.Text.Json.Serialization;
using Acquire.App.Files;

namespace Acquire.App.Processes;

/// <summary>What a serving simulator leaves in the runtime folder, so that a run finds it and knows that it is ours.</summary>
/// <param name="ProcessId">The serving process.</param>
/// <param name="Bench">Full path of the bench file it serves.</param>
/// <param name="Pace">How many times faster than life.</param>
/// <param name="Addresses">Instrument name to the address where it really answers.</param>
internal sealed record SimulatorNote(int ProcessId, string Bench, double Pace, IReadOnlyDictionary<string, string> Addresses)
{
    /// <summary>One line of JSON.</summary>
    public string ToJson() => JsonSerializer.Serialize(this, NoteJson.Default.SimulatorNote);

    /// <summary>Reads a line of JSON; null when it is none of ours.</summary>
    public static SimulatorNote? FromJson(string? line)
    {
        try
        {
            return line is null ? null : JsonSerializer.Deserialize(line, NoteJson.Default.SimulatorNote);
        }
        catch (JsonException)
        {
            return null;
        }
    }

    /// <summary>The simulator that serves exactly these texts now, or null. A dead one's note is ignored: its lock is free.</summary>
    public static SimulatorNote? FindLive(string key)
    {
        if (!File.Exists(PathOf(key, "json")))
        {
            return null;
        }

        using var lockFile = TryLock(key);
        return lockFile is null ? FromJson(File.ReadAllText(PathOf(key, "json"))) : null;
    }

    /// <summary>Writes the note; the caller holds the lock from <see cref="TryLock"/> as long as it serves.</summary>
    public void Save(string key)
    {
        File.WriteAllText(PathOf(key, "json"), ToJson());
        File.WriteAllText(PathOf(key, "pid"), ProcessId.ToString(CultureInfo.InvariantCulture));
    }

    /// <summary>Removes the note when serving ends.</summary>
    public static void Remove(string key)
    {
        File.Delete(PathOf(key, "json"));
        File.Delete(PathOf(key, "pid"));
    }

    /// <summary>Takes the lock that says somebody serves these texts; null when another process holds it.</summary>
    public static FileStream? TryLock(string key)
    {
        try
        {
            return new FileStream(PathOf(key, "lock"), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
        }
        catch (IOException)
        {
            return null;
        }
    }

    /// <summary>Names a simulated bench by the path and texts it is made of, so that an edited file is another bench.</summary>
    public static string KeyOf(string benchPath, params string[] texts)
    {
        var whole = string.Join('\0', texts.Prepend(Path.GetFullPath(benchPath)));
        return Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(whole)))[..16];
    }

    private static string PathOf(string key, string ending)
    {
        var folder = Path.Combine(Folders.Runtime, "simulators");
        Directory.CreateDirectory(folder);
        return Path.Combine(folder, $"{key}.{ending}");
    }
}

/// <summary>JSON of the note, without reflection.</summary>
[JsonSerializable(typeof(SimulatorNote))]
internal sealed partial class NoteJson : JsonSerializerContext;
