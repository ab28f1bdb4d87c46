using System.Globalization;
using System.Reflection;
using System.Text;
using PoleField.Tests.Output;
using Xunit;

namespace PoleField.Tests.Verification;

/// <summary>A subject of the verification table: what is checked, and where its truth comes from.</summary>
public sealed record VerificationCase(string Title, string Source);

/// <summary>How far a number may be from its truth, and why that far.</summary>
/// <param name="Size">Relative to the truth, or absolute in the quantity's unit.</param>
/// <param name="IsRelative">True when <paramref name="Size"/> is relative.</param>
/// <param name="Because">The reason, in a few words.</param>
public sealed record Allowed(double Size, bool IsRelative, string Because)
{
    public static Allowed Relative(double size, string because) => new(size, true, because);

    public static Allowed Absolute(double size, string because) => new(size, false, because);

    /// <summary>The relative accuracy the run was asked for.</summary>
    public static Allowed Accuracy(double asked) => new(asked, true, "accuracy asked");

    /// <summary>The result's own error bar, and what the printed digits of the truth leave open.</summary>
    public static Allowed Bar(double bar, double digits = 0) =>
        new(bar + digits, false, digits > 0 ? "own error bar, published digits" : "own error bar");
}

/// <summary>
/// Holds numbers against their truth and keeps the comparison. When the environment variable POLEFIELD_VERIFICATION_TABLE
/// names a file, all comparisons of the run are written there as a table; otherwise each must already stand in the table
/// beside the tests, and after a whole run the table may hold no other.
/// </summary>
public sealed class VerificationRecord : IDisposable
{
    public const string Collection = "verification";

    private readonly Dictionary<(string Title, string Quantity), Row> _rows = [];
    private readonly string? _newTable = Environment.GetEnvironmentVariable("POLEFIELD_VERIFICATION_TABLE") is { Length: > 0 } path ? path : null;
    private readonly HashSet<(string Title, string Quantity)> _listed = VerificationTable.Rows();
    private bool _failed;

    /// <summary>Asserts that a number is as near to its truth as allowed, and records it.</summary>
    public void Check(VerificationCase subject, string quantity, double truth, double obtained, Allowed allowed)
    {
        var row = new Row(subject, quantity, truth, obtained, allowed);
        lock (_rows)
        {
            Assert.True(_rows.TryAdd((subject.Title, quantity), row), $"{subject.Title}: {quantity} is checked twice.");
            _failed |= !row.Holds;
        }

        Assert.True(row.Holds, string.Create(
            CultureInfo.InvariantCulture,
            $"{subject.Title}: {quantity}: truth {truth:g10}, obtained {obtained:g10}, error {row.Error:g3}, allowed {allowed.Size:g3} ({allowed.Because})"));
        Assert.True(_newTable is not null || _listed.Contains((subject.Title, quantity)), $"{subject.Title}: {quantity} is not in TABLE.md; {VerificationTable.Renew}");
    }

    /// <summary>Asserts that a number is within its own error bar of its truth, and records it.</summary>
    /// <param name="subject">The case.</param>
    /// <param name="quantity">What is compared, with its unit.</param>
    /// <param name="truth">Its true value.</param>
    /// <param name="obtained">The number and its bar.</param>
    /// <param name="digits">Half a unit of the last printed digit of a published truth.</param>
    internal void Check(VerificationCase subject, string quantity, double truth, Estimate obtained, double digits = 0) =>
        Check(subject, quantity, truth, obtained.Value, Allowed.Bar(obtained.Bar, digits));

    public void Dispose()
    {
        if (_newTable is not null)
        {
            File.WriteAllText(_newTable, Table());
        }
        else if (!_failed && VerificationTable.Cases().All(c => _rows.Keys.Any(k => k.Title == c.Title)))
        {
            string[] gone = [.. _listed.Except(_rows.Keys).Select(r => $"{r.Title}: {r.Quantity}")];
            Assert.True(gone.Length == 0, $"TABLE.md lists what no test checks; {VerificationTable.Renew}\n{string.Join("\n", gone)}");
        }
    }

    private string Table()
    {
        var text = new StringBuilder(VerificationTable.Introduction);
        foreach (IGrouping<VerificationCase, Row> rows in _rows.Values.GroupBy(r => r.Subject).OrderBy(g => g.Key.Title, StringComparer.Ordinal))
        {
            text.Append(CultureInfo.InvariantCulture, $"\n## {rows.Key.Title}\n\n{rows.Key.Source}\n\n");
            text.Append("| quantity | truth | obtained | error | allowed | because |\n| --- | --- | --- | --- | --- | --- |\n");
            foreach (Row row in rows.OrderBy(r => r.Quantity, StringComparer.Ordinal))
            {
                string sort = row.Allowed.IsRelative ? " rel." : "";
                text.Append(
                    CultureInfo.InvariantCulture,
                    $"| {VerificationTable.Cell(row.Quantity)} | {row.Truth:g9} | {row.Obtained:g9} | {row.Error:0.0e+0}{sort} | {row.Allowed.Size:0.0e+0}{sort} | {row.Allowed.Because} |\n");
            }
        }

        return text.ToString();
    }

    private sealed record Row(VerificationCase Subject, string Quantity, double Truth, double Obtained, Allowed Allowed)
    {
        public double Error => Math.Abs(Obtained - Truth) / (Allowed.IsRelative ? Math.Abs(Truth) : 1);

        public bool Holds => Error <= Allowed.Size;
    }
}

/// <summary>The table beside the tests, as it stands in the repository.</summary>
internal static class VerificationTable
{
    public const string Renew = "renew it: run the tests of this folder with POLEFIELD_VERIFICATION_TABLE naming the file.";

    public static string Introduction => """
        # Verification

        Written by the tests of this folder (environment variable `POLEFIELD_VERIFICATION_TABLE` names the file); a test fails when a
        case or a quantity is missing here or no longer checked. SI units unless said. "own error bar" is three times the change by
        one Newton step in the next order on the same mesh (for field and gradient at the beam: as reported); places are judged by
        the largest such change over their element.

        """;

    public static IReadOnlyList<VerificationCase> Cases() =>
    [
        .. typeof(VerificationTable).Assembly.GetTypes()
            .SelectMany(t => t.GetFields(BindingFlags.Static | BindingFlags.NonPublic | BindingFlags.Public | BindingFlags.DeclaredOnly))
            .Where(f => f.FieldType == typeof(VerificationCase))
            .Select(f => (VerificationCase)f.GetValue(null)!),
    ];

    public static HashSet<(string Title, string Quantity)> Rows()
    {
        var rows = new HashSet<(string, string)>();
        string title = "";
        foreach (string line in File.ReadLines(Path.Combine(ResultJsonTests.RepositoryRoot(), "tests", "PoleField.Tests", "Verification", "TABLE.md")))
        {
            if (line.StartsWith("## ", StringComparison.Ordinal))
            {
                title = line[3..];
            }
            else if (line.StartsWith("| ", StringComparison.Ordinal) && !line.StartsWith("| quantity", StringComparison.Ordinal) && !line.StartsWith("| ---", StringComparison.Ordinal))
            {
                string quantity = line[2..line.IndexOf(" | ", StringComparison.Ordinal)];
                rows.Add((title, quantity.Replace("\\|", "|", StringComparison.Ordinal)));
            }
        }

        return rows;
    }

    public static string Cell(string text) => text.Replace("|", "\\|", StringComparison.Ordinal);
}

[CollectionDefinition(VerificationRecord.Collection)]
public sealed class VerificationGroup : ICollectionFixture<VerificationRecord>;
