namespace PoleField.Beam;

/// <summary>
/// Moments of the hyperfine states of a J = ½ atom (Breit and Rabi 1931; Ramsey, Molecular Beams, 1956, recalled from
/// memory) without the nuclear term, which is below a thousandth:
/// μ/μB = ∓(g_J/2) (x + 2m/(2I+1)) / √(1 + 4mx/(2I+1) + x²), x = B/B_c, upper sign for F = I + ½.
/// </summary>
internal static class BreitRabi
{
    public static IReadOnlyList<MomentState> States(Atom atom)
    {
        double spin = atom.NuclearSpin;
        int count = (int)Math.Round(2 * ((2 * spin) + 1));
        var states = new List<MomentState>();
        for (double m = -(spin + 0.5); m <= spin + 0.5; m++)
        {
            states.Add(State(atom, upper: true, m, count));
        }

        for (double m = -(spin - 0.5); m <= spin - 0.5; m++)
        {
            states.Add(State(atom, upper: false, m, count));
        }

        return states;
    }

    private static MomentState State(Atom atom, bool upper, double m, int count)
    {
        string name = FormattableString.Invariant($"F = {atom.NuclearSpin + (upper ? 0.5 : -0.5):0.#}, m = {m:0.#}");
        double full = 0.5 * atom.ElectronG * PhysicalConstants.BohrMagneton;
        double slope = 2 * m / ((2 * atom.NuclearSpin) + 1);
        if (Math.Abs(slope) == 1.0)
        {
            // Stretched states have the electron's whole moment in any field.
            return new MomentState(name, 1.0 / count, _ => -slope * full);
        }

        double sign = upper ? -full : full;
        double critical = atom.CriticalField;
        return new MomentState(name, 1.0 / count, field =>
        {
            double x = field / critical;
            return sign * (x + slope) / Math.Sqrt(1 + (2 * slope * x) + (x * x));
        });
    }
}
