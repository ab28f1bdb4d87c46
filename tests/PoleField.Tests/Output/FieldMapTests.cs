// Truth: RFC 4180, the VTK XML and openPMD 1.1.0 rules as other libraries read them (h5py, meshio, VTK), and closed forms.
using System.Globalization;
using System.Text;
using System.Text.Json;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Output.Maps;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class FieldMapTests : IDisposable
{
    private static readonly MapProvenance Origin = new("Map of two conductors, µ-metal", new string('c', 64), new string('5', 64), "0.1.0", 1e-4);

    private readonly string _folder = Directory.CreateTempSubdirectory("polefield-map").FullName;

    [Fact]
    public void AGridIncludesItsLastPlaceAndRunsAlongYFirst()
    {
        MapGrid grid = MapGrid.Rectangle(new Point(-1e-3, 3e-3), new Point(1e-3, 3.6e-3), 0.1e-3);

        Assert.Equal((21, 7), (grid.CountY, grid.CountZ));
        Assert.Equal(new Point(-0.9e-3, 3e-3), grid[1]);
        Assert.Equal(new Point(1e-3, 3.6e-3), grid[grid.Count - 1]);
    }

    [Theory]
    [InlineData(1e-3, 0.0, 1e-4)] // to left of from
    [InlineData(0.0, 1e-3, 0.0)] // no step
    [InlineData(0.0, 1e-3, double.NaN)]
    [InlineData(0.0, 1.0, 1e-8)] // too many
    public void AnImpossibleGridIsAFaultOfTheInput(double from, double to, double step) =>
        Assert.Throws<InputException>(() => MapGrid.Rectangle(new Point(from, 0), new Point(to, 1e-3), step));

    [Fact]
    public void TheCsvIsRfc4180WithTheColumnsOfTheFormat()
    {
        string text = Csv(SmallMap());
        string[] lines = text.Split("\r\n");

        Assert.Equal("y_mm,z_mm,By_T,Bz_T,B_T,dB_dy_T_per_m,dB_dz_T_per_m,medium", lines[0]);
        Assert.Equal("", lines[^1]);
        Assert.DoesNotContain('\n', text.Replace("\r\n", "", StringComparison.Ordinal));
        Assert.StartsWith("-0.2,3.5,", lines[1], StringComparison.Ordinal);
        Assert.StartsWith("-0.1,3.5,", lines[2], StringComparison.Ordinal);
        Assert.All(lines[1..^1], line => Assert.Equal(8, Cells(line).Length));
    }

    [Fact]
    public void TheCsvHoldsTheClosedFormToTheLastBit()
    {
        FieldMap map = SmallMap();
        string[] rows = Csv(map).Split("\r\n")[1..^1];

        for (int i = 0; i < rows.Length; i++)
        {
            MapSample exact = map.Samples[i];
            string[] cells = Cells(rows[i]);
            if (exact.Source == MapSource.Extraction)
            {
                double[] read = [.. cells[2..7].Select(c => double.Parse(c, CultureInfo.InvariantCulture))];
                Assert.Equal([exact.By, exact.Bz, exact.Field, exact.DFieldDy, exact.DFieldDz], read);
            }
        }
    }

    [Fact]
    public void WhereThereIsNoValueTheCellIsEmptyAndOddLayerNamesAreQuoted()
    {
        string[] rows = Csv(SmallMap()).Split("\r\n");

        Assert.Contains(rows, r => r.EndsWith(",,,,,,", StringComparison.Ordinal)); // outside the model
        Assert.Contains(rows, r => r.EndsWith(",,,\"POLE, \"\"A\"\"\"", StringComparison.Ordinal)); // field without gradient in a part
    }

    [Fact]
    public void TheSidecarNamesUnitsGridAndOrigin()
    {
        using MemoryStream stream = new();
        CsvMap.WriteSidecar(SmallMap(), stream);
        using JsonDocument document = JsonDocument.Parse(stream.ToArray());
        JsonElement root = document.RootElement;

        Assert.Equal(new string('5', 64), root.GetProperty("sketch_sha256").GetString());
        Assert.Equal(8, root.GetProperty("columns").GetArrayLength());
        Assert.Equal("T/m", root.GetProperty("columns")[6].GetProperty("unit").GetString());
        Assert.Equal(0.1, root.GetProperty("places").GetProperty("step_mm")[0].GetDouble());
        Assert.Equal(5, root.GetProperty("places").GetProperty("count")[0].GetInt32());
        Assert.Equal(1e-4, root.GetProperty("accuracy_reached").GetDouble());
        Assert.Equal(1, root.GetProperty("values").GetProperty("none").GetInt32());
    }

    [Fact]
    public void TheGradientOfTheMagnitudeFollowsFromTheTensor()
    {
        Point p = new(0.7e-3, 4.4e-3);
        const double step = 1e-7;

        MapSample sample = MapSample.From(TwoConductorScene.At(p));
        double quotient = (TwoConductorScene.At(p + new Point(step, 0)).Field - TwoConductorScene.At(p - new Point(step, 0)).Field) / (2 * step);

        Assert.Equal(quotient, sample.DFieldDy, 1e-5 * Math.Abs(quotient)); // central difference, h² of the third derivative
        Assert.Equal(TwoConductorScene.At(p).Gradient, sample.DFieldDz, 1e-12);
    }

    [Fact]
    public void MapsAreTheSameBytesEveryTime()
    {
        Assert.Equal(Bytes(s => OpenPmdMap.Write(SmallMap(), s)), Bytes(s => OpenPmdMap.Write(SmallMap(), s)));
        Assert.Equal(Bytes(s => CsvMap.Write(SmallMap(), s)), Bytes(s => CsvMap.Write(SmallMap(), s)));
    }

    [Fact]
    public void AListOfPlacesHasNoOpenPmdForm()
    {
        FieldMap list = FieldMap.Sample(MapGrid.Places([new Point(0, 5e-3)]), p => MapSample.From(TwoConductorScene.At(p)), Origin);

        Assert.Throws<InputException>(() => OpenPmdMap.Write(list, Stream.Null));
    }

    [ForeignReaderFact("h5py")]
    public void H5pyReadsTheOpenPmdMap()
    {
        FieldMap map = SmallMap();
        string file = Save("map.h5", s => OpenPmdMap.Write(map, s));
        const string script = """
            import sys, h5py, numpy as np
            f = h5py.File(sys.argv[1], "r")
            def text(v): return v.decode() if isinstance(v, bytes) else str(v)
            for k in ("openPMD", "basePath", "meshesPath", "iterationEncoding", "comment", "caseSha256"):
                a = f.attrs.get_id(k); assert not a.get_type().is_variable_str(), k
                print(k + "=" + text(f.attrs[k]))
            assert f.attrs["openPMDextension"].dtype == np.uint32
            m = f["/data/0/meshes"]
            print("records=" + " ".join(sorted(m)))
            for r in m.values():
                for k in ("geometry", "dataOrder", "axisLabels", "gridSpacing", "gridGlobalOffset", "gridUnitSI", "unitDimension", "timeOffset"):
                    assert k in r.attrs, (r.name, k)
                assert r.attrs["unitDimension"].shape == (7,) and r.attrs["unitDimension"].dtype == np.float64
                for c in ([r] if isinstance(r, h5py.Dataset) else list(r.values())):
                    assert "unitSI" in c.attrs and len(c.attrs["position"]) == 2, c.name
            b = m["B"]
            print("axes=" + " ".join(text(a) for a in b.attrs["axisLabels"]))
            print("shape=" + " ".join(map(str, b["y"].shape)) + " " + " ".join(map(str, b["x"].attrs["shape"])))
            print("at=%.17g %.17g" % (b.attrs["gridGlobalOffset"][0] + 2 * b.attrs["gridSpacing"][0], b.attrs["gridGlobalOffset"][1] + 3 * b.attrs["gridSpacing"][1]))
            print("value=%.17g %.17g %.17g %.17g" % (b["y"][2, 3], b["z"][2, 3], m["grad_absB"]["z"][2, 3], m["dBy_dz"][2, 3]))
            print("names=" + "|".join(text(n) for n in m["medium"].attrs["names"]))
            print("medium=" + " ".join(str(v) for v in m["medium"][0, :]))
            """;

        Dictionary<string, string> read = ForeignReader.Run("h5py", script, file)
            .Select(l => l.Split('=', 2)).ToDictionary(p => p[0], p => p[1]);

        MapSample expected = map.Samples[(2 * map.Grid.CountY) + 3];
        Assert.Equal("1.1.0", read["openPMD"]);
        Assert.Equal("/data/%T/", read["basePath"]);
        Assert.Equal(Origin.Title, read["comment"]);
        Assert.Equal(Origin.CaseSha256, read["caseSha256"]);
        Assert.Equal("B dBy_dy dBy_dz dBz_dy dBz_dz grad_absB medium obtained", read["records"]);
        Assert.Equal("z y", read["axes"]);
        Assert.Equal("4 5 4 5", read["shape"]);
        Assert.Equal(3.7e-3, Numbers(read["at"])[0], 1e-15);
        Assert.Equal(0.1e-3, Numbers(read["at"])[1], 1e-15);
        Assert.Equal([expected.By, expected.Bz, expected.DFieldDz, expected.DByDz], Numbers(read["value"]));
        Assert.Equal("POLE, \"A\"|air", read["names"]);
        Assert.Equal("-1 0 1 1 1", read["medium"]);
    }

    [ForeignReaderFact("meshio")]
    public void MeshioReadsTheMesh()
    {
        string file = Save("mesh.vtu", s => VtuMap.Write(Cells(), TwoConductorScene.Section(), Origin, s));
        const string script = """
            import sys, meshio, numpy as np
            m = meshio.read(sys.argv[1])
            c = m.cells[0]
            print("cells=%s %d" % (c.type, len(c.data)))
            p = m.points
            print("x=%g" % abs(p[:, 0]).max())
            area = 0.0
            for t in c.data:
                a, b, d = p[t[0], 1:], p[t[1], 1:], p[t[2], 1:]
                area += 0.5 * ((b[0]-a[0])*(d[1]-a[1]) - (b[1]-a[1])*(d[0]-a[0]))
                assert np.allclose(p[t[3]], 0.5*(p[t[0]]+p[t[1]]), atol=1e-15)
                assert np.allclose(p[t[4]], 0.5*(p[t[1]]+p[t[2]]), atol=1e-15)
                assert np.allclose(p[t[5]], 0.5*(p[t[2]]+p[t[0]]), atol=1e-15)
            print("area=%.17g" % area)
            print("data=" + "|".join(sorted(m.point_data)))
            b = m.point_data["B [T]"]
            print("norm=%.3g" % abs(np.linalg.norm(b, axis=1) - m.point_data["|B| [T]"].ravel()).max())
            print("mu=%.12g" % np.nanmax(m.point_data["mu_r [1]"]))
            print("part=" + " ".join(str(v) for v in np.unique(m.cell_data["part"][0])))
            """;

        Dictionary<string, string> read = ForeignReader.Run("meshio", script, file)
            .Where(l => l.Contains('=', StringComparison.Ordinal)).Select(l => l.Split('=', 2)).ToDictionary(p => p[0], p => p[1]);

        Assert.Equal("triangle6 128", read["cells"]);
        Assert.Equal("0", read["x"]);
        Assert.Equal(16e-6, Numbers(read["area"])[0], 1e-18); // the square of 4 mm
        Assert.Equal("A [T m]|B [T]|H [A/m]|mu_r [1]||B| [T]", read["data"]);
        Assert.Equal(0, Numbers(read["norm"])[0], 1e-15);
        Assert.Equal(1, Numbers(read["mu"])[0], 1e-8); // μ0 of the two constants differ in the tenth digit
        Assert.Equal("0 2", read["part"]); // air and the second part
    }

    [ForeignReaderFact("vtk")]
    public void VtkReadsTheMeshAndTheNames()
    {
        string file = Save("mesh.vtu", s => VtuMap.Write(Cells(), TwoConductorScene.Section(), Origin, s));
        const string script = """
            import sys, vtk
            r = vtk.vtkXMLUnstructuredGridReader(); r.SetFileName(sys.argv[1]); r.Update()
            g = r.GetOutput()
            print("type=%d" % g.GetCellType(0))
            print("count=%d %d" % (g.GetNumberOfCells(), g.GetNumberOfPoints()))
            f = g.GetFieldData()
            names = [f.GetArrayName(i) for i in range(f.GetNumberOfArrays())]
            print("names=" + "|".join("%d %s" % (f.GetArray(n).GetValue(0), n[15:]) for n in names if n.startswith("part number of ")))
            t = f.GetArray("title [UTF-8]")
            print("title=" + ascii(bytes(int(t.GetValue(i)) for i in range(t.GetNumberOfValues())).decode()))
            print("B=%.17g" % g.GetPointData().GetArray("B [T]").GetComponent(7, 2))
            """;

        Dictionary<string, string> read = ForeignReader.Run("vtk", script, file)
            .Where(l => l.Contains('=', StringComparison.Ordinal)).Select(l => l.Split('=', 2)).ToDictionary(p => p[0], p => p[1]);

        Assert.Equal("22", read["type"]);
        Assert.Equal("128 768", read["count"]);
        Assert.Equal("0 air|1 YOKE|2 RIDGE|3 GROOVE|4 COIL LEFT|5 COIL RIGHT", read["names"]);
        Assert.Equal("'Map of two conductors, \\xb5-metal'", read["title"]);
        Assert.Equal(Cells().ElementAt(1).Samples[1].Bz, Numbers(read["B"])[0]);
    }

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    private static FieldMap SmallMap() => FieldMap.Sample(
        MapGrid.Rectangle(new Point(-0.2e-3, 3.5e-3), new Point(0.2e-3, 3.8e-3), 0.1e-3),
        p => (p.Y, p.Z) switch
        {
            ( < -0.15e-3, < 3.55e-3) => MapSample.Nothing,
            ( < -0.05e-3, < 3.55e-3) => MapSample.From(new FieldSample(0, 0.5, 1, 10, 2), _ => "POLE, \"A\""),
            _ => MapSample.From(TwoConductorScene.At(p)),
        },
        Origin);

    private static IEnumerable<(Point[] Nodes, FieldSample[] Samples, int Region)> Cells()
    {
        foreach (Corners t in Triangles())
        {
            Point[] nodes = [t.A, t.B, t.C, Point.Between(t.A, t.B, 0.5), Point.Between(t.B, t.C, 0.5), Point.Between(t.C, t.A, 0.5)];
            int region = ((1 / 3.0) * (t.A + t.B + t.C)).Z < 4e-3 ? 2 : CrossSection.Air;
            yield return (nodes, [.. nodes.Select(p => At(p, region))], region);
        }
    }

    private static IEnumerable<Corners> Triangles() => LevelLineTests.Grid(_ => 0, cells: 8)
        .Select(t => new Corners(Place(t.P0), Place(t.P1), Place(t.P2)));

    private static Point Place(Point p) => new Point(0, 4e-3) + (2e-3 * p);

    private static FieldSample At(Point p, int region)
    {
        (double a, double by, double bz) = TwoConductorScene.Field(p);
        return new FieldSample(a, by, bz, Math.Sqrt((by * by) + (bz * bz)) / (4e-7 * Math.PI), region);
    }

    private static string Csv(FieldMap map) => new UTF8Encoding(false, true).GetString(Bytes(s => CsvMap.Write(map, s)));

    private static byte[] Bytes(Action<Stream> write)
    {
        using MemoryStream stream = new();
        write(stream);
        return stream.ToArray();
    }

    private string Save(string name, Action<Stream> write)
    {
        string path = Path.Combine(_folder, name);
        using FileStream stream = new(path, FileMode.Create, FileAccess.Write); // as the tool opens its files
        write(stream);
        return path;
    }

    private static double[] Numbers(string text) => [.. text.Split(' ').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];

    // A reader of its own for the rows of RFC 4180.
    private static string[] Cells(string row)
    {
        List<string> cells = [];
        StringBuilder cell = new();
        bool quoted = false;
        for (int i = 0; i < row.Length; i++)
        {
            if (row[i] == '"' && quoted && i + 1 < row.Length && row[i + 1] == '"')
            {
                cell.Append(row[++i]);
            }
            else if (row[i] == '"')
            {
                quoted = !quoted;
            }
            else if (row[i] == ',' && !quoted)
            {
                cells.Add(cell.ToString());
                cell.Clear();
            }
            else
            {
                cell.Append(row[i]);
            }
        }

        cells.Add(cell.ToString());
        return [.. cells];
    }

    private readonly record struct Corners(Point A, Point B, Point C);
}
