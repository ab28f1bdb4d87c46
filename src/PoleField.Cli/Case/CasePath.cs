using System.Text;
using System.Text.RegularExpressions;

namespace PoleField.Cli.Case;

/// <summary>
/// The way to values of a case: <c>beam.width</c>, <c>parts.COIL LEFT.ampere_turns</c>, <c>beam.centre[1]</c>. A key that holds
/// a point stands in quotes; <c>*</c> stands for any characters of one key, so that one path may lead to several values.
/// </summary>
internal sealed class CasePath
{
    private readonly Regex[] _keys;

    private CasePath(string text, Regex[] keys) => (Text, _keys) = (text, keys);

    /// <summary>As written, less quotes and outer blanks.</summary>
    public string Text { get; }

    /// <summary>Reads a path; null when a key is empty or a quote is left open.</summary>
    public static CasePath? Parse(string text)
    {
        var keys = new List<Regex>();
        var shown = new StringBuilder();
        foreach (Match match in KeyPattern.Matches(text.Trim()))
        {
            bool quoted = match.Groups["quoted"].Success;
            string key = (quoted ? match.Groups["quoted"] : match.Groups["index"].Success ? match.Groups["index"] : match.Groups["bare"]).Value.Trim();
            if (key.Length == 0 || match.Groups["rest"].Success)
            {
                return null;
            }

            string pattern = Regex.Escape(key);
            keys.Add(new Regex($"^{(quoted ? pattern : pattern.Replace(@"\*", ".*", StringComparison.Ordinal))}$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant));
            shown.Append(shown.Length == 0 || key[0] == '[' ? string.Empty : ".").Append(key);
        }

        return keys.Count == 0 ? null : new CasePath(shown.ToString(), [.. keys]);
    }

    public bool Matches(IReadOnlyList<string> keys) =>
        keys.Count == _keys.Length && _keys.Zip(keys).All(k => k.First.IsMatch(k.Second));

    private static Regex KeyPattern { get; } = new(
        """(^|\.)\s*("(?<quoted>[^"]*)"|'(?<quoted>[^']*)'|(?<bare>[^."'\[\]]*))\s*(?=\.|\[|$)|(?<index>\[\d+\])|(?<rest>.)""",
        RegexOptions.CultureInvariant);
}
