using PoleField.Geometry;
using PoleField.Numerics;

namespace PoleField.Beam;

/// <summary>
/// Flies a beam through the computed field: fixed quadrature over slit, speeds and states, no random numbers. The moment
/// follows the field adiabatically; the field is the same all along the magnet and ends at its faces.
/// </summary>
public sealed class Flight
{
    private const int PointsAcross = 5;
    private const int Strips = 15;
    private const int PiecesPerCell = 6;
    private const int EdgeSearch = 12;         // halvings to find the speed at which particles begin to be lost
    private const double LargestTableError = 1e-4;

    private readonly FlightSetup _setup;
    private readonly FlightField _field;
    private readonly Trajectory _trajectory;
    private readonly Point _centre;
    private readonly double _height;
    private readonly double _width;

    private Flight(FlightField field, Box beam, Point centre, FlightSetup setup)
    {
        _setup = setup;
        _field = field;
        _centre = centre;
        _width = setup.SlitWidth ?? beam.Width;
        _height = setup.SlitHeight ?? beam.Height;
        _trajectory = new Trajectory(field, setup.Species.Mass, setup.Length, setup.Drift);
    }

    /// <summary>Flies a beam through a solved magnet.</summary>
    /// <param name="solved">The magnet.</param>
    /// <param name="setup">The beam.</param>
    /// <param name="options">For the field around the aperture, which may take one more solve.</param>
    /// <param name="progress">Called at each step of that solve.</param>
    /// <param name="cancellation">Checked on the way.</param>
    /// <exception cref="InputException">The rectangle around the aperture does not lie in air.</exception>
    public static FlightReport Through(
        SolvedMagnet solved,
        FlightSetup setup,
        SolveOptions? options = null,
        Action<SolveProgress>? progress = null,
        CancellationToken cancellation = default)
    {
        options ??= new SolveOptions();
        FlightRoom room = FlightRoom.In(solved, new RunSettings(options, progress, cancellation));
        Aperture aperture = solved.Field.Aperture;
        FlightReport report = Through(room.Field, aperture.Outline.Bounds, aperture.Centre, setup, options.Threads, cancellation);
        return report with { Margin = room.Margin, Findings = room.WhyApertureOnly is { } why ? [.. report.Findings, Narrow(why)] : report.Findings };
    }

    internal static FlightReport Through(
        FlightField field, Box beam, Point centre, FlightSetup setup, int threads = 1, CancellationToken cancellation = default) =>
        new Flight(field, beam, centre, setup).Run(threads, cancellation);

