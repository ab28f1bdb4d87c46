using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>Charges and dipoles at the band's quadrature points whose field is the beam's: exactly harmonic.</summary>
internal sealed class BandSources
{
    private readonly double[] _y;       // places of the points, metres
    private readonly double[] _z;
    private readonly double[] _charge;  // weight·∇A·∇χ there
    private readonly double[] _dipoleY; // weight·A·∂yχ there
    private readonly double[] _dipoleZ; // weight·A·∂zχ there

    public BandSources(double[] y, double[] z, double[] charge, double[] dipoleY, double[] dipoleZ)
    {
        _y = y;
        _z = z;
        _charge = charge;
        _dipoleY = dipoleY;
        _dipoleZ = dipoleZ;
    }

    /// <summary>Values at a place inside the band.</summary>
    public BeamValues At(Point p)
    {
        // F′ = −(1/2π) Σ (a/d + b/d²), F″ = −(1/2π) Σ (a/d² + 2b/d³), a the charge, b the complex dipole, d = ζ − ζ₀.
        int width = Vector<double>.Count;
        Vector<double> re1 = Vector<double>.Zero, im1 = re1, re2 = re1, im2 = re1;
        var y0 = new Vector<double>(p.Y);
        var z0 = new Vector<double>(p.Z);
        int q = 0;
        for (; q + width <= _y.Length; q += width)
        {
            Vector<double> dy = new Vector<double>(_y, q) - y0;
            Vector<double> dz = new Vector<double>(_z, q) - z0;
            Vector<double> inverse = Vector<double>.One / ((dy * dy) + (dz * dz));
            Vector<double> ur = dy * inverse;      // 1/d
            Vector<double> ui = -dz * inverse;
            Vector<double> a = new(_charge, q);
            Vector<double> br = new(_dipoleY, q);
            Vector<double> bi = new(_dipoleZ, q);
            Vector<double> tr = (br * ur) - (bi * ui);   // b/d
            Vector<double> ti = (br * ui) + (bi * ur);
            Vector<double> sr = a + tr;                  // a + b/d
            re1 += (sr * ur) - (ti * ui);
            im1 += (sr * ui) + (ti * ur);
            Vector<double> vr = (ur * ur) - (ui * ui);   // 1/d²
            Vector<double> vi = (ur * ui) + (ur * ui);
            Vector<double> wr = sr + tr;                 // a + 2b/d
            Vector<double> wi = ti + ti;
            re2 += (wr * vr) - (wi * vi);
            im2 += (wr * vi) + (wi * vr);
        }

        double first = Vector.Sum(re1), firstI = Vector.Sum(im1), second = Vector.Sum(re2), secondI = Vector.Sum(im2);
        for (; q < _y.Length; q++)
        {
            Complex u = 1.0 / new Complex(_y[q] - p.Y, _z[q] - p.Z);
            var b = new Complex(_dipoleY[q], _dipoleZ[q]);
            Complex f1 = (_charge[q] + (b * u)) * u;
            Complex f2 = (_charge[q] + (2 * b * u)) * u * u;
            first += f1.Real;
            firstI += f1.Imaginary;
            second += f2.Real;
            secondI += f2.Imaginary;
        }

        const double scale = -1.0 / Math.Tau;
        return new BeamValues(p, -scale * firstI, -scale * first, -scale * second, scale * secondI);
    }
}
