using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Output.Maps;

/// <summary>How a value of a map was obtained.</summary>
public enum MapSource
{
    /// <summary>There is no value.</summary>
    None,

    /// <summary>The exactly harmonic field extracted around the aperture: field and gradient.</summary>
    Extraction,

    /// <summary>Differentiated in the finite element: the field, and in air its gradient.</summary>
    Element,
}

/// <summary>The field at one place of a map; not a number where there is none.</summary>
/// <param name="By">Flux density along y, T.</param>
/// <param name="Bz">Flux density along z, T.</param>
/// <param name="DByDz">∂By/∂z, T/m (in current-free air also ∂Bz/∂y).</param>
/// <param name="DBzDz">∂Bz/∂z = −∂By/∂y, T/m.</param>
/// <param name="Medium">"air" or the layer of the part; empty outside the model.</param>
/// <param name="Source">How it was obtained.</param>
public readonly record struct MapSample(double By, double Bz, double DByDz, double DBzDz, string Medium, MapSource Source)
{
    /// <summary>Name of everything that is not a part.</summary>
    public const string Air = "air";

    /// <summary>A place without a field.</summary>
    public static MapSample Nothing { get; } = new(double.NaN, double.NaN, double.NaN, double.NaN, "", MapSource.None);

    /// <summary>The word files use for a way of obtaining a value.</summary>
    public static string NameOf(MapSource source) => source switch
    {
        MapSource.Extraction => "extraction",
        MapSource.Element => "element",
        _ => "none",
    };

    /// <summary>|B|, T.</summary>
    public double Field => Math.Sqrt((By * By) + (Bz * Bz));

    /// <summary>d|B|/dy, T/m.</summary>
    public double DFieldDy => ((-By * DBzDz) + (Bz * DByDz)) / Field;

    /// <summary>d|B|/dz, T/m.</summary>
    public double DFieldDz => ((By * DByDz) + (Bz * DBzDz)) / Field;

    /// <summary>A value of the extracted field; in air.</summary>
    public static MapSample From(BeamValues values) =>
        new(values.By, values.Bz, values.DByDz, values.DBzDz, Air, MapSource.Extraction);

    /// <summary>A value of the finite elements; the gradient in air alone, where curl and divergence of B leave two numbers of it.</summary>
    /// <param name="sample">The sample; null outside the model.</param>
    /// <param name="mediumOf">Name of a region's medium.</param>
    /// <param name="slopes">Derivatives of B in the element; null where they are not known.</param>
    public static MapSample From(FieldSample? sample, Func<int, string> mediumOf, FieldSlopes? slopes = null)
    {
        if (sample is not { } s)
        {
            return Nothing;
        }

        string medium = mediumOf(s.Region);
        return slopes is { } d && medium == Air
            ? new(s.By, s.Bz, 0.5 * (d.DByDz + d.DBzDy), 0.5 * (d.DBzDz - d.DByDy), medium, MapSource.Element)
            : new(s.By, s.Bz, double.NaN, double.NaN, medium, MapSource.Element);
    }
}

/// <summary>Where a map comes from.</summary>
/// <param name="Title">Title of the case.</param>
/// <param name="CaseSha256">SHA-256 of the case file.</param>
/// <param name="SketchSha256">SHA-256 of the sketch.</param>
/// <param name="ProgramVersion">Version of the program.</param>
/// <param name="AccuracyReached">Largest relative error bar of field and gradient over the aperture.</param>
public sealed record MapProvenance(string Title, string CaseSha256, string SketchSha256, string ProgramVersion, double AccuracyReached);

/// <summary>The field at the places of a grid.</summary>
public sealed class FieldMap
{
    // Places nearer to the aperture's edge than this lie on it, metres; the extracted field holds there.
    private const double Rounding = 1e-9;

    private FieldMap(MapGrid grid, IReadOnlyList<MapSample> samples, MapProvenance provenance)
    {
        Grid = grid;
        Samples = samples;
        Provenance = provenance;
    }

    /// <summary>The places.</summary>
    public MapGrid Grid { get; }

    /// <summary>One value per place, in the grid's order.</summary>
    public IReadOnlyList<MapSample> Samples { get; }

    /// <summary>Where it comes from.</summary>
    public MapProvenance Provenance { get; }

    /// <summary>The field of a solved magnet: extracted inside the aperture, from the elements elsewhere.</summary>
    public static Func<Point, MapSample> FieldOf(SolvedMagnet solved)
    {
        Outline aperture = solved.Field.Aperture.Outline;
        CrossSection section = solved.Solution.Magnet.Section;
        Box near = aperture.Bounds.Inflated(Rounding);
        return p => near.Contains(p) && (aperture.Contains(p) || aperture.Curves.Min(c => c.DistanceTo(p)) <= Rounding)
            ? MapSample.From(solved.Field.At(p))
            : MapSample.From(solved.Solution.At(p), MediumOf, solved.Solution.SlopesAt(p));

        string MediumOf(int region)
        {
            int part = region >= 0 ? section.Regions[region].Part : -1;
            return part >= 0 ? section.Parts[part] : MapSample.Air;
        }
    }

    /// <summary>Evaluates the field at every place; the map does not depend on the number of threads.</summary>
    public static FieldMap Sample(
        MapGrid grid, Func<Point, MapSample> field, MapProvenance provenance, ParallelOptions? threads = null)
    {
        MapSample[] samples = new MapSample[grid.Count];
        Parallel.For(0, samples.Length, threads ?? new ParallelOptions { MaxDegreeOfParallelism = 1 }, i => samples[i] = field(grid[i]));
        return new FieldMap(grid, samples, provenance);
    }
}