    private FlightReport Run(int threads, CancellationToken cancellation)
    {
        (Point At, double Share)[] slit = SlitPoints();
        var bundles = new List<RayBundle>[slit.Length];
        var parallel = new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads), CancellationToken = cancellation };
        Parallel.For(0, slit.Length, parallel, i => bundles[i] = From(slit[i].At, slit[i].Share));
        RayBundle[] all = [.. bundles.SelectMany(b => b)];
        double reach = DetectorPattern.Reach(all, _height);
        double[] places = DetectorPattern.Places(reach);
        double[] pulled = DetectorPattern.Intensity(all.Where(b => b.Pull > 0), reach);
        double[] pushed = DetectorPattern.Intensity(all.Where(b => b.Pull < 0), reach);
        double[] off = DetectorPattern.Intensity([new RayBundle(0, 0, _height, 1, 0)], reach);
        return new FlightReport
        {
            Setup = _setup,
            States = [.. _setup.Species.States.Select(Central)],
            Splitting = DetectorPattern.Peak(places, pulled) is { } a && DetectorPattern.Peak(places, pushed) is { } b
                ? Math.Abs(a - b)
                : null,
            ClippedShare = Math.Max(0, 1 - all.Sum(b => b.Share)),
            Pattern = [.. places.Select((z, i) => new PatternPoint(z, pulled[i] + pushed[i], off[i]))],
            RoomFrom = _field.Room.Min,
            RoomTo = _field.Room.Max,
            Margin = 0,
            Findings = _field.Error <= LargestTableError ? [] : [Rough()],
        };
    }

    private static Finding Narrow(string why) => new(
        Severity.Warning,
        "flight-room",
        $"Particles could be followed inside the aperture only ({why.TrimEnd('.')}); those that leave it count as clipped though they may pass.",
        "Draw a larger aperture, and give the beam's own size as slit in [flight].");

    private Finding Rough() => new(
        Severity.Warning,
        "flight-field",
        FormattableString.Invariant($"The field along the trajectories is known to about {_field.Error:g1} of its size only."),
        "Give the aperture more clearance, or ask for a finer accuracy.");

    private (Point At, double Share)[] SlitPoints()
    {
        GaussRule across = GaussRule.Legendre(PointsAcross);
        var points = new List<(Point, double)>();
        for (int j = 0; j < Strips; j++)
        {
            double z = _centre.Z + (_height * (((j + 0.5) / Strips) - 0.5));
            for (int i = 0; i < PointsAcross; i++)
            {
                points.Add((new Point(_centre.Y + (_width * (across.Nodes[i] - 0.5)), z), across.Weights[i] / Strips));
            }
        }

        return [.. points];
    }

    private StateDeflection Central(MomentState state)
    {
        SpeedDistribution speeds = _setup.Speeds;
        return new StateDeflection(
            state.Name,
            state.Share,
            state.Moment(_field.At(_centre).Field),
            _trajectory.At(_centre, speeds.MostProbable, state.Moment)?.Z - _centre.Z,
            _trajectory.At(_centre, speeds.Mean, state.Moment)?.Z - _centre.Z);
    }

    private List<RayBundle> From(Point entrance, double share)
    {
        var bundles = new List<RayBundle>();
        double field = _field.At(_centre).Field;
        foreach (MomentState state in _setup.Species.States)
        {
            int pull = Math.Sign(state.Moment(field));
            AddState(bundles, entrance, state, (share * state.Share, pull == 0 ? 1 : pull));
        }

        return bundles;
    }

    // From fast to slow: once a speed is lost, all slower ones are.
    private void AddState(List<RayBundle> bundles, Point entrance, MomentState state, (double Share, int Pull) of)
    {
        double[] edges = _setup.Speeds.Edges;
        double fast = edges[^1];
        if (Height(entrance, fast, state) is not { } high)
        {
            return;
        }

        for (int k = edges.Length - 2; k >= 0; k--)
        {
            double slow = edges[k];
            double? low = Height(entrance, slow, state);
            bool last = low is null;
            if (last)
            {
                (slow, low) = Slowest(entrance, state, slow, fast, high);
            }

            AddCell(bundles, (slow, low!.Value), (fast, high), of);
            (fast, high) = (slow, low.Value);
            if (last)
            {
                return;
            }
        }
    }

    // Heights go nearly straight with 1/v², which makes the intensity within a cell smooth without more trajectories.
    private void AddCell(
        List<RayBundle> bundles, (double Speed, double Height) slow, (double Speed, double Height) fast, (double Share, int Pull) of)
    {
        double strip = _height / Strips;
        if (slow.Speed == fast.Speed)
        {
            bundles.Add(new RayBundle(slow.Height, slow.Height, strip, of.Share * _setup.Speeds.Share(slow.Speed, fast.Speed), of.Pull));
            return;
        }

        double slowest = 1 / (slow.Speed * slow.Speed);
        double range = (1 / (fast.Speed * fast.Speed)) - slowest;
        (double Speed, double Height) last = slow;
        for (int i = 1; i <= PiecesPerCell; i++)
        {
            double t = (double)i / PiecesPerCell;
            double speed = i == PiecesPerCell ? fast.Speed : 1 / Math.Sqrt(slowest + (t * range));
            double height = slow.Height + (t * (fast.Height - slow.Height));
            double share = of.Share * _setup.Speeds.Share(last.Speed, speed);
            bundles.Add(new RayBundle(Math.Min(last.Height, height), Math.Max(last.Height, height), strip, share, of.Pull));
            last = (speed, height);
        }
    }

    private (double Speed, double Height) Slowest(Point entrance, MomentState state, double lost, double arrives, double height)
    {
        for (int k = 0; k < EdgeSearch; k++)
        {
            double middle = 0.5 * (lost + arrives);
            if (Height(entrance, middle, state) is { } z)
            {
                (arrives, height) = (middle, z);
            }
            else
            {
                lost = middle;
            }
        }

        return (arrives, height);
    }

    private double? Height(Point entrance, double speed, MomentState state) =>
        _trajectory.At(entrance, speed, state.Moment)?.Z - _centre.Z;
}
