using System.Numerics;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>
/// The beam's field where no band of air fits between aperture and parts: around each place a harmonic polynomial of degree
/// p + 2 is fitted to the nodes' potentials of the air elements next to it (least squares), and its derivatives are taken.
/// At the surface of a part the elements lie on one side only.
/// </summary>
internal sealed class LocalFits : IBeamExtraction
{
    private const int DegreeBeyondOrder = 2;
    private const int NodesPerUnknown = 2; // at least, so that the fit smooths
    private const int MostRings = 4;       // of elements around a place

    private readonly bool[] _air;          // by element
    private readonly int[] _start;         // air elements at vertex v: _elements[_start[v]] .. _elements[_start[v + 1] − 1]
    private readonly int[] _elements;
    private readonly ElementLocator _locator;

    public LocalFits(FieldProblem problem)
    {
        Space = problem.Space;
        _locator = new ElementLocator(Space, exterior: false);
        _air = new bool[Space.ElementCount];
        _start = new int[Space.Mesh.Vertices.Count + 1];
        for (int e = 0; e < _air.Length; e++)
        {
            _air[e] = problem.IsAir(e);
            for (int corner = 0; _air[e] && corner < 3; corner++)
            {
                _start[Space.NodesOf(e)[corner] + 1]++;
            }
        }

        for (int v = 0; v + 1 < _start.Length; v++)
        {
            _start[v + 1] += _start[v];
        }

        _elements = new int[_start[^1]];
        var next = (int[])_start.Clone();
        for (int e = 0; e < _air.Length; e++)
        {
            for (int corner = 0; _air[e] && corner < 3; corner++)
            {
                _elements[next[Space.NodesOf(e)[corner]]++] = e;
            }
        }
    }

    /// <inheritdoc/>
    public FiniteElementSpace Space { get; }

    private int Degree => Space.Order + DegreeBeyondOrder;

    /// <inheritdoc/>
    public BeamField FieldOf(Aperture aperture, double[] potential)
    {
        return new BeamField(aperture, At, BeamFieldMethod.LocalFits);

        BeamValues At(Point p)
        {
            Complex first = 0;
            Complex second = 0;
            foreach ((int node, Complex ofFirst, Complex ofSecond) in WeightsAt(p))
            {
                first += ofFirst * potential[node];
                second += ofSecond * potential[node];
            }

            return new BeamValues(p, -first.Imaginary, -first.Real, -second.Real, second.Imaginary);
        }
    }

    /// <inheritdoc/>
    public double[] Functional(IReadOnlyList<BeamTerm> terms)
    {
        var derivative = new double[Space.NodeCount];
        foreach (BeamTerm term in terms)
        {
            foreach ((int node, Complex first, Complex second) in WeightsAt(term.At))
            {
                derivative[node] += ((term.First * first) + (term.Second * second)).Real;
            }
        }

        return derivative;
    }

    // Weights of the nodes around a place in F′ and F″ there.
    private IEnumerable<(int Node, Complex First, Complex Second)> WeightsAt(Point p)
    {
        int[] nodes = NodesAround(p);
        double radius = nodes.Max(n => Space.Places[n].DistanceTo(p));
        HarmonicFit fit = HarmonicFit.To([.. nodes.Select(n => (1 / radius) * (Space.Places[n] - p))], Degree);
        Complex[] first = fit.WeightsOf(1);
        Complex[] second = fit.WeightsOf(2);
        for (int k = 0; k < nodes.Length; k++)
        {
            yield return (nodes[k], first[k] / radius, 2 * second[k] / (radius * radius));
        }
    }

    private int[] NodesAround(Point p)
    {
        var vertices = new SortedSet<int>(Seeds(p));
        var nodes = new SortedSet<int>();
        for (int ring = 0; ring < MostRings && nodes.Count < NodesPerUnknown * ((2 * Degree) + 1); ring++)
        {
            var wider = new SortedSet<int>();
            foreach (int v in vertices)
            {
                for (int k = _start[v]; k < _start[v + 1]; k++)
                {
                    ReadOnlySpan<int> own = Space.NodesOf(_elements[k]);
                    foreach (int node in own)
                    {
                        nodes.Add(node);
                    }

                    wider.UnionWith(own[..3].ToArray());
                }
            }

            vertices = wider;
        }

        return [.. nodes];
    }

    // Corners of the air element that holds the place; on the surface of a part perhaps those of the part's side there.
    private int[] Seeds(Point p)
    {
        (int element, double xi, double eta) = _locator.Find(p)
            ?? throw new ArgumentOutOfRangeException(nameof(p), "The place lies outside the model.");
        int[] corners = Space.NodesOf(element)[..3].ToArray();
        if (_air[element])
        {
            return corners;
        }

        double[] barycentric = [1 - xi - eta, xi, eta];
        int opposite = Array.IndexOf(barycentric, barycentric.Min());
        return [.. corners.Where((_, c) => c != opposite)];
    }
}
