using System.Text;

namespace PoleField.Cli.Text;

/// <summary>Breaks text at blanks.</summary>
internal static class Wrapped
{
    /// <summary>Lines of at most <paramref name="width"/> columns; the first starts with <paramref name="first"/>, the rest with blanks as wide.</summary>
    public static IEnumerable<string> Lines(string text, int width, string first = "")
    {
        string indent = new(' ', first.Length);
        var line = new StringBuilder(first);
        bool empty = true;
        foreach (string word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            if (!empty && line.Length + 1 + word.Length > width)
            {
                yield return line.ToString();
                line.Clear().Append(indent);
                empty = true;
            }

            line.Append(empty ? string.Empty : " ").Append(word);
            empty = false;
        }

        if (!empty || first.Trim().Length > 0)
        {
            yield return line.ToString();
        }
    }
}
