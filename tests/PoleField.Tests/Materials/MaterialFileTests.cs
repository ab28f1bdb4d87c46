// Truth: the same table written in other units, separators and columns must give the same curve; spoilt text must be refused at
// its line and column. 1 Oe = 1000/(4π) A/m, 1 G = 1e-4 T (definitions of the CGS units).
using System.Globalization;
using System.Text;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Materials;

public sealed class MaterialFileTests
{
    private static readonly (double H, double B)[] Table = [(0, 0), (100, 0.4), (300, 1.1), (1000, 1.45), (5000, 1.7), (20000, 1.9)];

    [Theory]
    [InlineData("H_A_per_m,B_T", ',', 1, 1)]
    [InlineData("H (kA/m);B (mT)", ';', 1e3, 1e-3)]
    [InlineData("H_Oe\tB_kG", '\t', 79.577471545947667, 0.1)]
    [InlineData("H [Oe],B [G]", ',', 79.577471545947667, 1e-4)]
    [InlineData("H_A_per_cm;B_T", ';', 100, 1)]
    public void UnitsAndSeparatorsGiveTheSameCurve(string header, char separator, double hUnit, double bUnit)
    {
        StringBuilder text = new("# material: Own steel\n# Js_T: 2.15 (textbook)\n\n" + header + "\r\n");
        foreach ((double h, double b) in Table)
        {
            text.Append(CultureInfo.InvariantCulture, $"{h / hUnit:r}{separator} {b / bUnit:r}\r\n");
        }

        Material material = Read(text.ToString());

        Assert.Equal("own", material.Name);
        Assert.Equal("Own steel", material.Description);
        Assert.Equal("user's table", material.State);
        Assert.Equal(2.15, material.Law.SaturationPolarisation, 1e-12);
        AssertTable((BhCurve)material.Law);
    }

    [Fact]
    public void PolarisationAndExtraColumnsAreUnderstood()
    {
        StringBuilder text = new("# Js_T: 2.15\nmu_r,H_A_per_m,J_T\n");
        foreach ((double h, double b) in Table)
        {
            text.Append(CultureInfo.InvariantCulture, $"n/a,{h:r},{b - (PhysicalConstants.Mu0 * h):r}\n");
        }

        AssertTable((BhCurve)Read(text.ToString()).Law);
    }

    [Fact]
    public void EveryBadFieldIsNamedWithLineAndColumn()
    {
        IReadOnlyList<Finding> faults = Faults("H_A_per_m;B_T\n0;0\n100; 0,4\nx;1.1\n1000;1.45;7\n5000;1.7\n");

        Assert.Equal(
            [("bh-decimal-comma", 3, 6), ("bh-not-a-number", 4, 1), ("bh-columns", 5, 1)],
            faults.Select(f => (f.What, f.Line!.Value, f.Column!.Value)));
        Assert.All(faults, f => Assert.Equal("own.csv", f.File));
    }

    [Fact]
    public void DecimalCommasBetweenCommasAreRecognised() =>
        Assert.Equal("bh-decimal-comma", Assert.Single(Faults("H_A_per_m,B_T\n0,5,0,1\n")).What);

    [Theory]
    [InlineData("H,B\n0,0\n", "bh-unit", 2)]                 // both columns without a unit
    [InlineData("H_A_per_m,B_tesla\n0,0\n", "bh-unit", 1)]
    [InlineData("0,0\n100,0.4\n", "bh-columns", 1)]          // no header
    [InlineData("H_A_per_m,mu_r\n0,0\n", "bh-columns", 1)]
    [InlineData("H_A_per_m,B_T,J_T\n0,0,0\n", "bh-columns", 1)]
    [InlineData("", "bh-columns", 1)]
    [InlineData("# Js_T: 2,15\nH_A_per_m,B_T\n0,0\n1,1\n2,2\n", "bh-saturation", 1)]
    public void BadHeadsAreRefused(string text, string what, int count)
    {
        IReadOnlyList<Finding> faults = Faults(text);

        Assert.Equal(count, faults.Count);
        Assert.All(faults, f => Assert.Equal(what, f.What));
    }

    [Fact]
    public void FaultsOfTheTableCarryTheLineOfTheFile()
    {
        Finding fault = Assert.Single(Faults("# a comment\nH_A_per_m,B_T\n0,0\n100,0.4\n\n90,0.6\n5000,1.7\n"));

        Assert.Equal("bh-not-rising", fault.What);
        Assert.Equal(6, fault.Line);
        Assert.StartsWith("Row 3 ", fault.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void EndlessFileIsRefused()
    {
        StringBuilder text = new("H_A_per_m,B_T\n");
        for (int i = 0; i < 30_000; i++)
        {
            text.Append("1,1\n");
        }

        Assert.Contains(Faults(text.ToString()), f => f.What == "bh-too-long");
    }

    [Fact]
    public void StreamStaysOpenForItsOwner()
    {
        using MemoryStream stream = new(Encoding.UTF8.GetBytes("H_A_per_m,B_T\n0,0\n100,0.4\n300,1.1\n6000,1.6\n"));

        MaterialFile.Read(stream, "own.csv");

        Assert.True(stream.CanRead);
    }

    private static void AssertTable(BhCurve curve)
    {
        Assert.Equal(Table.Length, curve.Nodes.Count);
        for (int i = 0; i < Table.Length; i++)
        {
            Assert.Equal(Table[i].H, curve.Nodes[i].FieldStrength, 1e-9);
            Assert.Equal(Table[i].B, curve.Nodes[i].FluxDensity, 1e-12);
        }
    }

    private static Material Read(string text)
    {
        using MemoryStream stream = new(Encoding.UTF8.GetBytes(text));
        return MaterialFile.Read(stream, "own.csv");
    }

    private static IReadOnlyList<Finding> Faults(string text) => Assert.Throws<InputException>(() => Read(text)).Findings;
}
