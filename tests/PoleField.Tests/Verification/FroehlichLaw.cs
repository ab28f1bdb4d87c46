using PoleField.Materials;

namespace PoleField.Tests.Verification;

/// <summary>
/// Frölich's law B = μ0 H + Js H/(a + H) with a = Js/(μ0 (μi − 1)), and μ0 = 4π·10⁻⁷ as the reference problem states (the
/// library's μ0 differs in the ninth digit, which no check here can see).
/// </summary>
internal sealed class FroehlichLaw(double saturation, double initialPermeability) : MagneticLaw
{
    private const double Mu0 = PhysicalConstants.Mu0;
    private readonly double _a = saturation / (Mu0 * (initialPermeability - 1));

    public override bool IsLinear => false;

    public override double InitialReluctivity => 1 / (Mu0 * initialPermeability);

    public override double SaturationPolarisation => saturation;

    public override MagneticState At(double b)
    {
        // μ0 H² + (μ0 a + Js − B) H − a B = 0; the root in the form that loses no digits for either sign of p.
        double p = (Mu0 * _a) + saturation - b;
        double root = Math.Sqrt((p * p) + (4 * Mu0 * _a * b));
        double h = p > 0 ? 2 * _a * b / (p + root) : (root - p) / (2 * Mu0);
        double slope = 1 / (Mu0 + (saturation * _a / ((_a + h) * (_a + h))));
        double coEnergy = (0.5 * Mu0 * h * h) + (saturation * (h - (_a * Math.Log(1 + (h / _a)))));
        return new MagneticState(h, slope, (h * b) - coEnergy);
    }
}
