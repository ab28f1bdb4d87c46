using System.Security.Cryptography;
using System.Text.Json.Nodes;
using PoleField.Cli.Case;
using PoleField.Output.Results;

namespace PoleField.Cli.Sweeping;

/// <summary>What a sweep solves: the case, its axes and the points they span. The last axis runs fastest.</summary>
internal sealed class SweepPlan
{
    private readonly IReadOnlyList<Axis> _axes;

    /// <param name="axes">At least one.</param>
    /// <param name="file">The same for the folder.</param>
    public SweepPlan(IReadOnlyList<Axis> axes, SweepPlanFile file)
    {
        _axes = axes;
        File = file;
        Sha256 = HashOf(file);
    }

    public SweepPlanFile File { get; }

    /// <summary>Hash of the plan: points belong to a plan by it.</summary>
    public string Sha256 { get; }

    /// <summary>The changes of the case at a point.</summary>
    public IReadOnlyList<CaseChange> ChangesAt(int point) =>
        [.. Places(File, point).Select((value, axis) => _axes[axis].At(value))];

    /// <summary>Number of points.</summary>
    public static int CountOf(SweepPlanFile file) => file.Axes.Aggregate(1, (n, a) => checked(n * a.Values.Count));

    /// <summary>The varied values at a point, in the order of the axes.</summary>
    public static IReadOnlyList<JsonNode> ValuesAt(SweepPlanFile file, int point) =>
        [.. Places(file, point).Select((value, axis) => file.Axes[axis].Values[value].DeepClone())];

    public static string HashOf(SweepPlanFile file)
    {
        using var stream = new MemoryStream();
        SweepTable.WriteJson(file, stream);
        return Convert.ToHexStringLower(SHA256.HashData(stream.ToArray()));
    }

    private static int[] Places(SweepPlanFile file, int point)
    {
        int[] places = new int[file.Axes.Count];
        for (int axis = places.Length - 1; axis >= 0; axis--)
        {
            (point, places[axis]) = Math.DivRem(point, file.Axes[axis].Values.Count);
        }

        return places;
    }
}

/// <summary>Part k of n of a sweep: the points whose number leaves k − 1 when divided by n.</summary>
internal readonly record struct Shard(int Number, int Of)
{
    public static Shard Whole { get; } = new(1, 1);

    public IEnumerable<int> PointsOf(int count)
    {
        for (int point = Number - 1; point < count; point += Of)
        {
            yield return point;
        }
    }
}
