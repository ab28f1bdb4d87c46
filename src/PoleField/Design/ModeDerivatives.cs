
namespace PoleField.Design;

/// <summary>Derivatives by the coefficients of modes, from densities on the moved faces.</summary>
internal sealed class ModeDerivatives(FaceModes[] modes, int[] first)
{
    /// <summary>One row of derivatives for each row of densities.</summary>
    public double[][] Of(Sensitivity sensitivity, double[][] densities)
    {
        int unknowns = modes.Sum(m => m.Count);
        double[][] rows = [.. densities.Select(_ => new double[unknowns])];
        for (int i = 0; i < sensitivity.Points.Count; i++)
        {
            FacePoint p = sensitivity.Points[i];
            double[] own = At(p);
            for (int k = 0; k < unknowns; k++)
            {
                for (int q = 0; own[k] != 0 && q < rows.Length; q++)
                {
                    rows[q][k] += densities[q][i] * p.Length * own[k];
                }
            }
        }

        return rows;
    }

    /// <summary>Outward speed of a place on the moved face by each coefficient: the mode there times the cosine between old and new normal.</summary>
    public double[] At(in FacePoint p)
    {
        var own = new double[modes.Sum(m => m.Count)];
        for (int m = 0; m < modes.Length; m++)
        {
            foreach (Face.FaceEdge e in modes[m].Face.Edges)
            {
                if (e.SectionEdge != p.SectionEdge)
                {
                    continue;
                }

                // The old face's nearest place is where the move started from, as it went along the normal.
                double parameter = e.Edge.Curve.ClosestParameter(p.At);
                double s = e.ArcLengthAt(parameter);
                if (s <= modes[m].From || s >= modes[m].To)
                {
                    continue;
                }

                double along = e.OutwardAt(parameter).Dot(p.Outward);
                for (int k = 0; k < modes[m].Count; k++)
                {
                    own[first[m] + k] = along * modes[m].Value(k, s);
                }
            }
        }

        return own;
    }
}
