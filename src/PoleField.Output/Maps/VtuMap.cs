using System.Globalization;
using System.Runtime.InteropServices;
using System.Security;
using System.Text;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Output.Maps;

/// <summary>
/// The mesh with the field as a VTK unstructured grid (XML, inline base64, Float64): second-order triangles (cell type 22),
/// each with its own six points because B and H jump between parts. Places in metres in the plane x = 0, vectors (0, By, Bz).
/// Field data give the number of each part (0 is the air) and, as UTF-8 bytes, title and provenance.
/// </summary>
public static class VtuMap
{
    private const byte QuadraticTriangle = 22;
    private const int NodesPerCell = 6;

    /// <summary>Writes the grid.</summary>
    /// <param name="cells">Corners, then mid-edges 01, 12, 20, with the field there and the region.</param>
    /// <param name="section">The section the regions belong to.</param>
    /// <param name="provenance">Where the field comes from.</param>
    /// <param name="stream">Where to.</param>
    public static void Write(
        IEnumerable<(Point[] Nodes, FieldSample[] Samples, int Region)> cells, CrossSection section, MapProvenance provenance, Stream stream)
    {
        Arrays arrays = Collect(cells, section);
        int points = arrays.Points.Count / 3;
        int count = arrays.Regions.Count;
        using StreamWriter writer = new(stream, new UTF8Encoding(false), bufferSize: -1, leaveOpen: true) { NewLine = "\n" };
        writer.WriteLine("<?xml version=\"1.0\" encoding=\"UTF-8\"?>");
        writer.WriteLine("<VTKFile type=\"UnstructuredGrid\" version=\"1.0\" byte_order=\"LittleEndian\" header_type=\"UInt64\">");
        writer.WriteLine("<UnstructuredGrid>");
        writer.WriteLine("<FieldData>");
        Text(writer, "title", provenance.Title);
        Text(writer, "case_sha256", provenance.CaseSha256);
        Text(writer, "sketch_sha256", provenance.SketchSha256);
        Text(writer, "obtained", MapSample.NameOf(MapSource.Element));
        Text(writer, "program", "PoleField " + provenance.ProgramVersion);
        Numbers<int>(writer, "part number of " + MapSample.Air, 1, [0]);
        for (int i = 0; i < section.Parts.Count; i++)
        {
            Numbers<int>(writer, "part number of " + section.Parts[i], 1, [i + 1]);
        }

        writer.WriteLine("</FieldData>");
        writer.WriteLine(FormattableString.Invariant($"<Piece NumberOfPoints=\"{points}\" NumberOfCells=\"{count}\">"));
        writer.WriteLine("<PointData Scalars=\"|B| [T]\" Vectors=\"B [T]\">");
        Numbers(writer, "A [T m]", 1, arrays.Potential);
        Numbers(writer, "B [T]", 3, arrays.Flux);
        Numbers(writer, "|B| [T]", 1, arrays.Magnitude);
        Numbers(writer, "H [A/m]", 1, arrays.Strength);
        Numbers(writer, "mu_r [1]", 1, arrays.Permeability);
        writer.WriteLine("</PointData>");
        writer.WriteLine("<CellData Scalars=\"part\">");
        Numbers(writer, "part", 1, arrays.Parts);
        Numbers(writer, "region", 1, arrays.Regions);
        writer.WriteLine("</CellData>");
        writer.WriteLine("<Points>");
        Numbers(writer, "place [m]", 3, arrays.Points);
        writer.WriteLine("</Points>");
        writer.WriteLine("<Cells>");
        Numbers<long>(writer, "connectivity", 1, [.. Enumerable.Range(0, points).Select(i => (long)i)]);
        Numbers<long>(writer, "offsets", 1, [.. Enumerable.Range(1, count).Select(i => (long)i * NodesPerCell)]);
        Numbers<byte>(writer, "types", 1, [.. Enumerable.Repeat(QuadraticTriangle, count)]);
        writer.WriteLine("</Cells>");
        writer.WriteLine("</Piece>");
        writer.WriteLine("</UnstructuredGrid>");
        writer.WriteLine("</VTKFile>");
    }

    private static Arrays Collect(IEnumerable<(Point[] Nodes, FieldSample[] Samples, int Region)> cells, CrossSection section)
    {
        Arrays arrays = new();
        foreach ((Point[] nodes, FieldSample[] samples, int region) in cells)
        {
            if (nodes.Length != NodesPerCell || samples.Length != NodesPerCell)
            {
                throw new ArgumentException(FormattableString.Invariant($"A cell needs {NodesPerCell} nodes and samples; got {nodes.Length} and {samples.Length}."), nameof(cells));
            }

            for (int i = 0; i < NodesPerCell; i++)
            {
                arrays.Add(nodes[i], samples[i]);
            }

            arrays.Regions.Add(region);
            arrays.Parts.Add(region >= 0 ? section.Regions[region].Part + 1 : 0); // 0 is the air
        }

        return arrays;
    }

    private static void Numbers<T>(StreamWriter writer, string name, int components, List<T> values)
        where T : unmanaged
    {
        ReadOnlySpan<byte> data = MemoryMarshal.AsBytes(CollectionsMarshal.AsSpan(values));
        byte[] run = new byte[sizeof(ulong) + data.Length];
        BitConverter.TryWriteBytes(run, (ulong)data.Length);
        data.CopyTo(run.AsSpan(sizeof(ulong)));
        string several = components == 1 ? "" : $" NumberOfComponents=\"{components.ToString(CultureInfo.InvariantCulture)}\"";
        string tuples = (values.Count / components).ToString(CultureInfo.InvariantCulture); // field data are read as empty without it
        writer.WriteLine($"<DataArray type=\"{TypeName<T>()}\" Name=\"{SecurityElement.Escape(name)}\"{several} NumberOfTuples=\"{tuples}\" format=\"binary\">");
        writer.WriteLine(Convert.ToBase64String(run));
        writer.WriteLine("</DataArray>");
    }

    private static string TypeName<T>()
        where T : unmanaged => default(T) switch
        {
            double => "Float64",
            int => "Int32",
            long => "Int64",
            byte => "UInt8",
            _ => throw new NotSupportedException($"No VTK name for {typeof(T).Name}."),
        };

    // Texts are UTF-8 bytes in an array of numbers: arrays of type String stop common readers.
    private static void Text(StreamWriter writer, string name, string value) =>
        Numbers<byte>(writer, name + " [UTF-8]", 1, [.. Encoding.UTF8.GetBytes(value)]);

    // Point data at [i] or [3·i + component], cell data at [cell].
    private sealed class Arrays
    {
        public List<double> Points { get; } = [];

        public List<double> Potential { get; } = [];

        public List<double> Flux { get; } = [];

        public List<double> Magnitude { get; } = [];

        public List<double> Strength { get; } = [];

        public List<double> Permeability { get; } = [];

        public List<int> Regions { get; } = [];

        public List<int> Parts { get; } = [];

        public void Add(Point p, in FieldSample s)
        {
            Points.AddRange([0, p.Y, p.Z]);
            Potential.Add(s.Potential);
            Flux.AddRange([0, s.By, s.Bz]);
            Magnitude.Add(s.Magnitude);
            Strength.Add(s.FieldStrength);
            Permeability.Add(s.Magnitude / (PhysicalConstants.Mu0 * s.FieldStrength));
        }
    }
}
