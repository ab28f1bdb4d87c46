using PoleField.Beam;

namespace PoleField.Cli.Text;

/// <summary>Tells what a beam does.</summary>
internal static class DeflectText
{
    private const string Modelled =
        "Moments follow |B| without spin flips; the field is the same all along the iron length and ends at its faces: fringes are not modelled.";

    public static Answer Of(FlightReport flight)
    {
        FlightSetup setup = flight.Setup;
        StateDeflection strongest = flight.Strongest;
        var beam = new AnswerTable(
            "Beam",
            ["quantity", ">value"],
            [
                ["species", setup.Species.Name],
                ["mass, u", Numbers.Significant(setup.Species.Mass / PhysicalConstants.AtomicMass, 6)],
                [$"moment of {strongest.Name}, muB", Numbers.Significant(strongest.Moment / PhysicalConstants.BohrMagneton)],
                ["speed, most probable, m/s", Numbers.Significant(setup.Speeds.MostProbable)],
                ["speed, mean, m/s", Numbers.Significant(setup.Speeds.Mean)],
                ["lever L(L/2 + D), m²", Numbers.Significant(setup.Lever)],
                ["its deflection at the most probable speed, mm", Height(strongest.AtMostProbable)],
                ["its deflection at the mean speed, mm", Height(strongest.AtMean)],
                ["splitting of the peaks, mm", Height(flight.Splitting)],
                ["clipped in the magnet", Numbers.Percent(flight.ClippedShare)],
            ]);
        var states = new AnswerTable(
            "States of the central particle",
            ["state", ">share", ">moment, muB", ">deflection at most probable speed, mm", ">at mean speed, mm"],
            [.. flight.States.Select(s => new[]
            {
                s.Name,
                Numbers.Percent(s.Share),
                Numbers.Significant(s.Moment / PhysicalConstants.BohrMagneton, 4),
                Height(s.AtMostProbable),
                Height(s.AtMean),
            })]);
        return new Answer("Deflection", [beam, states], Remarks(flight));
    }

    /// <summary>Caption of the pattern's picture.</summary>
    public static string Caption(FlightReport flight) =>
        $"{flight.Setup.Species.Name}, {Source(flight.Setup.Speeds)}; {Numbers.Percent(flight.ClippedShare)} of the beam is lost in the magnet. {Modelled}";

    private static string Source(SpeedDistribution speeds) => speeds.Temperature is { } t
        ? $"effusive source at {Numbers.Significant(t, 4)} K"
        : $"speed {Numbers.Significant(speeds.Mean, 4)} m/s";

    private static string Height(double? metres) => Cell.Of(metres, 1e3, 4);

    private static List<string> Remarks(FlightReport flight)
    {
        string from = $"y {Numbers.Millimetres(flight.RoomFrom.Y)}, z {Numbers.Millimetres(flight.RoomFrom.Z)}";
        string to = $"y {Numbers.Millimetres(flight.RoomTo.Y)}, z {Numbers.Millimetres(flight.RoomTo.Z)} mm";
        List<string> remarks =
        [
            Modelled,
            $"Particles are followed in the rectangle from {from} to {to}, which stays {Numbers.Millimetres(flight.Margin)} mm off all parts; "
                + "what leaves it inside the magnet counts as clipped.",
            "The beam fills the slit evenly and enters parallel; intensities count particles (flux), summed over y, and heights are from the beam's centre.",
            "Deflections go with 1/v²: an error of the speed counts twice, one of the gradient once.",
        ];
        remarks.AddRange(flight.Findings.Select(f => $"{f.Text} {f.Fix}"));
        return remarks;
    }
}
