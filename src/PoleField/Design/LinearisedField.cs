using PoleField.Beam;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>A solved field with all that its derivatives are made of.</summary>
/// <param name="Solution">The field.</param>
/// <param name="Tangent">Factored tangent there.</param>
/// <param name="Extraction">Extraction of the beam's field.</param>
/// <param name="Chi">Its cut-off by node.</param>
/// <param name="Field">The beam's field.</param>
internal sealed record LinearisedField(
    FieldSolution Solution, TangentSystem Tangent, BeamExtraction Extraction, double[] Chi, BeamField Field)
{
    /// <summary>Takes the tangent of a field solved on one mesh.</summary>
    public static LinearisedField Of(FixedMeshSolve solve) => new(
        solve.Solution, solve.Equations.TangentAt(solve.Solution.Potential), solve.Extraction, solve.Chi, solve.Field);

    /// <summary>
    /// Takes one Newton step in the next order of elements and the tangent there: traces at faces need the digits.
    /// </summary>
    public static LinearisedField Of(SolvedMagnet solved, int threads)
    {
        FieldProblem problem = solved.Solution.Problem;
        double[] chi = BandCutOff.Nodal(problem, new ApertureShape(solved.Field.Aperture))
            ?? throw new InputException([new Finding(
                Severity.Fault,
                "no-band",
                "The beam touches a part: how the field there follows the poles' shape cannot be told.",
                "Leave some air between the beam and every part.")]);
        HigherOrderStep higher = HigherOrderStep.From(solved.Solution, threads, CancellationToken.None);
        double[] lifted = higher.Lift.Up(chi);
        BeamExtraction extraction = BeamExtraction.Create(higher.Problem.Space, lifted);
        return new LinearisedField(
            new FieldSolution(higher.Problem, higher.Potential, solved.Solution.History),
            new FieldEquations(higher.Problem, threads).TangentAt(higher.Potential),
            extraction,
            lifted,
            extraction.FieldOf(solved.Field.Aperture, higher.Potential));
    }
}
