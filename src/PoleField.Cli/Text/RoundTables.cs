using PoleField.Beam;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Text;

/// <summary>Prints mesh by mesh how the accuracy was reached, and Newton's steps with energy and residual.</summary>
internal static class RoundTables
{
    public static void Write(TextWriter writer, SolveRecord record)
    {
        int mesh = 0;
        foreach (MeshRound round in record.Rounds)
        {
            writer.WriteLine(FormattableString.Invariant(
                $"Mesh {++mesh}: {round.Triangles} triangles, {round.Unknowns} unknowns, {round.NewtonSteps} Newton steps, accuracy {Numbers.Accuracy(round.Accuracy)}"));
            writer.WriteLine("  step  energy W, J/m        residual  step length  tangent");
            int step = 0;
            foreach (NewtonStep s in round.History)
            {
                writer.WriteLine(FormattableString.Invariant(
                    $"  {++step,4}  {s.Energy,-18:g12}  {s.Decrement,9:e2}  {s.StepLength,11:f3}  {(s.TangentKept ? "kept" : "new")}"));
            }
        }
    }
}
