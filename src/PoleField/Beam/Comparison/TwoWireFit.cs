using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// Least squares of two opposite line currents to (By, Bz) at weighted places, by the method of Levenberg (1944) and
/// Marquardt (1963). Started at the wires that have the value, slope and curvature of the field at the beam.
/// </summary>
internal sealed class TwoWireFit
{
    private const int MostSteps = 200;
    private const int Unknowns = 4;          // a, m along y, m along z, I: in this order
    private const double FirstDamping = 1e-3;
    private const double LargestDamping = 1e12;
    private const double SmallStep = 1e-13;  // relative to the half-spacing and the current

    private readonly BeamValues[] _values;
    private readonly double[] _weights;
    private readonly StatedWires _stated;
    private readonly bool[] _free;

    private TwoWireFit(BeamValues[] values, double[] weights, StatedWires stated)
    {
        _values = values;
        _weights = weights;
        _stated = stated;
        bool place = stated.Midpoint is null;
        _free = [stated.HalfSpacing is null, place, place, true];
    }

    /// <summary>The nearest two-wire field; null when none is near: the fit runs off to wires without end.</summary>
    /// <param name="values">Field at the places.</param>
    /// <param name="weights">Positive weights of the places, summing to 1.</param>
    /// <param name="centre">Field at the beam.</param>
    /// <param name="stated">What is not to be fitted.</param>
    public static TwoWireField? Of(BeamValues[] values, double[] weights, BeamValues centre, StatedWires stated)
    {
        var fit = new TwoWireFit(values, weights, stated);
        return fit.Run(fit.Start(centre));
    }

    private static Complex FieldOf(BeamValues v) => new(v.Bz, v.By);

    // From f = C/q, q = u² − a², u = ζ − m: f'/f = −2u/q and f''/f = 2(f'/f)² − 2/q.
    private TwoWireField Start(BeamValues centre)
    {
        Complex f = FieldOf(centre);
        var slope = new Complex(centre.DByDz, -centre.DBzDz);
        Complex ratio = slope / f;
        Complex q = 1 / ((ratio * ratio) - (Curvature(centre, slope) / (2 * f)));
        Complex u = -0.5 * ratio * q;
        double a = _stated.HalfSpacing ?? Math.Sqrt(Math.Max(((u * u) - q).Real, 0.01 * q.Magnitude));
        Point m = _stated.Midpoint ?? centre.At - new Point(u.Real, u.Imaginary);
        return WithBestCurrent(new TwoWireField(a, m, 1.0));
    }

    // Weighted slope of the derivative over the places.
    private Complex Curvature(BeamValues centre, Complex slope)
    {
        Complex sum = 0;
        double size = 0;
        for (int i = 0; i < _values.Length; i++)
        {
            BeamValues v = _values[i];
            var d = new Complex(v.At.Y - centre.At.Y, v.At.Z - centre.At.Z);
            sum += _weights[i] * (new Complex(v.DByDz, -v.DBzDz) - slope) * Complex.Conjugate(d);
            size += _weights[i] * ((d.Real * d.Real) + (d.Imaginary * d.Imaginary));
        }

        return sum / size;
    }

    private TwoWireField WithBestCurrent(TwoWireField unit)
    {
        double product = 0;
        double square = 0;
        for (int i = 0; i < _values.Length; i++)
        {
            BeamValues model = unit.At(_values[i].At);
            product += _weights[i] * ((model.By * _values[i].By) + (model.Bz * _values[i].Bz));
            square += _weights[i] * ((model.By * model.By) + (model.Bz * model.Bz));
        }

        return unit with { Current = unit.Current * product / square };
    }

    private TwoWireField? Run(TwoWireField wires)
    {
        double damping = FirstDamping;
        double cost = Cost(wires);
        for (int step = 0; step < MostSteps; step++)
        {
            (double[,] normal, double[] slope) = Normal(wires);
            double size;
            TwoWireField trial;
            double trialCost;
            while (true)
            {
                double[] move = Solve(normal, slope, damping);
                size = move.Max(Math.Abs);
                trial = Moved(wires, move);
                trialCost = trial.HalfSpacing > 0 ? Cost(trial) : double.PositiveInfinity;
                if (trialCost <= cost || damping > LargestDamping || size < SmallStep)
                {
                    break;
                }

                damping *= 4;
            }

            if (!(trialCost <= cost) || size < SmallStep)
            {
                return IsSensible(wires) ? wires : null;
            }

            (wires, cost) = (trial, trialCost);
            damping = Math.Max(damping / 10, 1e-12);
        }

        return null;
    }

