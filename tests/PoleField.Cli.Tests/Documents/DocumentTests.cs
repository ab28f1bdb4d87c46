// Truth: what the documents say can be done, done; the numbers they print, computed.
using System.CommandLine;
using System.Diagnostics;
using System.Globalization;
using System.Text.RegularExpressions;
using PoleField.Cli.Case;
using PoleField.Cli.Commands;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Documents;

public sealed partial class DocumentTests
{
    private const string FromSources = "dotnet run -c Release --project src/PoleField.Cli -- ";

    public static TheoryData<string> Documents =>
        [.. Directory.GetFiles(Repository.File("geometries"), "README.md", SearchOption.AllDirectories)
            .Prepend(Repository.File("DEVELOPERS.md")).Prepend(Repository.File("README.md"))
            .Select(f => Path.GetRelativePath(Repository.Root, f).Replace('\\', '/')).Order(StringComparer.Ordinal)];

    [Theory]
    [MemberData(nameof(Documents))]
    public async Task EveryCommandRuns(string document)
    {
        if (OperatingSystem.IsWindows())
        {
            return; // the commands are written for a POSIX shell
        }

        using var folder = new CaseFolder();
        Copy(Repository.File("geometries"), folder["geometries"]);
        foreach (CodeBlock block in Blocks(document).Where(b => b is { Language: "sh", NotRun: null }))
        {
            Run run = await Shell(folder["."], block.Text.Replace(FromSources, "polefield ", StringComparison.Ordinal));
            Assert.True(run.Status == 0, $"{document}, line {block.Line}, ends with {run.Status}: {run.Error}");
        }
    }

    [Theory]
    [MemberData(nameof(Documents))]
    public void ABlockThatIsNotRunSaysWhy(string document) =>
        Assert.All(Blocks(document).Where(b => b.NotRun is not null), b => Assert.True(b.NotRun!.Length > 20, $"Line {b.Line} gives no reason."));

    [Theory]
    [MemberData(nameof(Documents))]
    public void EveryCommandInASentenceIsOne(string document)
    {
        RootCommand root = CommandLine.Build(new Tool(new Terminal(TextWriter.Null, TextWriter.Null), Pipeline.OfLibrary()));
        foreach (Match match in SpokenCommand().Matches(File.ReadAllText(Repository.File(document))))
        {
            string line = match.Groups[1].Value.Replace("VERB", "solve", StringComparison.Ordinal);
            IEnumerable<string> missing = root.Parse(line).Errors.Select(e => e.Message).Where(m => !m.StartsWith("Required", StringComparison.Ordinal));
            Assert.True(!missing.Any(), $"{document}: polefield {line}: {string.Join(" ", missing)}");
        }
    }

    [Theory]
    [MemberData(nameof(Documents))]
    public void EveryCaseSnippetIsRead(string document)
    {
        foreach (CodeBlock block in Blocks(document).Where(b => b.Language == "toml"))
        {
            bool whole = block.Text.Contains("format = 1", StringComparison.Ordinal);
            var around = new CaseSurroundings("snippet", MaterialShelf.OfLibrary().Names, _ => true);
            CaseReading reading = CaseReader.Read(whole ? block.Text : Cases.Small + block.Text, around);
            Assert.True(reading.Findings.Count == 0, $"{document}, line {block.Line}: {string.Join(" ", reading.Findings.Select(f => f.Text))}");
        }
    }

    [Fact]
    public async Task TheWorkedExampleIsWhatTheToolPrints()
    {
        CodeBlock shown = Blocks("README.md").First(b => b.Text.StartsWith("Alkali deflector", StringComparison.Ordinal));

        Run run = await Run.Of(Pipeline.OfLibrary(), "solve", Repository.File("geometries/alkali-deflector/alkali-deflector.toml"), "-o", Path.Combine(Path.GetTempPath(), Path.GetRandomFileName(), "r.json"));

        // Times, memory and what is nothing but rounding differ from machine to machine; words and the leading numbers do not.
        string[] printed = [.. run.Out.Split('\n').TakeWhile(l => l != "Cautions").Select(l => l.TrimEnd()).Where(l => l.Length > 0)];
        string[] written = [.. shown.Text.Split('\n').Select(l => l.TrimEnd()).Where(l => l.Length > 0)];
        Assert.Equal(written.Select(Words), printed.Select(Words));
        foreach (string line in (string[])["field |B|", "gradient d|B|/dz", "Bz, T", "field, T", "gradient, T/m", "stored energy", "efficiency"])
        {
            Assert.Equal(FirstNumber(written, line), FirstNumber(printed, line), 1e-4 * Math.Abs(FirstNumber(written, line)));
        }
    }

