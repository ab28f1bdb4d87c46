namespace PoleField.Numerics;

/// <summary>What a front costs, in floating-point operations or their worth in time.</summary>
internal static class FrontCost
{
    // Worth of one front's overhead, of one panel entry (cleared, scattered into, stored) and of one update entry added
    // into the parent. Orders of magnitude (0.3 µs, 1 ns and 2 ns at 6 operations a nanosecond), not fitted.
    private const double PerFront = 2000;
    private const double PerPanelEntry = 6;
    private const double PerUpdateEntry = 12;

    /// <summary>Multiplications and additions of the dense elimination of k of k + r columns.</summary>
    public static double Operations(double k, double r) =>
        (k * k * k / 3) + (k * k / 2) + (k / 6) + (k * k * r) + (k * r * r) + (k * r);

    /// <summary>Whether eliminating a child with its parent is estimated to be faster than one after the other.</summary>
    public static bool MergingPays(int childColumns, int childRows, int parentColumns, int parentRows) =>
        Worth(childColumns + parentColumns, parentRows)
        <= Worth(childColumns, childRows) + Worth(parentColumns, parentRows);

    /// <summary>Estimated time of a front, as the operations that would take it.</summary>
    public static double Worth(double k, double r)
    {
        return PerFront + Operations(k, r) + (PerPanelEntry * k * ((k / 2) + r)) + (PerUpdateEntry * r * r / 2);
    }
}