    // Beyond a thousand aperture sizes there is no telling wires from a uniform field.
    private bool IsSensible(TwoWireField wires)
    {
        Box box = Box.Empty;
        foreach (BeamValues v in _values)
        {
            box = box.Including(v.At);
        }

        double reach = 1e3 * box.Diagonal;
        return double.IsFinite(wires.Current) && wires.HalfSpacing < reach && wires.Midpoint.DistanceTo(box.Centre) < reach;
    }

    private double Cost(TwoWireField wires)
    {
        double sum = 0;
        for (int i = 0; i < _values.Length; i++)
        {
            BeamValues model = wires.At(_values[i].At);
            double dy = model.By - _values[i].By;
            double dz = model.Bz - _values[i].Bz;
            sum += _weights[i] * ((dy * dy) + (dz * dz));
        }

        return sum;
    }

    // Unknowns are scaled: lengths by a, the current by itself, so that all moves are relative.
    private (double[,] Normal, double[] Slope) Normal(TwoWireField wires)
    {
        var normal = new double[Unknowns, Unknowns];
        var slope = new double[Unknowns];
        var columns = new Complex[Unknowns];
        for (int i = 0; i < _values.Length; i++)
        {
            Complex residual = FieldOf(_values[i]) - FieldOf(wires.At(_values[i].At));
            Derivatives(wires, _values[i].At, columns);
            for (int r = 0; r < Unknowns; r++)
            {
                slope[r] += _weights[i] * (Complex.Conjugate(columns[r]) * residual).Real;
                for (int c = 0; c <= r; c++)
                {
                    normal[r, c] += _weights[i] * (Complex.Conjugate(columns[r]) * columns[c]).Real;
                    normal[c, r] = normal[r, c];
                }
            }
        }

        return (normal, slope);
    }

    private void Derivatives(TwoWireField wires, Point p, Complex[] columns)
    {
        double a = wires.HalfSpacing;
        Complex u = new(p.Y - wires.Midpoint.Y, p.Z - wires.Midpoint.Z);
        Complex q = (u * u) - (a * a);
        Complex f = FieldOf(wires.At(p));
        Complex byPlace = 2 * u * f / q * a;
        columns[0] = _free[0] ? f * (q + (2 * a * a)) / q : 0;
        columns[1] = _free[1] ? byPlace : 0;
        columns[2] = _free[2] ? Complex.ImaginaryOne * byPlace : 0;
        columns[3] = f;
    }

    private static TwoWireField Moved(TwoWireField wires, double[] move) => new(
        wires.HalfSpacing * (1 + move[0]),
        wires.Midpoint + (wires.HalfSpacing * new Point(move[1], move[2])),
        wires.Current * (1 + move[3]));

    // (N + λ diag N) x = g by Gauss–Jordan; unknowns that are not free have an empty row and stay.
    private static double[] Solve(double[,] normal, double[] slope, double damping)
    {
        var m = (double[,])normal.Clone();
        var x = (double[])slope.Clone();
        for (int i = 0; i < Unknowns; i++)
        {
            m[i, i] = m[i, i] > 0 ? m[i, i] * (1 + damping) : 1.0;
        }

        for (int k = 0; k < Unknowns; k++)
        {
            for (int r = 0; r < Unknowns; r++)
            {
                if (r == k)
                {
                    continue;
                }

                double factor = m[r, k] / m[k, k];
                for (int c = k; c < Unknowns; c++)
                {
                    m[r, c] -= factor * m[k, c];
                }

                x[r] -= factor * x[k];
            }
        }

        for (int i = 0; i < Unknowns; i++)
        {
            x[i] /= m[i, i];
        }

        return x;
    }
}
