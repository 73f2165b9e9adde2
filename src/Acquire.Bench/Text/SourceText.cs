using System.Text;

namespace Acquire.Bench.Text;

/// <summary>The text of a file a user wrote, with the name the user gave it.</summary>
public sealed record SourceText(string File, string Text)
{
    /// <summary>Largest file that is read [bytes].</summary>
    public const int LargestBytes = 1_000_000;

    /// <summary>Reads a file as UTF-8 text; a missing, unreadable, huge or binary one gives a diagnostic.</summary>
    public static Parsed<SourceText> Read(string path)
    {
        try
        {
            var length = new FileInfo(path).Length;
            if (length > LargestBytes)
            {
                return Refused(path, "the file is too large to be one of ours",
                    FormattableString.Invariant($"{length / 1e6:F1} MB"), "at most 1 MB", "name the right file");
            }

            return Decode(path, System.IO.File.ReadAllBytes(path));
        }
        catch (Exception problem) when (problem is FileNotFoundException or DirectoryNotFoundException)
        {
            return Refused(path, "the file does not exist", "", "", $"check the name; the current folder is {Directory.GetCurrentDirectory()}");
        }
        catch (Exception problem) when (problem is IOException or UnauthorizedAccessException)
        {
            return Refused(path, "the file cannot be read", problem.Message, "", "check its permissions");
        }
    }

    /// <summary>Decodes the bytes of a file; anything that is not UTF-8 text gives a diagnostic.</summary>
    public static Parsed<SourceText> Decode(string path, ReadOnlySpan<byte> bytes)
    {
        if (bytes.StartsWith("\uFEFF"u8))
        {
            bytes = bytes[3..];
        }

        try
        {
            var text = new UTF8Encoding(false, throwOnInvalidBytes: true).GetString(bytes);
            var control = text.AsSpan().IndexOfAnyInRange('\0', '\b');
            return control < 0
                ? Parsed.Good(new SourceText(path, text))
                : Refused(path, "the file is not text", FormattableString.Invariant($"a control character U+{(int)text[control]:X4}"), "UTF-8 text", "name the right file");
        }
        catch (DecoderFallbackException)
        {
            return Refused(path, "the file is not text", "bytes that are not UTF-8", "UTF-8 text", "save it as UTF-8, or name the right file");
        }
    }

    private static Parsed<SourceText> Refused(string path, string what, string found, string allowed, string remedy) =>
        Parsed.Bad<SourceText>([new Diagnostic(path, Position.Start, what, found, allowed, remedy)]);
}
