namespace PoleField.Cli.Text;

/// <summary>Colours text for a terminal, or leaves it alone. Colour only repeats what the words say.</summary>
internal sealed record Ink(bool On)
{
    /// <summary>No colour.</summary>
    public static Ink None { get; } = new(false);

    public string Strong(string text) => Wrap(text, "1");

    public string Bad(string text) => Wrap(text, "1;31");

    public string Doubtful(string text) => Wrap(text, "33");

    public string Good(string text) => Wrap(text, "32");

    public string Faint(string text) => Wrap(text, "2");

    private string Wrap(string text, string code) => On ? $"\u001b[{code}m{text}\u001b[0m" : text;
}
