using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>Flux density, saturation and currents part by part.</summary>
internal static class PartReports
{
    private const double SaturatedFrom = 0.9;   // of the saturation polarisation
    private const double HighShare = 0.99;
    private const int PointsPerDirection = 3;

    public static IReadOnlyList<PartReport> Of(FieldSolution solution)
    {
        CrossSection section = solution.Magnet.Section;
        List<Visit>[] visits = Collect(solution);
        double? turnsPerProduct = TurnsPerFieldProduct(solution);
        var reports = new List<PartReport>();
        for (int part = 0; part < section.Parts.Count; part++)
        {
            PartForce force = ForceReports.Of(solution, part);
            reports.Add(Report(solution.Magnet, part, visits[part]) with
            {
                ForcePerMetre = force.PerMetre,
                ForceOtherWay = force.OtherWay,
                ForceOnFreeFacesOnly = force.OnFreeFacesOnly,
                MmfDrop = solution.Magnet.Roles[part].Material.IsMagnetic
                    ? turnsPerProduct * visits[part].Sum(v => v.Area * v.FieldProduct)
                    : null,
            });
        }

        return reports;
    }

    // Driving ampere-turns over ∫ H·B dS of all space, which equals ∫ J A dS; null where currents are not the only source.
    private static double? TurnsPerFieldProduct(FieldSolution solution)
    {
        double driving = Circuit.DrivingAmpereTurns(solution.Magnet);
        bool currentsOnly = !Circuit.HasEnergyAtInfinity(solution.Problem) && solution.Magnet.Roles.All(r => r.Remanence == default);
        return currentsOnly && driving > 0 ? driving / Circuit.Energies(solution).Linkage : null;
    }

    private static PartReport Report(Magnet magnet, int part, List<Visit> visits)
    {
        PartRole role = magnet.Roles[part];
        Region[] regions = [.. magnet.Section.Regions.Where(r => r.Part == part)];
        double area = regions.Sum(r => r.Area);
        var report = new PartReport
        {
            Layer = role.Layer,
            Kind = role.Kind,
            Material = role.Material.Name,
            Area = area,
            Outlines = regions.Length,
        };
        if (role.AmpereTurns != 0.0 && regions.Length > 0)
        {
            double perOutline = area / regions.Length;
            report = report with
            {
                AmpereTurns = role.AmpereTurns,
                CurrentDensity = role.AmpereTurns / (perOutline * (role.Fill ?? 1.0)),
            };
        }

        return role.Material.IsMagnetic || role.Remanence != default ? WithFlux(report, role, visits) : report;
    }

    private static PartReport WithFlux(PartReport report, PartRole role, List<Visit> visits)
    {
        if (visits.Count == 0)
        {
            return report;
        }

        Visit highest = visits.MaxBy(v => v.Field);
        double total = visits.Sum(v => v.Area);
        double saturation = role.Material.Law.SaturationPolarisation;
        double saturated = visits.Where(v => v.Polarisation > SaturatedFrom * saturation).Sum(v => v.Area);
        visits.Sort((a, b) => a.Field.CompareTo(b.Field));
        double below = 0;
        double p99 = highest.Field;
        foreach (Visit v in visits)
        {
            below += v.Area;
            if (below >= HighShare * total)
            {
                p99 = v.Field;
                break;
            }
        }

        return report with
        {
            FieldMax = highest.Field,
            FieldMaxAt = highest.At,
            FieldP99 = p99,
            SaturatedShare = double.IsFinite(saturation) ? saturated / total : null,
        };
    }

    private static List<Visit>[] Collect(FieldSolution solution)
    {
        CrossSection section = solution.Magnet.Section;
        var visits = new List<Visit>[section.Parts.Count];
        for (int part = 0; part < visits.Length; part++)
        {
            visits[part] = [];
        }

        FiniteElementSpace space = solution.Problem.Space;
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(PointsPerDirection));
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            if (region == Mesh.Exterior || section.Regions[region].Part < 0)
            {
                continue;
            }

            int part = section.Regions[region].Part;
            PartRole role = solution.Magnet.Roles[part];
            if (!role.Material.IsMagnetic && role.Remanence == default)
            {
                continue;
            }

            for (int q = 0; q < table.Count; q++)
            {
                FieldSample s = solution.Sample(e, table.Quadrature.Xi[q], table.Quadrature.Eta[q]);
                double area = table.Quadrature.Weights[q] * space.JacobianAt(e, table.XiRow(q), table.EtaRow(q)).Determinant;
                Point at = space.PlaceAt(e, table.ValueRow(q));
                visits[part].Add(new Visit(at, area, s.Magnitude, s.FieldStrength));
            }
        }

        return visits;
    }

    private readonly record struct Visit(Point At, double Area, double Field, double FieldStrength)
    {
        public double Polarisation => Field - (PhysicalConstants.Mu0 * FieldStrength);

        public double FieldProduct => Field * FieldStrength;
    }
}
