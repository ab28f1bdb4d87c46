using System.Numerics;

namespace PoleField.Drawing;

/// <summary>
/// Faces along equipotentials of the field whose gradient is flat in both directions at the beam. In a current-free cross-section
/// B_z − i B_y is an analytic function of s = z + i y, hence ln B harmonic: with ln B = Re(α s + β s²/2 + γ s³/6) one has G = α B,
/// d ln G/dz = α + β/α and G(y)/G(0) = 1 − (β + γ/α) y²/2, so β = −α², γ = α³ makes both vanish, α = −1/R. Lengths in mm.
/// </summary>
public sealed record FlatGradientPair : EquipotentialPair
{
    // Beyond this multiple of R the field has grown several times and the ridge's equipotential turns back up.
    private const double LongestReachInR = 1.7;

    // Nearer to the plane of vanishing field than this the groove would be a slit.
    private const double HighestGrooveInR = 1.5;

    /// <inheritdoc/>
    public override string Name => "flat-gradient";

    /// <inheritdoc/>
    public override string Description => "faces that make the gradient flat along both directions; for wide beams";

    private protected override double HighestGroove => HighestGrooveInR * FieldOverGradient;

    private protected override double LongestReach => LongestReachInR * FieldOverGradient;

    private protected override WantedField Field() => new FlatGradientField(FieldOverGradient);
}

/// <summary>B_z − i B_y = exp(−(t + t²/2 + t³/6)), t = (z + i y)/R.</summary>
internal sealed class FlatGradientField(double scale) : WantedField
{
    // The series of an entire function; for |t| ≤ 2.5 its terms are below 1e-20 of the sum after ninety.
    private const int Terms = 90;

    // Along y, in R: the equipotential moves by less than itself over it, so Newton's method keeps to its branch.
    private const double Step = 0.1;

    // f' = −(1 + t + t²/2) f gives the coefficients of f one after the other.
    private static readonly double[] Coefficients = Build();

    public override double PotentialOnAxis(double z) => scale * Potential(new Complex(z / scale, 0)).Real;

    public override Func<double, FacePoint> Equipotential(double apex, double reach)
    {
        // Solved once in short steps from the apex outwards, then anywhere from the step before.
        double wanted = Potential(new Complex(apex / scale, 0)).Real;
        double[] heights = new double[1 + (int)Math.Ceiling(reach / scale / Step)];
        heights[0] = apex / scale;
        for (int i = 1; i < heights.Length; i++)
        {
            heights[i] = Solve(heights[i - 1], i * Step, wanted);
        }

        return y =>
        {
            double at = y / scale;
            Complex t = new(Solve(heights[Math.Min((int)(at / Step), heights.Length - 1)], at, wanted), at);
            Complex f = Field(t);
            return FacePoint.Above(y, scale * t.Real, f.Imaginary / f.Real);
        };
    }

    /// <summary>f(t): real part B_z, negative imaginary part B_y.</summary>
    internal static Complex Field(Complex t) => Complex.Exp(-t * (1 + (t * (0.5 + (t / 6)))));

    /// <summary>∫₀ᵗ f dt; its real part is constant on equipotentials.</summary>
    internal static Complex Potential(Complex t)
    {
        Complex sum = Complex.Zero;
        for (int n = Terms; n >= 0; n--)
        {
            sum = (sum * t) + (Coefficients[n] / (n + 1));
        }

        return sum * t;
    }

    // Newton in z: the potential rises with z wherever B_z > 0.
    private static double Solve(double z, double y, double wanted)
    {
        const int mostSteps = 30;
        double change;
        int count = 0;
        do
        {
            Complex t = new(z, y);
            change = (Potential(t).Real - wanted) / Field(t).Real;
            z -= change;
            count++;
        }
        while (Math.Abs(change) > 1e-14 && count < mostSteps);

        return Math.Abs(change) <= 1e-12
            ? z
            : throw new InvalidOperationException(FormattableString.Invariant($"The equipotential was lost at y = {y} R."));
    }

    private static double[] Build()
    {
        double[] c = new double[Terms + 1];
        c[0] = 1;
        for (int n = 0; n < Terms; n++)
        {
            double sum = c[n] + (n > 0 ? c[n - 1] : 0) + (n > 1 ? c[n - 2] / 2 : 0);
            c[n + 1] = -sum / (n + 1);
        }

        return c;
    }
}
