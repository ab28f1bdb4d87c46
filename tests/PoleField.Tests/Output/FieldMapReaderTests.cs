// Truth: the VTK XML and openPMD 1.1.0 rules as other libraries read them (h5py, meshio, VTK), and closed forms.
using System.Globalization;
using PoleField.Output.Maps;
using PoleField.Tests.Common;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class FieldMapReaderTests : IDisposable
{
    private readonly string _folder = Directory.CreateTempSubdirectory("polefield-map").FullName;

    [ForeignReaderFact("h5py")]
    public void H5pyReadsTheOpenPmdMap()
    {
        FieldMap map = SampleMap.Make();
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
        Assert.Equal(SampleMap.Origin.Title, read["comment"]);
        Assert.Equal(SampleMap.Origin.CaseSha256, read["caseSha256"]);
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
        string file = Save("mesh.vtu", s => VtuMap.Write(SampleMap.Cells(), TwoConductorScene.Section(), SampleMap.Origin, s));
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
        string file = Save("mesh.vtu", s => VtuMap.Write(SampleMap.Cells(), TwoConductorScene.Section(), SampleMap.Origin, s));
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
        Assert.Equal(SampleMap.Cells().ElementAt(1).Samples[1].Bz, Numbers(read["B"])[0]);
    }

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    private string Save(string name, Action<Stream> write)
    {
        string path = Path.Combine(_folder, name);
        using FileStream stream = new(path, FileMode.Create, FileAccess.Write); // as the tool opens its files
        write(stream);
        return path;
    }

    private static double[] Numbers(string text) => [.. text.Split(' ').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
}
