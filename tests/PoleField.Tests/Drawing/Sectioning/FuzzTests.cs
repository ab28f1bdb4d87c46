// Truth: membership of a place in each drawn figure by its own inequality; promises of the section by the check.
using CsCheck;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Tests.House;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class FuzzTests
{
    private sealed record Figure(bool Round, int Y, int Z, int Width, int Height)
    {
        public IEnumerable<SketchCurve> Draw(string layer) => Round
            ? [Circle(layer, Y, Z, 0.5 * Width)]
            : Rectangle(layer, Y, Z, Y + Width, Z + Height);

        public bool Holds(double y, double z) => Round
            ? ((y - Y) * (y - Y)) + ((z - Z) * (z - Z)) < 0.25 * Width * Width
            : y > Y && y < Y + Width && z > Z && z < Z + Height;
    }

    // Few whole numbers, so that corners, edges and tangents coincide often.
    private static Gen<Figure> Figures { get; } =
        Gen.Select(Gen.Bool, Gen.Int[0, 8], Gen.Int[0, 8], Gen.Int[1, 8], Gen.Int[1, 8], (r, y, z, w, h) => new Figure(r, y, z, w, h));

    [Fact]
    public void EveryPlaceBelongsToAPartExactlyWhenSomeFigureHoldsIt() => Figures.List[1, 6].SampleFixed(figures =>
    {
        string[] layers = [.. figures.Select((_, i) => $"P{i}")];
        Sketch sketch = Sketch(figures.SelectMany((f, i) => f.Draw(layers[i])));

        CrossSection s = Sound(sketch, Parts(layers) with { MaterialKeys = [.. layers.Select(_ => "steel")] });

        for (double y = -4.27; y < 16; y += 1.63)
        {
            for (double z = -4.31; z < 16; z += 1.67)
            {
                int covers = Enumerable.Range(1, s.Regions.Count - 1).Sum(r => SectionPoint.Turns(s, r, new Point(1e-3 * y, 1e-3 * z)));
                Assert.Equal(figures.Exists(f => f.Holds(y, z)) ? 1 : 0, covers);
            }
        }
    }, iter: RandomRuns.Count("POLEFIELD_RANDOM_DRAWINGS", 200));

    [Fact]
    public void WhateverIsDrawnEndsInASoundSectionOrInFaults() =>
        Gen.Select(Figures.Array[1, 8], Gen.Int[0, 2].Array[8], Gen.Bool, Gen.Bool, Gen.Int[0, 40]).SampleFixed((figures, layer, mirror, oneKey, lost) =>
        {
            SketchCurve[] curves = [.. figures.SelectMany((f, i) => f.Draw($"L{layer[i]}"))];
            curves = [.. curves.Where((_, i) => i != lost)];
            SectionRequest request = Parts("L0", "L1", "L2") with { MirrorLeftRight = mirror };

            SectionReading reading = PoleField.Drawing.Sectioning.Read(
                Sketch(curves), oneKey ? request with { MaterialKeys = ["a", "a", "a"] } : request);

            Assert.Equal(Faults(reading).Length == 0, reading.IsSound);
            Assert.Empty(reading.IsSound ? CrossSectionCheck.Faults(reading.Section!) : []);
        }, iter: RandomRuns.Count("POLEFIELD_RANDOM_DRAWINGS", 1000));
}
