namespace PoleField.Materials;

/// <summary>
/// A magnetisation curve H(B): a monotone cubic with continuous slope through a table, continued above the last row by a
/// <see cref="SaturationTail"/>.
/// </summary>
/// <remarks>
/// Every instance satisfies H(0) = 0 and 0 &lt; dH/dB ≤ 1/μ0 everywhere (the differential permeability is never below that of
/// vacuum), and its polarisation rises to <see cref="SaturationPolarisation"/>. The slope is continuous except where a finding
/// named "bh-kink" says otherwise. Interpolating H(B), not ν(B²): ν falls below the permeability maximum, where a monotone ν
/// does not make a monotone H (C. Pechstein, B. Jüttler, J. Comput. Appl. Math. 196 (2006) 45). Hysteresis and eddy currents
/// are outside the model. A remanent gap field of about μ0 Hc × (iron length)/(gap) remains after switch-off.
/// </remarks>
public sealed class BhCurve : MagneticLaw
{
    // Buckets of equal width per row of the table: with four, most hold one interval or none.
    private const int BucketsPerRow = 4;

    private readonly Piece[] _pieces;   // piece k covers nodes k to k + 1
    private readonly int[] _first;      // bucket i begins inside piece _first[i]
    private readonly double _bucketsPerTesla;
    private readonly double _end;       // B of the last node

    private BhCurve(string name, BhRow[] nodes, Piece[] pieces, SaturationTail tail, IReadOnlyList<Finding> findings)
    {
        Name = name;
        Nodes = nodes;
        Tail = tail;
        Findings = findings;
        SaturationPolarisation = tail.Start.Polarisation + tail.MissingPolarisation;
        _pieces = pieces;
        _end = tail.Start.FluxDensity;
        int buckets = BucketsPerRow * pieces.Length;
        _bucketsPerTesla = buckets / _end;

        // One bucket more than the table fills: a product rounded up to the last edge lands there.
        _first = new int[buckets + 2];
        int piece = 0;
        for (int i = 0; i < _first.Length; i++)
        {
            while (piece + 1 < pieces.Length && nodes[piece + 1].FluxDensity * _bucketsPerTesla <= i)
            {
                piece++;
            }

            _first[i] = piece;
        }
    }

    /// <summary>Name of the table.</summary>
    public string Name { get; }

    /// <summary>The points the curve passes through, from (0, 0) up to the last row that counts.</summary>
    public IReadOnlyList<BhRow> Nodes { get; }

    /// <summary>The curve above the last node: an extrapolation.</summary>
    public SaturationTail Tail { get; }

    /// <summary>Notes and warnings: rows dropped, saturation assumed, a short table.</summary>
    public IReadOnlyList<Finding> Findings { get; }

    /// <inheritdoc/>
    public override bool IsLinear => false;

    /// <inheritdoc/>
    public override double InitialReluctivity => _pieces[0].Slope;

    /// <inheritdoc/>
    public override double SaturationPolarisation { get; }

    /// <summary>Lays the curve through a table.</summary>
    /// <param name="table">Pairs in rising order; a missing origin is added.</param>
    /// <param name="options">What may be done to the table; null takes it as it is.</param>
    /// <exception cref="InputException">
    /// The table contradicts physics or itself. Carries every fault: rows out of order, slopes below that of vacuum, polarisation
    /// above Js, swapped columns, too few rows.
    /// </exception>
    public static BhCurve FromTable(BhTable table, BhCurveOptions? options = null)
    {
        options ??= BhCurveOptions.Default;
        BhTableCheck check = BhTableCheck.Run(table, options);
        BhRow[] nodes = check.Nodes;
        SaturationTail tail = SaturationTail.Through(nodes[^2], nodes[^1], check.SaturationPolarisation);
        MonotoneSlopes slopes = MonotoneSlopes.Through(nodes, tail.StartSlope, options.AnhystereticStart);
        Piece[] pieces = new Piece[nodes.Length - 1];
        double energy = 0;
        for (int k = 0; k < pieces.Length; k++)
        {
            pieces[k] = Piece.Between(nodes[k], nodes[k + 1], (slopes.AtStart[k], slopes.AtEnd[k]), energy);
            energy = pieces[k].At(nodes[k + 1].FluxDensity).Energy;
        }

        IEnumerable<Finding> kinks = slopes.Kinks.Select(k => check.KinkAt(nodes[k]));
        return new BhCurve(table.Name, nodes, pieces, tail.WithStartEnergy(energy), [.. check.Findings, .. kinks]);
    }

    /// <inheritdoc/>
    public override MagneticState At(double b)
    {
        if (b >= _end)
        {
            return Tail.At(b);
        }

        int bucket = (int)(b * _bucketsPerTesla);
        int low = _first[bucket];
        int high = _first[bucket + 1];
        while (low < high)
        {
            int middle = (low + high + 1) >> 1;
            if (_pieces[middle].StartB <= b)
            {
                low = middle;
            }
            else
            {
                high = middle - 1;
            }
        }

        return _pieces[low].At(b);
    }

    // The loop of the base class, but nothing in it is called through a table.
    internal override void At(ReadOnlySpan<double> b, Span<double> h, Span<double> slope, Span<double> energy)
    {
        for (int i = 0; i < b.Length; i++)
        {
            (h[i], slope[i], energy[i]) = At(b[i]);
        }
    }

    /// <inheritdoc/>
    public override double FluxDensityAt(double h)
    {
        if (h >= Tail.Start.FieldStrength)
        {
            return Tail.FluxDensityAt(h);
        }

        int low = 0;
        int high = _pieces.Length - 1;
        while (low < high)
        {
            int middle = (low + high + 1) >> 1;
            if (Nodes[middle].FieldStrength <= h)
            {
                low = middle;
            }
            else
            {
                high = middle - 1;
            }
        }

        return Nodes[low].FieldStrength == h ? Nodes[low].FluxDensity : Inverse(h, Nodes[low].FluxDensity, Nodes[low + 1].FluxDensity);
    }

    /// <summary>Hermite cubic of x = B − StartB: H = StartH + x (Slope + x (Square + x Cube)).</summary>
    private readonly record struct Piece(double StartB, double StartH, double Slope, double Square, double Cube, double StartEnergy)
    {
        public static Piece Between(BhRow start, BhRow end, (double Start, double End) slope, double energy)
        {
            double length = end.FluxDensity - start.FluxDensity;
            double secant = (end.FieldStrength - start.FieldStrength) / length;
            double square = ((3 * secant) - (2 * slope.Start) - slope.End) / length;
            double cube = (slope.Start + slope.End - (2 * secant)) / (length * length);
            return new Piece(start.FluxDensity, start.FieldStrength, slope.Start, square, cube, energy);
        }

        public MagneticState At(double b)
        {
            double x = b - StartB;
            double h = StartH + (x * (Slope + (x * (Square + (x * Cube)))));
            double slope = Slope + (x * ((2 * Square) + (3 * x * Cube)));
            double work = x * (StartH + (x * ((Slope / 2) + (x * ((Square / 3) + (x * Cube / 4))))));

            // Rounding may exceed the limit by a last digit where the slope of vacuum is attained.
            return new MagneticState(h, Math.Min(slope, PhysicalConstants.Nu0), StartEnergy + work);
        }
    }
}