    [Fact]
    public void TheManualPageIsThatOfTheCommandTree()
    {
        using var page = new StringWriter { NewLine = "\n" };
        ManualPage.Write(page, CommandLine.Build(new Tool(new Terminal(TextWriter.Null, TextWriter.Null), Pipeline.OfLibrary())));

        Golden.CheckFile("src/PoleField.Cli/man/polefield.1", page.ToString());
    }

    [Fact]
    public async Task AManualReaderFindsNoFaultInThePage()
    {
        const string reader = "/usr/bin/man";
        if (!File.Exists(reader))
        {
            return;
        }

        Run run = await Shell(Repository.Root, $"LC_ALL=C.UTF-8 MANROFFSEQ= {reader} --warnings -E UTF-8 -l -Tutf8 -Z src/PoleField.Cli/man/polefield.1 > /dev/null");

        Assert.Equal((0, string.Empty), (run.Status, run.Error));
    }

    private static Task<Run> Shell(string folder, string script)
    {
        string text = $"set -euo pipefail\npolefield() {{ dotnet '{typeof(Terminal).Assembly.Location}' \"$@\"; }}\n{script}";
        return ToolProcess.Of(new ProcessStartInfo("bash", ["-c", text]) { WorkingDirectory = folder, RedirectStandardOutput = true, RedirectStandardError = true });
    }

    private static void Copy(string from, string to)
    {
        foreach (string file in Directory.GetFiles(from, "*", SearchOption.AllDirectories))
        {
            string target = Path.Combine(to, Path.GetRelativePath(from, file));
            Directory.CreateDirectory(Path.GetDirectoryName(target)!);
            File.Copy(file, target);
        }
    }

    private static string Words(string line) => Blanks().Replace(Number().Replace(line, "#"), " ").Trim();

    private static double FirstNumber(string[] lines, string start) =>
        double.Parse(Number().Match(lines.First(l => l.Trim().StartsWith(start, StringComparison.Ordinal))[(start.Length + 2)..]).Value, CultureInfo.InvariantCulture);

    private static List<CodeBlock> Blocks(string document)
    {
        var blocks = new List<CodeBlock>();
        string[] lines = File.ReadAllLines(Repository.File(document));
        for (int i = 0; i < lines.Length; i++)
        {
            if (lines[i].StartsWith("```", StringComparison.Ordinal))
            {
                int end = Array.FindIndex(lines, i + 1, l => l.StartsWith("```", StringComparison.Ordinal));
                string? remark = i > 0 && NotRun().Match(lines[i - 1]) is { Success: true } match ? match.Groups[1].Value : null;
                blocks.Add(new CodeBlock(i + 1, lines[i][3..].Trim(), string.Join('\n', lines[(i + 1)..end]), remark));
                i = end;
            }
        }

        return blocks;
    }

    [GeneratedRegex(@"`polefield ([^`]+)`")]
    private static partial Regex SpokenCommand();

    [GeneratedRegex(@"^<!-- not run as a test: (.*) -->$")]
    private static partial Regex NotRun();

    [GeneratedRegex(@"-?\d+(\.\d+)?(e-?\d+)?")]
    private static partial Regex Number();

    [GeneratedRegex(@"\s+")]
    private static partial Regex Blanks();

    /// <param name="Line">Line of the document it starts in.</param>
    /// <param name="Language">After the opening fence.</param>
    /// <param name="Text">What it holds.</param>
    /// <param name="NotRun">Why it is not run.</param>
    private sealed record CodeBlock(int Line, string Language, string Text, string? NotRun);
}
