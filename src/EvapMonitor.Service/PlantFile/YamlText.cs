using YamlDotNet.Core;
using YamlDotNet.Core.Events;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// Turns YAML text into nodes with line and column. Takes the parser's events rather than its object model, because the limits
/// (depth, aliases, documents, duplicate keys) must bind before anything is built, and each with its place.
/// </summary>
internal static class YamlText
{
    /// <summary>Deepest nesting; the grammar itself needs ten.</summary>
    public const int DeepestNesting = 24;

    /// <summary>The root of the only document; null when the text is not readable, in which case the findings say where.</summary>
    public static PlantNode? Read(string text, Findings findings)
    {
        var parser = new Parser(new StringReader(text));
        try
        {
            Expect<StreamStart>(parser);
            if (!parser.MoveNext() || parser.Current is not DocumentStart)
            {
                findings.At(1, 1, "an empty file", "a plant file, which begins with site: and a name");
                return null;
            }

            parser.MoveNext();
            PlantNode? root = Node(parser, null, "", 0, findings);
            if (root is null) return null;
            Expect<DocumentEnd>(parser);
            parser.MoveNext();
            if (parser.Current is DocumentStart second)
            {
                findings.At(second.Start.Line, second.Start.Column, "a second document", "one document in a plant file");
                return null;
            }

            return root;
        }
        catch (YamlException broken)
        {
            Broken(
                text, broken.Start.Line, broken.Start.Column, broken.End.Line, ": " + Shown.Clean(broken.Message.ReplaceLineEndings(" ")),
                findings);
            return null;
        }
        catch (Exception lost) when (
            lost is InvalidOperationException or ArgumentException or IndexOutOfRangeException or NullReferenceException)
        {
            // The scanner answers some broken texts, such as a list that is never closed, with exceptions that are not its own.
            Mark last = parser.Current?.End ?? Mark.Empty;
            Broken(
                text, last.Line, last.Column, last.Line + 1, " after this place, such as a bracket or quote that is never closed", findings);
            return null;
        }
    }

    private static void Broken(string text, long line, long column, long lastLine, string how, Findings findings)
    {
        const string What = "text that is not YAML";
        string[] lines = text.Split('\n');
        for (long i = Math.Max(1, line); i <= Math.Min(lastLine, lines.Length); i++)
        {
            string row = lines[i - 1];
            int tab = row.IndexOf('\t', StringComparison.Ordinal);
            if (tab < 0 || row[..tab].Trim().Length > 0) continue;
            findings.At(i, tab + 1, What + how, "YAML, indented with spaces, no tabs");
            return;
        }

        bool percent = line >= 1 && line <= lines.Length && lines[line - 1].Contains(": %", StringComparison.Ordinal);
        findings.At(line, column, What + how, percent ? "YAML; a text that starts with % stands in quotes: \"%\"" : "YAML");
    }

    private static PlantNode? Node(Parser parser, PlantNode? parent, string segment, int depth, Findings findings)
    {
        ParsingEvent current = parser.Current!;
        int line = (int)current.Start.Line;
        int column = (int)current.Start.Column;
        if (depth > DeepestNesting)
            return Refuse(findings, current, "nesting deeper than any plant", Invariant($"at most {DeepestNesting} levels"));
        if (current is NodeEvent { Anchor.IsEmpty: false })
            findings.At(line, column, "an anchor", "the value itself, without &name");
        if (current is NodeEvent { Tag.IsEmpty: false } tagged && tagged.Tag.Value != "!")
            findings.At(line, column, "a tag", "the value itself, without a tag");

        switch (current)
        {
            case AnchorAlias:
                parser.MoveNext();
                var alias = new ScalarNode(parent, segment, line, column, "", plain: false);
                findings.Wrong(alias, "an alias", "the value itself, written out");
                return alias;
            case Scalar scalar:
                parser.MoveNext();
                return new ScalarNode(parent, segment, line, column, scalar.Value, scalar.Style == ScalarStyle.Plain);
            case SequenceStart:
                var list = new ListNode(parent, segment, line, column);
                parser.MoveNext();
                while (parser.Current is not SequenceEnd)
                {
                    PlantNode? item = Node(parser, list, Invariant($"[{list.Items.Count}]"), depth + 1, findings);
                    if (item is null) return null;
                    list.Items.Add(item);
                }

                parser.MoveNext();
                return list;
            default:
                return Mapping(parser, new MappingNode(parent, segment, line, column), depth, findings);
        }
    }

    private static MappingNode? Mapping(Parser parser, MappingNode mapping, int depth, Findings findings)
    {
        var keys = new Dictionary<string, ScalarNode>(StringComparer.Ordinal);
        parser.MoveNext();
        while (parser.Current is not MappingEnd)
        {
            if (parser.Current is not Scalar keyEvent)
            {
                Refuse(findings, parser.Current!, "a key that is not a plain text", "a text as key");
                return null;
            }

            if (Node(parser, mapping, keyEvent.Value, depth + 1, findings) is not ScalarNode key) return null;
            PlantNode? value = Node(parser, mapping, key.Text, depth + 1, findings);
            if (value is null) return null;
            if (keys.TryGetValue(key.Text, out ScalarNode? first))
            {
                findings.Wrong(
                    key, $"the key {Shown.Quoted(key.Text)} a second time", Invariant($"each key once (the first is in line {first.Line})"));
                continue;
            }

            keys.Add(key.Text, key);
            mapping.Entries.Add(new(key, value));
        }

        parser.MoveNext();
        return mapping;
    }

    private static PlantNode? Refuse(Findings findings, ParsingEvent at, string found, string allowed)
    {
        findings.At(at.Start.Line, at.Start.Column, found, allowed);
        return null;
    }

    private static void Expect<T>(Parser parser)
        where T : ParsingEvent
    {
        if (parser.Current is null) parser.MoveNext();
        if (parser.Current is not T)
            throw new SyntaxErrorException(parser.Current?.Start ?? Mark.Empty, parser.Current?.End ?? Mark.Empty, "unexpected end");
    }
}
