using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield deflect CASE.toml</c>: deflection and pattern of a beam species at the detector.</summary>
internal static class DeflectStep
{
    public static AnalysisStep Create() => new("deflect", "Deflection and pattern of a beam species at the detector.")
    {
        Examples =
        [
            ("polefield deflect magnet.toml", "flies the beam of [flight], prints deflections and splitting, writes magnet.deflect.json"),
            ("polefield deflect magnet.toml --json | jq .flight.splitting_mm", "one number for programs"),
        ],
        Endings = _ => [".deflect.json"],
        Pictures = [DeflectionFigure.Name],
        Needs = (file, _) => Missing(file),
        IsInReport = file => Missing(file).Count == 0,
        Run = request =>
        {
            FlightReport flight = Fly(request);
            return new Analysis(DeflectText.Of(flight), [s => AnalysisJson.Write(ResultOutput.HeadOf(request.Solved), flight, s)])
            {
                Pictures = [new ReportPicture(DeflectionFigure.Draw(flight, DeflectText.Caption(flight)))],
            };
        },
    };

    private static List<Finding> Missing(CaseFile file)
    {
        var faults = new List<Finding>();
        if (file.Flight is null)
        {
            faults.Add(new Finding(
                Severity.Fault,
                "missing-table",
                "The case has no [flight], so there is no beam to fly.",
                $"Add [flight] with species (built in: {string.Join(", ", Atom.All.Select(a => a.Name))}), source and drift."));
        }

        if (file.Length is null)
        {
            faults.Add(new Finding(
                Severity.Fault, "missing-key", "The case states no length of the magnet.", "Add length under [magnet], such as \"70 mm\"."));
        }

        return faults;
    }

    private static FlightReport Fly(AnalysisRequest request)
    {
        CaseFile file = request.Solved.Case.Case!;
        FlightSection flight = file.Flight!;
        Species species = SpeciesOf(flight.Species);
        var setup = new FlightSetup
        {
            Species = species,
            Speeds = SpeedsOf(flight.Source, species.Mass),
            Length = file.Length!.Value,
            Drift = flight.Drift,
            SlitWidth = flight.SlitWidth,
            SlitHeight = flight.SlitHeight,
        };
        return Flight.Through(request.Solved.Solved, setup, request.Options, request.Progress, request.Cancellation);
    }

    // The reader has checked that a name is known, and that without one mass and moment are there.
    private static Species SpeciesOf(FlightSpecies section) => section switch
    {
        { Name: { } name } => Atom.Find(name)!.ToSpecies(),
        { RelaxedAt: { } temperature } => Species.Relaxed(section.Mass!.Value, section.Moment!.Value, temperature),
        _ => Species.WithFixedMoment(section.Mass!.Value, section.Moment!.Value),
    };

    private static SpeedDistribution SpeedsOf(FlightSource source, double mass) => source.Temperature is { } temperature
        ? SpeedDistribution.Effusive(temperature, mass)
        : SpeedDistribution.Narrow(source.Speed!.Value, source.Width ?? 0);
}
