using System.CommandLine;
using System.CommandLine.Parsing;
using PoleField.Cli.Case;

namespace PoleField.Cli.Commands;

/// <summary>Options and arguments that several verbs share, made anew for each verb.</summary>
internal static class CommonOptions
{
    public static Argument<string> CaseFile() => new("CASE.toml") { Description = "Case file." };

    public static Option<string?> Out(string what) => new("--out", "-o") { Description = what, HelpName = "FILE|DIR" };

    public static Option<bool> Json() => new("--json") { Description = "The result as JSON on standard output, and nothing else there." };

    public static Option<bool> Force() => new("--force") { Description = "Replace files that exist." };

    public static Option<string?> Figures() => new("--figures")
    {
        Description = "Also write each picture as SVG and PNG into this folder.",
        HelpName = "DIR",
    };

    public static Option<int> Threads() => new("--threads")
    {
        Description = "Processor threads; the result does not depend on it. Default: all.",
        HelpName = "N",
        CustomParser = ParseThreads,
        DefaultValueFactory = _ => Environment.ProcessorCount,
    };

    public static Option<double?> Accuracy() => new("--accuracy")
    {
        Description = "Relative accuracy of field and gradient over the aperture, 1e-7 to 1e-2. Default: the case's, or 1e-4.",
        HelpName = "RATIO",
        CustomParser = ParseAccuracy,
    };

    // Ranges are checked here and not in a validator: a validator that asks for the value of an option whose parser
    // failed throws out of the whole parse.
    private static int ParseThreads(ArgumentResult result)
    {
        const int most = 1024;
        string text = result.Tokens.Count > 0 ? result.Tokens[0].Value : string.Empty;
        if (int.TryParse(text, System.Globalization.NumberStyles.None, System.Globalization.CultureInfo.InvariantCulture, out int threads)
            && threads is >= 1 and <= most)
        {
            return threads;
        }

        result.AddError($"--threads is \"{text}\"; it must be a whole number from 1 to {most}.");
        return 1;
    }

    private static double? ParseAccuracy(ArgumentResult result)
    {
        string text = result.Tokens.Count > 0 ? result.Tokens[0].Value : string.Empty;
        Mistake? mistake = Quantity.Read(text, Dimension.Ratio, out double value);
        if (mistake is not null)
        {
            result.AddError($"--accuracy: {mistake.Text} Write it like 1e-4 or \"0.01 %\".");
        }
        else if (!CaseReader.AccuracyRange.Contains(value))
        {
            result.AddError($"--accuracy is {text}; it must be from 1e-7 to 1e-2.");
        }

        return value;
    }
}
