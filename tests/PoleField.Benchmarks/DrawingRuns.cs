using System.Diagnostics;
using System.Globalization;
using PoleField.Drawing;

namespace PoleField.Benchmarks;

/// <summary>Drawings of growing size, one table: what a user waits for before the mesh, and how it grows.</summary>
internal static class DrawingRuns
{
    public static void Print(TextWriter writer)
    {
        writer.WriteLine("Drawings from file to regions; best of five, the largest once");
        writer.WriteLine("entities     MB  read s  section s  all s  growth");
        double before = double.NaN;
        foreach (int entities in new[] { 10_000, 100_000, 1_000_000 })
        {
            byte[] file = PlateDrawing.Write(entities);
            (double read, double section) = Enumerable.Range(0, entities < 1_000_000 ? 5 : 1).Select(_ => Time(file, entities)).MinBy(t => t.Read + t.Section);

            // Growth per tenfold size; n log n gives 10 to 13.
            double all = read + section;
            string growth = double.IsNaN(before) ? "" : (all / before).ToString("f1", CultureInfo.InvariantCulture);
            writer.WriteLine(string.Create(
                CultureInfo.InvariantCulture, $"{entities,8}  {file.Length / 1e6,5:f1}  {read,6:f3}  {section,9:f3}  {all,5:f2}  {growth,6}"));
            before = all;
        }

        writer.WriteLine(string.Create(
            CultureInfo.InvariantCulture, $"\npeak memory {Process.GetCurrentProcess().PeakWorkingSet64 / 1e6:f0} MB"));
    }

    private static (double Read, double Section) Time(byte[] file, int entities)
    {
        var clock = Stopwatch.StartNew();
        Sketch sketch = DxfReader.Read(new MemoryStream(file), "plate.dxf");
        double read = clock.Elapsed.TotalSeconds;
        SectionReading reading = Sectioning.Read(sketch, PlateDrawing.Request);
        double section = clock.Elapsed.TotalSeconds - read;
        double area = reading.Parts.Single(p => p.Layer == "PLATE").Area;
        return reading.IsSound && Math.Abs(area - PlateDrawing.Area(entities)) < 1e-9 * area
            ? (read, section)
            : throw new InvalidOperationException($"The plate of {entities} entities was not read as drawn.");
    }
}
