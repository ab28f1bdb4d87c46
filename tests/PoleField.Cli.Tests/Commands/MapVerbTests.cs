// Truth: the field of two opposite line currents (Biot and Savart), exact outside round conductors; Python's csv and json
// modules, h5py and VTK as foreign readers.
using System.Globalization;
using System.Text.Json;
using PoleField.Cli.Tests.Doubles;
using PoleField.Tests.Common;

namespace PoleField.Cli.Tests.Commands;

public sealed class MapVerbTests
{
    private const double A = 3;          // half spacing, mm
    private const double Field = 0.01;   // at the beam, T
    private const double Beam = 1.2 * A; // mm

    [Fact]
    public async Task EveryRowIsTheTwoWireFieldAndSaysHowItWasObtained()
    {
        using SketchFolder folder = await SketchFolder.Of("round-wires");

        Run run = await Run.Of(Pipeline.OfLibrary(), "map", folder.CasePath, "--accuracy", "1e-3", "-o", folder["out.csv"]);

        Assert.Equal(0, run.Status);
        string[][] rows = [.. (await File.ReadAllLinesAsync(folder["out.csv"])).Skip(1).Select(l => l.Split(','))];
        string[] obtained = Obtained(folder["out.json"]);
        Assert.Equal(rows.Length, obtained.Length);
        Assert.Contains("extraction", obtained);
        Assert.Contains("element", obtained);
        foreach ((string[] row, string how) in rows.Zip(obtained))
        {
            (double y, double z) = (Number(row[0]), Number(row[1]));
            bool inside = Math.Abs(y) <= 1.5 && Math.Abs(z - Beam) <= 0.15 + 1e-9;
            Assert.Equal(inside ? "extraction" : "element", how);
            Assert.Equal(1, Number(row[4]) / Exact(y, z), inside ? 1e-4 : 1e-2);
            Assert.Equal("air", row[7]);
            const double h = 1e-4;
            double slope = (Exact(y, z + h) - Exact(y, z - h)) / (2e-3 * h);
            Assert.Equal(1, Number(row[6]) / slope, inside ? 1e-3 : 0.15); // third-order elements: the second derivative of A is of first order
        }
    }

    [Fact]
    public async Task ListedPlacesAreTakenInTheirOrder()
    {
        using SketchFolder folder = await SketchFolder.Of("round-wires");
        await File.WriteAllTextAsync(folder["probes.csv"], "y_mm,z_mm\n# near the beam\n0.5, 3.6\n\n-6;4\n0\t3.6\n");

        Run run = await Run.Of(Pipeline.OfLibrary(), "map", folder.CasePath, "--accuracy", "1e-3", "--points", folder["probes.csv"], "-o", folder["out.csv"]);

        Assert.Equal(0, run.Status);
        string[][] rows = [.. (await File.ReadAllLinesAsync(folder["out.csv"])).Skip(1).Select(l => l.Split(','))];
        Assert.Equal([(0.5, 3.6), (-6, 4), (0, 3.6)], rows.Select(r => (Number(r[0]), Number(r[1]))));
        Assert.All(rows, r => Assert.Equal(1, Number(r[4]) / Exact(Number(r[0]), Number(r[1])), 1e-2));
        Assert.Equal(["extraction", "element", "extraction"], Obtained(folder["out.json"]));
    }

