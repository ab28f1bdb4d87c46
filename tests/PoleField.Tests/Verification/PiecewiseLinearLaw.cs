using PoleField.Materials;

namespace PoleField.Tests.Verification;

/// <summary>
/// The library's table of mild steel (TEAM 20) joined by straight lines, slope μ0 beyond its last row: the law for which the
/// published values of the nonlinear closed forms are printed.
/// </summary>
internal sealed class PiecewiseLinearLaw : MagneticLaw
{
    private readonly BhRow[] _rows;
    private readonly double[] _energy; // at each row

    private PiecewiseLinearLaw(IReadOnlyList<BhRow> rows)
    {
        _rows = [.. rows];
        _energy = new double[_rows.Length];
        for (int k = 1; k < _rows.Length; k++)
        {
            _energy[k] = _energy[k - 1]
                + (0.5 * (_rows[k].FieldStrength + _rows[k - 1].FieldStrength) * (_rows[k].FluxDensity - _rows[k - 1].FluxDensity));
        }
    }

    public static Material MildSteel { get; } = new(
        "mild steel, straight lines", new PiecewiseLinearLaw(((BhCurve)MaterialLibrary.Get("mild-steel").Law).Nodes), "", "", "");

    public override bool IsLinear => false;

    public override double InitialReluctivity => _rows[1].FieldStrength / _rows[1].FluxDensity;

    public override double SaturationPolarisation => _rows[^1].Polarisation;

    public override MagneticState At(double b)
    {
        int k = Math.Max(0, Array.FindLastIndex(_rows, r => r.FluxDensity <= b));
        double slope = k + 1 < _rows.Length
            ? (_rows[k + 1].FieldStrength - _rows[k].FieldStrength) / (_rows[k + 1].FluxDensity - _rows[k].FluxDensity)
            : PhysicalConstants.Nu0;
        double x = b - _rows[k].FluxDensity;
        double h = _rows[k].FieldStrength + (slope * x);
        return new MagneticState(h, slope, _energy[k] + (0.5 * x * (_rows[k].FieldStrength + h)));
    }
}
