namespace PoleField;

/// <summary>Constants of nature, CODATA 2022.</summary>
public static class PhysicalConstants
{
    /// <summary>Magnetic constant, H/m (CODATA 2022: 1.256 637 061 27(20)e-6).</summary>
    public const double Mu0 = 1.25663706127e-6;

    /// <summary>Reluctivity of vacuum 1/μ0, m/H.</summary>
    public const double Nu0 = 1.0 / Mu0;

    /// <summary>Bohr magneton, J/T (CODATA 2022: 9.274 010 0657(29)e-24).</summary>
    public const double BohrMagneton = 9.2740100657e-24;

    /// <summary>Atomic mass constant, kg (CODATA 2022: 1.660 539 068 92(52)e-27).</summary>
    public const double AtomicMass = 1.66053906892e-27;

    /// <summary>Boltzmann constant, J/K (exact).</summary>
    public const double Boltzmann = 1.380649e-23;

    /// <summary>Planck constant, J s (exact).</summary>
    public const double Planck = 6.62607015e-34;
}
