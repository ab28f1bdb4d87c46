using System.Text;
using PoleField.Geometry;
using PureHDF;

namespace PoleField.Output.Maps;

/// <summary>
/// A rectangular field map as HDF5 by the openPMD standard 1.1.0: mesh record B (components x, y, z; x is 0), the derivatives
/// of its components, the gradient of |B|, and, as numbers into lists of names, the medium and how each value was obtained. Array indices run [z, y].
/// </summary>
public static class OpenPmdMap
{
    // Powers of length, mass, time, current, temperature, amount, light: tesla = kg s⁻² A⁻¹.
    private static readonly double[] Tesla = [0, 1, -2, -1, 0, 0, 0];
    private static readonly double[] TeslaPerMetre = [-1, 1, -2, -1, 0, 0, 0];
    private static readonly double[] NoDimension = [0, 0, 0, 0, 0, 0, 0];

    /// <summary>Writes the map.</summary>
    /// <exception cref="InputException">The map is a list of places, which the standard has no meshes for.</exception>
    public static void Write(FieldMap map, Stream stream)
    {
        if (!map.Grid.IsRectangle)
        {
            throw new InputException(
            [
                new Finding(Severity.Fault, "map-places", "openPMD holds meshes; a list of places is none.", "Ask for a rectangle, or for the csv format."),
            ]);
        }

        string[] media = [.. map.Samples.Select(s => s.Medium).Where(m => m.Length > 0).Distinct()];
        Dictionary<string, int> number = media.Select((name, i) => (name, i)).ToDictionary(m => m.name, m => m.i);
        H5Group meshes = new()
        {
            ["B"] = Vector(map, Tesla, s => s.By, s => s.Bz),
            ["grad_absB"] = Vector(map, TeslaPerMetre, s => s.DFieldDy, s => s.DFieldDz),
            ["dBy_dy"] = Scalar(map, TeslaPerMetre, s => -s.DBzDz),
            ["dBy_dz"] = Scalar(map, TeslaPerMetre, s => s.DByDz),
            ["dBz_dy"] = Scalar(map, TeslaPerMetre, s => s.DByDz),
            ["dBz_dz"] = Scalar(map, TeslaPerMetre, s => s.DBzDz),
            ["medium"] = Medium(map, number, media),
            ["obtained"] = Obtained(map),
        };
        H5Group iteration = new()
        {
            Attributes = new() { ["time"] = 0.0, ["dt"] = 1.0, ["timeUnitSI"] = 1.0 },
            ["meshes"] = meshes,
        };
        H5File file = new() { ["data"] = new H5Group { ["0"] = iteration } };
        foreach ((string key, string value) in RootTexts(map.Provenance))
        {
            file.Attributes[key] = value;
        }

        file.Attributes["openPMDextension"] = 0u;
        file.Attributes["accuracyReached"] = map.Provenance.AccuracyReached;

        // The HDF5 writer goes back and forth in what it wrote; the caller's stream need only take bytes.
        using MemoryStream whole = new();
        file.Write(whole, new H5WriteOptions(DefaultStringLength: LongestText(map.Provenance, media)));
        stream.Write(whole.ToArray());
    }

    private static (string Key, string Value)[] RootTexts(MapProvenance origin)
    {
        return
        [
            ("openPMD", "1.1.0"),
            ("basePath", "/data/%T/"),
            ("meshesPath", "meshes/"),
            ("iterationEncoding", "groupBased"),
            ("iterationFormat", "/data/%T/"),
            ("author", "PoleField"),
            ("software", "PoleField"),
            ("softwareVersion", origin.ProgramVersion),
            ("comment", origin.Title),
            ("caseSha256", origin.CaseSha256),
            ("sketchSha256", origin.SketchSha256),
        ];
    }

    // Fixed-length strings are cut silently by the writer, and the standard's readers accept no others: take the longest.
    private static int LongestText(MapProvenance origin, string[] media)
    {
        const int shortest = 16; // names the mesh records use themselves: "cartesian", "C", "y", "z"
        return RootTexts(origin).Select(t => t.Value).Concat(media).Select(Encoding.UTF8.GetByteCount).Append(shortest).Max() + 1;
    }

    private static H5Group Vector(FieldMap map, double[] dimension, Func<MapSample, double> y, Func<MapSample, double> z)
    {
        H5Group record = new()
        {
            ["x"] = new H5Group
            {
                Attributes = new()
                {
                    ["value"] = 0.0,
                    ["shape"] = new ulong[] { (ulong)map.Grid.CountZ, (ulong)map.Grid.CountY },
                    ["unitSI"] = 1.0,
                    ["position"] = new[] { 0.0, 0.0 },
                },
            },
            ["y"] = Component(map, y),
            ["z"] = Component(map, z),
        };
        DescribeMesh(record, map.Grid, dimension);
        return record;
    }

    private static H5Dataset Scalar(FieldMap map, double[] dimension, Func<MapSample, double> value)
    {
        H5Dataset record = Component(map, value);
        DescribeMesh(record, map.Grid, dimension);
        return record;
    }

    private static H5Dataset Medium(FieldMap map, Dictionary<string, int> number, string[] media)
    {
        H5Dataset record = new(Table(map, s => s.Medium.Length == 0 ? -1 : number[s.Medium]));
        DescribeComponent(record);
        DescribeMesh(record, map.Grid, NoDimension);
        if (media.Length > 0)
        {
            record.Attributes["names"] = media;
        }

        return record;
    }

    private static H5Dataset Obtained(FieldMap map)
    {
        H5Dataset record = new(Table(map, s => (int)s.Source));
        DescribeComponent(record);
        DescribeMesh(record, map.Grid, NoDimension);
        record.Attributes["names"] = Enum.GetValues<MapSource>().Order().Select(MapSample.NameOf).ToArray();
        return record;
    }

    private static H5Dataset Component(FieldMap map, Func<MapSample, double> value)
    {
        H5Dataset component = new(Table(map, value));
        DescribeComponent(component);
        return component;
    }

    // Value at row z, column y.
    private static T[,] Table<T>(FieldMap map, Func<MapSample, T> value)
    {
        T[,] table = new T[map.Grid.CountZ, map.Grid.CountY];
        for (int i = 0; i < map.Samples.Count; i++)
        {
            table[i / map.Grid.CountY, i % map.Grid.CountY] = value(map.Samples[i]);
        }

        return table;
    }

    private static void DescribeComponent(H5Dataset component)
    {
        component.Attributes["unitSI"] = 1.0;
        component.Attributes["position"] = new[] { 0.0, 0.0 };
    }

    private static void DescribeMesh(H5Object record, MapGrid grid, double[] dimension)
    {
        // A direction with one place has no spacing of its own; the standard wants a positive number.
        Point step = new(grid.Step.Y > 0 ? grid.Step.Y : 1, grid.Step.Z > 0 ? grid.Step.Z : 1);
        record.Attributes["geometry"] = "cartesian";
        record.Attributes["dataOrder"] = "C";
        record.Attributes["axisLabels"] = new[] { "z", "y" };
        record.Attributes["gridSpacing"] = new[] { step.Z, step.Y };
        record.Attributes["gridGlobalOffset"] = new[] { grid.From.Z, grid.From.Y };
        record.Attributes["gridUnitSI"] = 1.0;
        record.Attributes["unitDimension"] = dimension;
        record.Attributes["timeOffset"] = 0.0;
    }
}
