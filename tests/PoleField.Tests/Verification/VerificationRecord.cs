using System.Globalization;
using System.Text;
using Xunit;

namespace PoleField.Tests.Verification;

/// <summary>
/// Checks a number against its truth and keeps the comparison. When the environment variable POLEFIELD_VERIFICATION_TABLE
/// names a file, all comparisons of the run are written there as a table.
/// </summary>
public sealed class VerificationRecord : IDisposable
{
    public const string Collection = "verification";

    private readonly List<Row> _rows = [];

    /// <summary>Asserts |obtained − truth| ≤ tolerance·|truth| and records it.</summary>
    public void Relative(string what, double truth, double obtained, double tolerance) =>
        Add(new Row(what, truth, obtained, Math.Abs(obtained - truth) / Math.Abs(truth), tolerance, "relative"));

    /// <summary>Asserts |obtained − truth| ≤ tolerance and records it.</summary>
    public void Absolute(string what, double truth, double obtained, double tolerance) =>
        Add(new Row(what, truth, obtained, Math.Abs(obtained - truth), tolerance, "absolute"));

    public void Dispose()
    {
        if (Environment.GetEnvironmentVariable("POLEFIELD_VERIFICATION_TABLE") is { Length: > 0 } path)
        {
            File.WriteAllText(path, Table());
        }
    }

    private void Add(Row row)
    {
        lock (_rows)
        {
            _rows.Add(row);
        }

        Assert.True(row.Error <= row.Tolerance, string.Create(
            CultureInfo.InvariantCulture,
            $"{row.What}: truth {row.Truth:g9}, obtained {row.Obtained:g9}, {row.Kind} error {row.Error:g3}, allowed {row.Tolerance:g3}"));
    }

    private string Table()
    {
        var text = new StringBuilder();
        text.Append("# Verification\n\nWritten by the tests in this folder (environment variable `POLEFIELD_VERIFICATION_TABLE` names the file). ");
        text.Append("Each test file's first lines name the truth. SI units.\n\n");
        text.Append("| case and quantity | truth | obtained | error | allowed | |\n| --- | --- | --- | --- | --- | --- |\n");
        foreach (Row row in _rows.OrderBy(r => r.What, StringComparer.Ordinal))
        {
            text.Append(
                CultureInfo.InvariantCulture,
                $"| {row.What.Replace("|", "\\|", StringComparison.Ordinal)} | {row.Truth:g8} | {row.Obtained:g8} | {row.Error:0.0e+0} | {row.Tolerance:g2} | {row.Kind} |\n");
        }

        return text.ToString();
    }

    private sealed record Row(string What, double Truth, double Obtained, double Error, double Tolerance, string Kind);
}

[CollectionDefinition(VerificationRecord.Collection)]
public sealed class VerificationGroup : ICollectionFixture<VerificationRecord>;
