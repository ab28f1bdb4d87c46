using PoleField.Geometry;

namespace PoleField.Output.Maps;

/// <summary>The places of a field map: an upright rectangular grid, or a list of places.</summary>
/// <remarks>At least one place; on a rectangle y varies fastest.</remarks>
public sealed class MapGrid
{
    // Coordinates are rounded to this many digits of a metre, far below anything that can be built, so that files hold
    // 3.6 and not 3.5999999999999996.
    private const int Digits = 15;
    private readonly IReadOnlyList<Point>? _places;

    private MapGrid(Point from, Point step, (int Y, int Z) count, IReadOnlyList<Point>? places)
    {
        From = from;
        Step = step;
        CountY = count.Y;
        CountZ = count.Z;
        _places = places;
    }

    /// <summary>Most places of one map.</summary>
    public const int MostPlaces = 20_000_000;

    /// <summary>True for a rectangular grid.</summary>
    public bool IsRectangle => _places is null;

    /// <summary>First place, metres.</summary>
    public Point From { get; }

    /// <summary>Distances of neighbours along y and z, metres; zero for a list and along a direction with one place.</summary>
    public Point Step { get; }

    /// <summary>Places along y; all of them for a list.</summary>
    public int CountY { get; }

    /// <summary>Places along z; 1 for a list.</summary>
    public int CountZ { get; }

    /// <summary>Number of places.</summary>
    public int Count => CountY * CountZ;

    /// <summary>Place number <paramref name="index"/>, metres; y fastest.</summary>
    public Point this[int index] => _places is not null
        ? _places[index]
        : new Point(
            Math.Round(From.Y + (index % CountY * Step.Y), Digits),
            Math.Round(From.Z + (index / CountY * Step.Z), Digits));

    /// <summary>A grid from one corner to the other; the last place is at most at <paramref name="to"/>.</summary>
    /// <param name="from">Lower left corner, metres.</param>
    /// <param name="to">Upper right corner, metres; may equal <paramref name="from"/> along one or both directions.</param>
    /// <param name="step">Distance of neighbours along both directions, metres, &gt; 0.</param>
    /// <exception cref="InputException">Corners in the wrong order, a step that is not positive, or too many places.</exception>
    public static MapGrid Rectangle(Point from, Point to, double step)
    {
        if (!from.IsFinite || !to.IsFinite || !(to.Y >= from.Y) || !(to.Z >= from.Z))
        {
            throw Wrong(
                FormattableString.Invariant($"The map runs from ({1e3 * from.Y:g6}, {1e3 * from.Z:g6}) mm to ({1e3 * to.Y:g6}, {1e3 * to.Z:g6}) mm; 'to' must not lie left of or below 'from'."),
                "Exchange the corners.");
        }

        if (!(step > 0.0) || !double.IsFinite(step))
        {
            throw Wrong(FormattableString.Invariant($"The map's step is {1e3 * step:g6} mm; it must be above zero."), "Give a step such as \"0.05 mm\".");
        }

        const double rounding = 1e-9; // of a step, so that 'to' itself counts
        double countY = Math.Floor(((to.Y - from.Y) / step) + rounding) + 1;
        double countZ = Math.Floor(((to.Z - from.Z) / step) + rounding) + 1;
        if (countY * countZ > MostPlaces)
        {
            throw Wrong(
                FormattableString.Invariant($"The map would have {countY:g6} by {countZ:g6} places; at most {MostPlaces} are allowed."),
                "Take a larger step or a smaller rectangle.");
        }

        return new MapGrid(from, new Point(countY > 1 ? step : 0, countZ > 1 ? step : 0), ((int)countY, (int)countZ), null);
    }

    /// <summary>A list of places, metres.</summary>
    /// <exception cref="InputException">No places, or one that is not finite.</exception>
    public static MapGrid Places(IReadOnlyList<Point> places)
    {
        if (places.Count == 0 || places.Any(p => !p.IsFinite))
        {
            throw Wrong("The map's list of places is empty or holds a place that is not a number.", "Give at least one place.");
        }

        return new MapGrid(places[0], default, (places.Count, 1), places);
    }

    private static InputException Wrong(string text, string fix) => new([new Finding(Severity.Fault, "map-grid", text, fix)]);
}
