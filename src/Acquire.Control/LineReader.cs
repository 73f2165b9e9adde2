using System.Text;

namespace Acquire.Control;

/// <summary>Reads whole lines, bounded. A read that is cancelled loses nothing: the next one goes on where it stopped.</summary>
internal sealed class LineReader(Stream stream) : IDisposable
{
    /// <summary>Longest line [characters].</summary>
    public const int LongestLine = 64 * 1024;

    private readonly StreamReader _reader = new(stream, new UTF8Encoding(false));
    private readonly StringBuilder _line = new();
    private readonly char[] _one = new char[1];

    /// <summary>
    /// The next line; null at the end of the stream, also when a line was begun there: what was not finished was not said.
    /// <see cref="InvalidDataException"/> when the line is too long.
    /// </summary>
    public async Task<string?> ReadAsync(CancellationToken cancellation)
    {
        while (await _reader.ReadAsync(_one, cancellation).ConfigureAwait(false) == 1)
        {
            if (_one[0] == '\n')
            {
                var line = _line.ToString();
                _line.Clear();
                return line;
            }

            if (_line.Length >= LongestLine)
            {
                throw new InvalidDataException("line too long");
            }

            _line.Append(_one[0]);
        }

        return null;
    }

    /// <inheritdoc/>
    public void Dispose() => _reader.Dispose();
}