    [Fact]
    public async Task EveryLineThatIsNoPlaceIsNamedBeforeTheSolve()
    {
        using var folder = new CaseFolder();
        await File.WriteAllTextAsync(folder["probes.csv"], "y,z\n1,2\n1\n1,2,3\n1,x\n");
        Pipeline noSolve = Steps.Sound with { Analyses = Pipeline.OfLibrary().Analyses, Solve = (_, _, _, _, _) => throw new InvalidOperationException("solved") };

        Run run = await Run.Of(noSolve, "map", folder.CasePath, "--points", folder["probes.csv"]);
        await File.WriteAllTextAsync(folder["probes.csv"], "1 2\n");
        Run grid = await Run.Of(noSolve, "map", folder.CasePath, "--points", folder["probes.csv"], "--format", "h5");

        Assert.Equal((2, 2), (run.Status, grid.Status));
        Assert.All([3, 4, 5], line => Assert.Contains(FormattableString.Invariant($"probes.csv:{line}: fault"), run.Error, StringComparison.Ordinal));
        Assert.DoesNotContain("probes.csv:1:", run.Error, StringComparison.Ordinal);
        Assert.Contains("--format csv", grid.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task TheGridOfTheCaseIsKept()
    {
        using SketchFolder folder = await SketchFolder.Of("round-wires");
        await File.AppendAllTextAsync(folder.CasePath, "[map]\nfrom = [\"-2 mm\", \"3.2 mm\"]\nto = [\"2 mm\", \"4 mm\"]\nstep = \"0.4 mm\"\n");

        Run run = await Run.Of(Pipeline.OfLibrary(), "map", folder.CasePath, "--accuracy", "1e-2", "-o", folder["maps"]);

        Assert.Equal(0, run.Status);
        string[] lines = await File.ReadAllLinesAsync(folder[Path.Combine("maps", "round-wires.map.csv")]);
        Assert.Equal(1 + (11 * 3), lines.Length);
        Assert.StartsWith("-2,3.2,", lines[1], StringComparison.Ordinal);
        Assert.StartsWith("2,4,", lines[^1], StringComparison.Ordinal);
    }

    [Fact]
    public async Task AnUnknownFormatIsRefused()
    {
        Run run = await Run.Of(Steps.Sound with { Analyses = Pipeline.OfLibrary().Analyses }, "map", "magnet.toml", "--format", "xls");

        Assert.Equal(2, run.Status);
        Assert.Contains("\"xls\"; it must be one of csv, h5, vtu", run.Error, StringComparison.Ordinal);
    }

    [ForeignReaderFact("csv")]
    public async Task PythonReadsTableAndDescription()
    {
        using SketchFolder folder = await Mapped("csv");

        string[] lines = ForeignReader.Run(
            "csv",
            "import csv, json, sys\nrows = list(csv.DictReader(open(sys.argv[1], newline='')))\nside = json.load(open(sys.argv[2]))\n"
            + "print(len(rows)); print(side['places']['count'][0] * side['places']['count'][1]); print(sum(r['rows'] for r in side['obtained']['runs']))\n"
            + "print(min(rows, key=lambda r: abs(float(r['y_mm'])) + abs(float(r['z_mm']) - 3.6))['B_T'])",
            folder["m.map.csv"],
            folder["m.map.json"]);

        Assert.Equal(lines[0], lines[1]);
        Assert.Equal(lines[0], lines[2]);
        Assert.Equal(1, Number(lines[3]) / Field, 1e-4);
    }

    [ForeignReaderFact("h5py")]
    public async Task H5pyReadsTheMeshRecords()
    {
        using SketchFolder folder = await Mapped("h5");

        string[] lines = ForeignReader.Run(
            "h5py",
            "import h5py, sys\nf = h5py.File(sys.argv[1]); m = f['data/0/meshes']\nb = m['B']; d, o = b.attrs['gridSpacing'], b.attrs['gridGlobalOffset']\n"
            + "i = round((3.6e-3 - o[0]) / d[0]); j = round((0 - o[1]) / d[1])\nprint(b['z'][i, j]); print(m['obtained'].attrs['names'][m['obtained'][i, j]])\n"
            + "print(m['obtained'].attrs['names'][m['obtained'][0, 0]]); print(f.attrs['openPMD'])",
            folder["m.map.h5"]);

        Assert.Equal(1, Math.Abs(Number(lines[0])) / Field, 1e-4);
        Assert.Contains("extraction", lines[1], StringComparison.Ordinal);
        Assert.Contains("element", lines[2], StringComparison.Ordinal);
        Assert.Contains("1.1.0", lines[3], StringComparison.Ordinal);
    }

    [ForeignReaderFact("vtk")]
    public async Task VtkReadsTheMesh()
    {
        using SketchFolder folder = await Mapped("vtu");

        string[] lines = ForeignReader.Run(
            "vtk",
            "import sys, vtk\nr = vtk.vtkXMLUnstructuredGridReader(); r.SetFileName(sys.argv[1]); r.Update(); g = r.GetOutput()\n"
            + "print(g.GetNumberOfCells())\np = vtk.vtkPoints(); p.InsertNextPoint(0, 0, 3.6e-3); s = vtk.vtkPolyData(); s.SetPoints(p)\n"
            + "q = vtk.vtkProbeFilter(); q.SetInputData(s); q.SetSourceData(g); q.Update()\nprint(q.GetOutput().GetPointData().GetArray('|B| [T]').GetValue(0))",
            folder["m.map.vtu"]);

        Assert.True(Number(lines[0]) > 100, lines[0]);
        Assert.Equal(1, Number(lines[1]) / Field, 2e-3); // interpolated between the nodes of quadratic cells
    }

    // |B| of two opposite line currents: proportional to 1 over the product of the distances.
    private static double Exact(double y, double z)
    {
        double product = Math.Sqrt(((y - A) * (y - A)) + (z * z)) * Math.Sqrt(((y + A) * (y + A)) + (z * z));
        return Field * ((Beam * Beam) + (A * A)) / product;
    }

    private static async Task<SketchFolder> Mapped(string format)
    {
        SketchFolder folder = await SketchFolder.Of("round-wires", "--name", "m");
        Run run = await Run.Of(
            Pipeline.OfLibrary(), "map", folder["m.toml"], "--accuracy", "1e-3", "--format", format, "-o", Path.GetDirectoryName(folder.CasePath)!);
        Assert.Equal(0, run.Status);
        return folder;
    }

    private static string[] Obtained(string sidecar) =>
    [
        .. JsonDocument.Parse(File.ReadAllText(sidecar)).RootElement.GetProperty("obtained").GetProperty("runs").EnumerateArray()
            .SelectMany(r => Enumerable.Repeat(r.GetProperty("way").GetString()!, r.GetProperty("rows").GetInt32())),
    ];

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);
}
