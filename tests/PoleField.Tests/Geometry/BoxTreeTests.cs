// Truth: every box compared with every other.
using CsCheck;
using PoleField.Geometry;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Geometry;

public sealed class BoxTreeTests
{
    // Whole numbers, so that edges and corners touch often; some boxes are lines and points.
    private static Gen<Box[]> Boxes { get; } =
        Gen.Select(Gen.Int[0, 60], Gen.Int[0, 60], Gen.Int[0, 9], Gen.Int[0, 9], (y, z, w, h) => new Box(new Point(y, z), new Point(y + w, z + h)))
            .Array[0, 90];

    [Fact]
    public void PairsAreThoseThatComeWithinTheMarginEachOnceInOrder() => Gen.Select(Boxes, Gen.Int[0, 3]).SampleFixed(
        (boxes, margin) =>
        {
            List<(int, int)> expected = [];
            for (int i = 0; i < boxes.Length; i++)
            {
                for (int j = i + 1; j < boxes.Length; j++)
                {
                    if (boxes[i].Inflated(margin).Overlaps(boxes[j]))
                    {
                        expected.Add((i, j));
                    }
                }
            }

            Assert.Equal(expected, new BoxTree(boxes).Pairs(margin));
        },
        iter: 300);

    [Fact]
    public void ARayMeetsItsBoxesByFallingRightEdges() => Gen.Select(Boxes, Gen.Int[-5, 70], Gen.Int[-5, 70]).SampleFixed(
        (boxes, y, z) =>
        {
            int[] met = [.. new BoxTree(boxes).TowardsLeft(new Point(y, z))];

            Assert.Equal(
                Enumerable.Range(0, boxes.Length).Where(i => boxes[i].Min.Z <= z && z <= boxes[i].Max.Z && boxes[i].Min.Y <= y),
                met.Order());
            Assert.Equal(met.Select(i => boxes[i].Max.Y).OrderDescending(), met.Select(i => boxes[i].Max.Y));
        },
        iter: 300);
}
