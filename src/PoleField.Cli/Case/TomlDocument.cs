using Tomlyn.Parsing;
using Tomlyn.Syntax;

namespace PoleField.Cli.Case;

/// <summary>Turns TOML text into nodes that know where they stand; tells one syntax fault for every broken line.</summary>
internal static class TomlDocument
{
    // A file with more broken lines than this is not a case file; the first ones say enough.
    private const int MostBrokenLines = 50;

    public static TomlTable Parse(string text, string file, Faults faults)
    {
        string[] lines = text.ReplaceLineEndings("\n").Split('\n');
        DocumentSyntax document = SyntaxParser.Parse(string.Join('\n', lines), file, validate: true);
        for (int i = 0; i < MostBrokenLines && FirstError(document) is { } error; i++)
        {
            Spot at = SpotOf(error.Span);
            faults.Add(at, SyntaxMistake.From(error.Message));
            if (!Blank(lines, at.Line - 1))
            {
                break;
            }

            document = SyntaxParser.Parse(string.Join('\n', lines), file, validate: true);
        }

        return RootOf(document);
    }

    private static DiagnosticMessage? FirstError(DocumentSyntax document) => document.Diagnostics
        .Where(d => d.Kind == DiagnosticMessageKind.Error)
        .OrderBy(d => d.Span.Start.Line).ThenBy(d => d.Span.Start.Column)
        .FirstOrDefault();

    // Empties a broken line so that the next parse sees only what else is wrong; below a broken header also the keys that
    // would otherwise fall to the table before. False when there is nothing left to empty.
    private static bool Blank(string[] lines, int line)
    {
        if (line < 0 || line >= lines.Length || lines[line].Length == 0)
        {
            return false;
        }

        bool header = lines[line].TrimStart().StartsWith('[');
        do
        {
            lines[line] = string.Empty;
            line++;
        }
        while (header && line < lines.Length && !lines[line].TrimStart().StartsWith('['));

        return true;
    }

    private static TomlTable RootOf(DocumentSyntax document)
    {
        var root = new TomlTable(new Spot(1, 1));
        AddAll(root, document.KeyValues);
        foreach (TableSyntaxBase header in document.Tables)
        {
            if (header.Name is not null && OpenTable(root, header) is { } table)
            {
                AddAll(table, header.Items);
            }
        }

        return root;
    }

    private static TomlTable? OpenTable(TomlTable root, TableSyntaxBase header)
    {
        List<(string Key, Spot At)> path = PathOf(header.Name!);
        Spot at = SpotOf(header.Span);
        if (path.Count == 0)
        {
            return null;
        }

        TomlTable? parent = Descend(root, path[..^1]);
        if (parent is null || header is not TableArraySyntax)
        {
            return parent is null ? null : Child(parent, path[^1].Key, at);
        }

        var element = new TomlTable(at);
        if (parent.Find(path[^1].Key)?.Value is TomlList { Items: List<TomlNode> items })
        {
            items.Add(element);
        }
        else
        {
            parent.Add(new TomlEntry(path[^1].Key, at, new TomlList(at, new List<TomlNode> { element })));
        }

        return element;
    }

    private static void AddAll(TomlTable table, SyntaxList<KeyValueSyntax> items)
    {
        foreach (KeyValueSyntax item in items)
        {
            Add(table, item);
        }
    }

    private static void Add(TomlTable table, KeyValueSyntax item)
    {
        if (item.Key is null || item.Value is null || NodeOf(item.Value) is not { } value)
        {
            return;
        }

        List<(string Key, Spot At)> path = PathOf(item.Key);
        if (path.Count > 0 && Descend(table, path[..^1]) is { } parent && parent.Find(path[^1].Key) is null)
        {
            parent.Add(new TomlEntry(path[^1].Key, path[^1].At, value));
        }
    }

    private static TomlTable? Descend(TomlTable table, List<(string Key, Spot At)> path)
    {
        TomlTable? current = table;
        foreach ((string key, Spot at) in path)
        {
            current = current is null ? null : Child(current, key, at);
        }

        return current;
    }

    // Null when the key is taken by something that is not a table; the parser has reported that already.
    private static TomlTable? Child(TomlTable table, string key, Spot at)
    {
        switch (table.Find(key)?.Value)
        {
            case TomlTable existing:
                return existing;
            case TomlList { Items: [.., TomlTable last] }:
                return last;
            case null:
                var made = new TomlTable(at);
                table.Add(new TomlEntry(key, at, made));
                return made;
            default:
                return null;
        }
    }

    private static List<(string Key, Spot At)> PathOf(KeySyntax key)
    {
        var path = new List<(string, Spot)>();
        foreach (BareKeyOrStringValueSyntax? part in key.DotKeys.Select(d => d.Key).Prepend(key.Key))
        {
            string? name = part switch
            {
                BareKeySyntax bare => bare.Key?.Text,
                StringValueSyntax quoted => quoted.Value,
                _ => null,
            };
            if (name is not null)
            {
                path.Add((name, SpotOf(part!.Span)));
            }
        }

        return path;
    }

    private static TomlNode? NodeOf(ValueSyntax value)
    {
        Spot at = SpotOf(value.Span);
        switch (value)
        {
            case StringValueSyntax text:
                return new TomlText(at, text.Value ?? string.Empty);
            case IntegerValueSyntax integer:
                return new TomlNumber(at, integer.Value, IsInteger: true);
            case FloatValueSyntax number:
                return new TomlNumber(at, number.Value, IsInteger: false);
            case BooleanValueSyntax flag:
                return new TomlFlag(at, flag.Value);
            case ArraySyntax list:
                return new TomlList(at, [.. list.Items.Select(i => i.Value is null ? null : NodeOf(i.Value)).OfType<TomlNode>()]);
            case InlineTableSyntax inline:
                var table = new TomlTable(at);
                foreach (InlineTableItemSyntax item in inline.Items.Where(i => i.KeyValue is not null))
                {
                    Add(table, item.KeyValue!);
                }

                return table;
            case DateTimeValueSyntax:
                return new TomlDate(at);
            default:
                return null;
        }
    }

    private static Spot SpotOf(SourceSpan span) => new(span.Start.Line + 1, span.Start.Column + 1);
}
