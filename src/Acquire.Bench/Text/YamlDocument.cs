using YamlDotNet.Core;
using YamlDotNet.Core.Events;

namespace Acquire.Bench.Text;

/// <summary>Strict YAML 1.2: one document, unique text keys, no anchors, aliases or tags, bounded depth and size.</summary>
/// <remarks>Any bytes give a node or a diagnostic, never an exception.</remarks>
public sealed class YamlDocument
{
    private const int DeepestLevel = 32;
    private const int MostNodes = 100_000;
    private readonly SourceText _source;
    private readonly List<Diagnostic> _problems = [];
    private readonly Parser _parser;
    private int _nodes;

    private YamlDocument(SourceText source)
    {
        _source = source;
        _parser = new Parser(new Scanner(new StringReader(source.Text), skipComments: true));
    }

    /// <summary>Parses a text.</summary>
    public static Parsed<YamlNode> Parse(SourceText source)
    {
        var document = new YamlDocument(source);
        YamlNode? root = null;
        try
        {
            root = document.ReadRoot();
        }
        catch (YamlException problem)
        {
            var start = new Position((int)Math.Max(1, problem.Start.Line), (int)Math.Max(1, problem.Start.Column));
            document.Report(start, "this is not YAML", "", "", Sentence(problem));
        }
        catch (DocumentTooDeepException)
        {
            // Reported where it was seen.
        }
        catch (Exception problem) when (problem is InvalidOperationException or ArgumentException or IndexOutOfRangeException or FormatException or OverflowException)
        {
            // The scanner's own slips on texts that are not YAML at all.
            document.Report(Position.Start, "this is not YAML", "", "", "check the file, or name the right one");
        }

        return document._problems.Count == 0 && root is not null ? Parsed.Good(root) : Parsed.Bad<YamlNode>(document._problems);
    }

    private static string Sentence(YamlException problem) =>
        (problem.InnerException?.Message ?? problem.Message).TrimEnd('.') + "; look at indentation, quotes and brackets there";

    private YamlNode? ReadRoot()
    {
        _parser.Consume<StreamStart>();
        if (_parser.Accept<StreamEnd>(out _))
        {
            Report(Position.Start, "the file is empty", "", "one YAML map", "copy a shipped example and adapt it");
            return null;
        }

        _parser.Consume<DocumentStart>();
        var root = ReadNode(0);
        _parser.Consume<DocumentEnd>();
        if (!_parser.Accept<StreamEnd>(out _))
        {
            Report(At(_parser.Current), "there is a second document in the file", "'---'", "one document", "move it into a file of its own");
        }

        return root;
    }

    private YamlNode ReadNode(int depth)
    {
        var current = _parser.Current;
        if (depth > DeepestLevel || ++_nodes > MostNodes)
        {
            Report(At(current), "the file is nested too deeply or too long", "", $"{DeepestLevel} levels, {MostNodes} nodes", "write it flatter");
            throw new DocumentTooDeepException();
        }

        if (current is AnchorAlias alias)
        {
            Report(At(alias), "aliases are not allowed", $"'*{alias.Value}'", "values written out", "copy the value here");
            _parser.MoveNext();
            return new YamlText(At(alias), "", true);
        }

        if (current is NodeEvent node && (!node.Anchor.IsEmpty || !node.Tag.IsEmpty))
        {
            Report(At(node), "anchors and tags are not allowed", node.Anchor.IsEmpty ? $"'{node.Tag}'" : $"'&{node.Anchor}'", "plain values", "remove it");
        }

        return current switch
        {
            Scalar => ReadText(),
            SequenceStart => ReadList(depth),
            MappingStart => ReadMap(depth),
            _ => throw new SyntaxErrorException(current?.Start ?? Mark.Empty, current?.End ?? Mark.Empty, "a value is missing"),
        };
    }

    private YamlText ReadText()
    {
        var scalar = _parser.Consume<Scalar>();
        return new YamlText(At(scalar), scalar.Value, scalar.Style is not ScalarStyle.Plain);
    }

    private YamlList ReadList(int depth)
    {
        var start = _parser.Consume<SequenceStart>();
        var items = new List<YamlNode>();
        while (!_parser.TryConsume<SequenceEnd>(out _))
        {
            items.Add(ReadNode(depth + 1));
        }

        return new YamlList(At(start), items);
    }

    private YamlMap ReadMap(int depth)
    {
        var start = _parser.Consume<MappingStart>();
        var entries = new List<YamlEntry>();
        var seen = new HashSet<string>(StringComparer.Ordinal);
        while (!_parser.TryConsume<MappingEnd>(out _))
        {
            var key = ReadNode(depth + 1);
            if (key is not YamlText text)
            {
                Report(key.At, "a key must be a word", key.Kind, "plain words", "write the key as text");
                text = new YamlText(key.At, "", true);
            }
            else if (!seen.Add(text.Value))
            {
                Report(key.At, $"the key '{text.Value}' stands twice in this map", "", "each key once", "remove one of them");
            }

            entries.Add(new YamlEntry(key.At, text.Value, ReadNode(depth + 1)));
        }

        return new YamlMap(At(start), entries);
    }

    private void Report(Position at, string what, string found, string allowed, string remedy) =>
        _problems.Add(new Diagnostic(_source.File, at, what, found, allowed, remedy));

    private static Position At(ParsingEvent? at) =>
        at is null ? Position.Start : new((int)Math.Max(1, at.Start.Line), (int)Math.Max(1, at.Start.Column));

    private sealed class DocumentTooDeepException : Exception;
}
