namespace PoleField.Design;

/// <summary>
/// A random normal move of the faces: Gaussian, with correlation exp(−(Δs/length)²) along each face and none between faces.
/// </summary>
internal static class FormError
{
    private const double FarthestPair = 4; // in correlation lengths; beyond it the correlation is below 2e-7
    private const double NodesPerLength = 4;

    /// <summary>Variance of Σ dᵢ wᵢ xᵢ for a form error x of one metre over points at arc lengths along one face.</summary>
    /// <param name="face">Face.</param>
    /// <param name="points">Arc length and weight dᵢwᵢ of each point, rising in arc length.</param>
    /// <param name="length">Correlation length, metres.</param>
    public static double Variance(Face face, IReadOnlyList<(double At, double Weight)> points, double length)
    {
        double sum = 0;
        for (int i = 0; i < points.Count; i++)
        {
            sum += points[i].Weight * points[i].Weight;
            for (int j = i + 1; j < points.Count; j++)
            {
                double distance = points[j].At - points[i].At;
                if (face.IsClosed)
                {
                    distance = Math.Min(distance, face.Length - distance);
                }
                else if (distance > FarthestPair * length)
                {
                    break;
                }

                double share = distance / length;
                sum += share > FarthestPair ? 0 : 2 * points[i].Weight * points[j].Weight * Math.Exp(-share * share);
            }
        }

        return Math.Max(sum, 0);
    }

    /// <summary>One draw of unit size on a face: white noise smoothed by the square root of the correlation.</summary>
    public static Func<double, double> Draw(Face face, double length, Random random)
    {
        int nodes = (int)Math.Ceiling(NodesPerLength * (face.Length + (face.IsClosed ? 0 : 2 * FarthestPair * length)) / length);
        double spacing = (face.Length + (face.IsClosed ? 0 : 2 * FarthestPair * length)) / nodes;
        double start = face.IsClosed ? 0 : -FarthestPair * length;
        double[] noise = [.. Enumerable.Range(0, nodes).Select(_ => Normal(random))];

        // Kernel exp(−2 (Δs/length)²) convolved with itself is length √π/2 exp(−(Δs/length)²).
        double scale = Math.Sqrt(spacing / (0.5 * length * Math.Sqrt(Math.PI)));
        int reach = (int)Math.Ceiling(FarthestPair * length / spacing);
        return s =>
        {
            int centre = (int)Math.Round((s - start) / spacing);
            double sum = 0;
            for (int k = centre - reach; k <= centre + reach; k++)
            {
                if (!face.IsClosed && (k < 0 || k >= nodes))
                {
                    continue;
                }

                double share = (s - start - (k * spacing)) / length;
                sum += noise[((k % nodes) + nodes) % nodes] * Math.Exp(-2 * share * share);
            }

            return scale * sum;
        };
    }

    /// <summary>A standard normal number (Box and Muller 1958).</summary>
    public static double Normal(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(Math.Tau * random.NextDouble());
}
