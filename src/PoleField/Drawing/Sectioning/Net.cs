using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>What a layer is to the section.</summary>
internal enum LayerRole
{
    Part,
    Rim,
    Beam,
}

/// <summary>A layer the request names and the sketch has.</summary>
/// <param name="Index">Position among the used layers: the parts in the order of the case, then the rim.</param>
/// <param name="Name">Name as the sketch writes it.</param>
/// <param name="Role">What it is for.</param>
/// <param name="Key">Material of a part.</param>
internal sealed record UsedLayer(int Index, string Name, LayerRole Role, string Key);

/// <summary>A drawn curve or a piece of one, in metres, between two points of the net.</summary>
/// <param name="Curve">The curve.</param>
/// <param name="Start">Point where it starts.</param>
/// <param name="End">Point where it ends.</param>
/// <param name="Layer">Index of its layer.</param>
/// <param name="Source">Index of the sketch's curve.</param>
/// <param name="Whole">True while it is the curve as drawn and not a piece of it.</param>
internal sealed record Piece(Curve Curve, int Start, int End, int Layer, int Source, bool Whole = true)
{
    public bool IsClosed => Start == End;
}

/// <summary>Pieces that share end points by index; the points can still be moved.</summary>
internal sealed class Net
{
    public List<Point> Points { get; } = [];

    public List<Piece> Pieces { get; set; } = [];

    /// <summary>True when the net is the half y ≥ 0 of a symmetric section: points on y = 0 stay there.</summary>
    public bool IsHalf { get; set; }

    /// <summary>Gives every piece the exact places of its end points.</summary>
    public void Refit()
    {
        for (int i = 0; i < Pieces.Count; i++)
        {
            Piece p = Pieces[i];
            Curve fitted = CurveEnds.Move(p.Curve, Points[p.Start], Points[p.End]);
            Pieces[i] = ReferenceEquals(fitted, p.Curve) ? p : p with { Curve = fitted };
        }
    }
}

/// <summary>A boundary curve between faces: one or more layers' pieces at the same place.</summary>
/// <param name="Curve">The curve.</param>
/// <param name="Start">Point where it starts.</param>
/// <param name="End">Point where it ends.</param>
/// <param name="Layers">Layers that drew it, increasing.</param>
/// <param name="Source">Index of one of the sketch's curves.</param>
internal sealed record WovenEdge(Curve Curve, int Start, int End, IReadOnlyList<int> Layers, int Source);

/// <summary>Lengths the reading decides by, metres.</summary>
/// <param name="Exact">Points closer than this differ by rounding only.</param>
/// <param name="Fine">Reach on one layer, where short edges may be meant.</param>
/// <param name="Join">Reach of loose ends and between layers.</param>
/// <param name="Size">Diagonal of all used curves.</param>
internal sealed record Reach(double Exact, double Fine, double Join, double Size)
{
    private const double Relative = 1e-9;  // of the size
    private const double Ulps = 1e-15;     // of the coordinates: drawings far from zero cannot be finer
    private const double FineShare = 0.01; // of the join tolerance

    public static Reach For(IReadOnlyList<Piece> curves, double join)
    {
        if (curves.Count == 0)
        {
            return new Reach(join, join, join, 0);
        }

        Box all = Box.Empty;
        foreach (Piece p in curves)
        {
            all = all.Including(p.Curve.Bounds);
        }

        double size = all.Diagonal;
        double far = Math.Max(all.Min.Length, all.Max.Length);
        double exact = Math.Max(Relative * size, Ulps * far);
        return new Reach(exact, Math.Max(exact, FineShare * join), Math.Max(join, exact), size);
    }
}
