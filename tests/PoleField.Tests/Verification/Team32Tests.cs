// Truth: measurement. Three-limb core of Fe-Si sheet with 2 × 90 turns on its outer limbs: peak flux density in the centre
// limb 1.281 and −1.289 T at ±1.155 A (Bottauscio, Chiampi, Ragusa, Rege, Repetto, "Description of TEAM Problem 32", case 1
// and the measurements published with it). At 10 Hz field and current peak together, so a static solve with the curve through
// the tips of the measured loops is legitimate.
using System.Text;
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class Team32Tests(VerificationRecord record)
{
    private const double Measured = 0.5 * (1.281 + 1.289);
    private const double Turns = 90 * 1.155;

    private static readonly VerificationCase Case = new(
        "Three-limb core of Fe-Si sheet, measured",
        "TEAM problem 32, case 1: 1.281 and −1.289 T in the centre limb at ±1.155 A in 2 × 90 turns; curves through the tips of the loops measured along and across the rolling direction. "
        + "The aim of 2 to 3 % is just missed. What a plane, isotropic model leaves open, all by the published facts: the sheet's direction (all along 1.352 T, all across 1.236 T: the measurement lies between), "
        + "the drawing's height (its limbs and windows add up to 180 mm, its outer size says 175 mm: 0.8 % more), the grain in the joints (limbs drawn through the yokes: 1.1 % more), and the leakage of a stack 2.4 mm thick "
        + "into space, which the plane model lacks. It would take 10 % fewer ampere-turns to make 1.285 T of it.");

    // Tips of the measured symmetric loops, A/m and T.
    private const string Rolling = """
        # Js_T: 2.01 (3.2 % silicon, handbook value recalled from memory)
        H_A_per_m,B_T
        0,0
        42.9013,0.15068
        51.4518,0.249113
        73.9502,0.499825
        108.958,0.750665
        202.746,1.01556
        251.765,1.09531
        348.401,1.20084
        492.594,1.30054
        727.547,1.39697
        906.266,1.45102
        1232.82,1.50145
        5441.59,1.68219
        """;

    private const string Transverse = """
        # Js_T: 2.01 (3.2 % silicon, handbook value recalled from memory)
        H_A_per_m,B_T
        0,0
        61.743,0.165268
        76.3785,0.27368
        118.53,0.547357
        182.232,0.821358
        359.486,1.11448
        476.052,1.20422
        722.449,1.31374
        1284.38,1.42335
        2609.69,1.53263
        5549.35,1.64288
        """;

    [Fact]
    public void CentreLimbAgreesWithTheMeasurementAsFarAsTheGrainIsKnown()
    {
        Material along = Curve(Rolling), across = Curve(Transverse);

        double found = CentreLimb(along, across, window: 120);
        double most = CentreLimb(along, along, window: 120);
        double least = CentreLimb(across, across, window: 120);

        Allowed grain = Allowed.Relative(0.5 * (most - least) / Measured, "half the span from all along to all across");
        record.Check(Case, "centre limb, limbs along and yokes across the rolling direction, T", Measured, found, grain);
        record.Check(Case, "where the measurement lies from all across (0) to all along (1)", 0.5, (Measured - least) / (most - least), Allowed.Absolute(0.5, "between the two"));
        record.Check(Case, "centre limb at the drawing's other height, 175 mm, T", Measured, CentreLimb(along, across, window: 115), grain);
    }

    private static Material Curve(string csv) => MaterialFile.Read(new MemoryStream(Encoding.UTF8.GetBytes(csv)), "sheet.csv");

    // Outer width 174.5 mm, limbs and yokes 30 mm wide, windows 42.25 mm wide.
    private static double CentreLimb(Material limbs, Material yokes, double window)
    {
        double yokeAt = (window / 2) + 15;
        var drawn = new Drawn()
            .Rectangle("YOKES", 0, yokeAt, 174.5, 30).Rectangle("YOKES", 0, -yokeAt, 174.5, 30)
            .Rectangle("LIMBS", 0, 0, 30, window).Rectangle("LIMBS", 72.25, 0, 30, window).Rectangle("LIMBS", -72.25, 0, 30, window)
            .Rectangle("OUT RIGHT", 91.25, 0, 4, 100).Rectangle("IN RIGHT", 53.25, 0, 4, 100)
            .Rectangle("OUT LEFT", -91.25, 0, 4, 100).Rectangle("IN LEFT", -53.25, 0, 4, 100)
            .Part("YOKES", yokes).Part("LIMBS", limbs)
            .Part("OUT RIGHT", Material.Air, Turns).Part("IN RIGHT", Material.Air, -Turns)
            .Part("OUT LEFT", Material.Air, -Turns).Part("IN LEFT", Material.Air, Turns);
        FieldSolution solution = MagnetSolver.Solve(drawn.Magnet(), Drawn.Beam(33, 0, 10, 10)).Solution;
        double right = solution.At(new Point(0.015, 0))!.Value.Potential;
        double left = solution.At(new Point(-0.015, 0))!.Value.Potential;
        return Math.Abs(right - left) / 0.030;
    }
}
