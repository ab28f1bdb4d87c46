using BenchmarkDotNet.Attributes;
using PoleField.Drawing;

namespace PoleField.Benchmarks;

/// <summary>A drawing from its bytes to named regions: read, chained, nested.</summary>
[MemoryDiagnoser]
public class DrawingBenchmark
{
    private byte[] _file = [];

    [Params(10_000, 100_000)]
    public int Entities { get; set; }

    [GlobalSetup]
    public void Draw() => _file = PlateDrawing.Write(Entities);

    [Benchmark]
    public Sketch Read() => DxfReader.Read(new MemoryStream(_file), "plate.dxf");

    [Benchmark]
    public SectionReading ReadAndSection() => Sectioning.Read(Read(), PlateDrawing.Request);
}
