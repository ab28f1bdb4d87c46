namespace PoleField.Materials;

/// <summary>Optional treatments of a table before a curve is laid through it.</summary>
internal static class BhSmoothing
{
    /// <summary>
    /// Moves nodes so that dH/dB falls to one minimum (the greatest differential permeability) and rises from there: pool
    /// adjacent violators on the secants, weighted with the widths in B. The minimum is placed where the weighted squares of
    /// the changes are least. The ends of every pooled block stay on the data.
    /// </summary>
    /// <param name="rows">Rows rising strictly in B, first at the origin.</param>
    /// <returns>The nodes and how many of them moved.</returns>
    public static (BhRow[] Nodes, int Moved) Unimodal(BhRow[] rows)
    {
        int pieces = rows.Length - 1;
        double[] secants = new double[pieces];
        double[] widths = new double[pieces];
        for (int k = 0; k < pieces; k++)
        {
            widths[k] = rows[k + 1].FluxDensity - rows[k].FluxDensity;
            secants[k] = (rows[k + 1].FieldStrength - rows[k].FieldStrength) / widths[k];
        }

        int minimum = BestSplit(secants, widths);
        Pool falling = new(falling: true);
        Pool rising = new(falling: false);
        for (int k = 0; k < pieces; k++)
        {
            (k < minimum ? falling : rising).Add(secants[k], widths[k]);
        }

        BhRow[] nodes = [.. rows];
        int moved = 0;
        int at = 0;
        foreach (Pool.Block block in Rising([.. falling.Blocks, .. rising.Blocks]))
        {
            BhRow start = rows[at];
            for (int k = at + 1; k < at + block.Count; k++)
            {
                double h = start.FieldStrength + (block.Value * (rows[k].FluxDensity - start.FluxDensity));
                moved += Math.Abs(h - rows[k].FieldStrength) > 1e-12 * rows[^1].FieldStrength ? 1 : 0;
                nodes[k] = rows[k] with { FieldStrength = h };
            }

            at += block.Count;
        }

        return (nodes, moved);
    }

    /// <summary>Leaves out the nodes below the maximum of B/H, so that the curve starts with the chord through the origin.</summary>
    public static BhRow[] AnhystereticStart(BhRow[] nodes)
    {
        int best = 1;
        for (int k = 2; k < nodes.Length; k++)
        {
            if (nodes[k].FluxDensity * nodes[best].FieldStrength > nodes[best].FluxDensity * nodes[k].FieldStrength)
            {
                best = k;
            }
        }

        // Two rows beyond the origin are the least the tail needs.
        best = Math.Min(best, nodes.Length - 2);
        return [nodes[0], .. nodes[best..]];
    }

    // Where noise makes H fall at the very minimum, its block joins the lower neighbour until H rises.
    private static List<Pool.Block> Rising(List<Pool.Block> blocks)
    {
        while (blocks.Count > 1)
        {
            int lowest = blocks.IndexOf(blocks.MinBy(b => b.Value));
            if (blocks[lowest].Value > 0)
            {
                break;
            }

            bool joinsBefore = lowest == blocks.Count - 1 || (lowest > 0 && blocks[lowest - 1].Value < blocks[lowest + 1].Value);
            int first = joinsBefore ? lowest - 1 : lowest;
            blocks[first] = blocks[first].Joined(blocks[first + 1]);
            blocks.RemoveAt(first + 1);
        }

        return blocks;
    }

    // Number of secants in the falling part for which the two pooled parts together lie closest to the data.
    private static int BestSplit(double[] secants, double[] widths)
    {
        int pieces = secants.Length;
        double[] cost = new double[pieces + 1];
        Pool falling = new(falling: true);
        for (int k = 0; k < pieces; k++)
        {
            falling.Add(secants[k], widths[k]);
            cost[k + 1] += falling.SquaredChange;
        }

        // A rising fit read from its end is a falling one.
        Pool rising = new(falling: true);
        for (int k = pieces - 1; k >= 0; k--)
        {
            rising.Add(secants[k], widths[k]);
            cost[k] += rising.SquaredChange;
        }

        return Array.IndexOf(cost, cost.Min());
    }

    /// <summary>Pool adjacent violators, one value at a time.</summary>
    private sealed class Pool(bool falling)
    {
        private readonly List<Block> _blocks = [];

        public IReadOnlyList<Block> Blocks => _blocks;

        /// <summary>Weighted sum of squares of (pooled − given) so far.</summary>
        public double SquaredChange { get; private set; }

        public void Add(double value, double weight)
        {
            Block last = new(value, weight, 1);
            while (_blocks.Count > 0 && Violates(_blocks[^1].Value, last.Value))
            {
                Block before = _blocks[^1];
                double sum = before.Weight + last.Weight;
                double difference = before.Value - last.Value;
                SquaredChange += before.Weight * last.Weight / sum * difference * difference;
                last = before.Joined(last);
                _blocks.RemoveAt(_blocks.Count - 1);
            }

            _blocks.Add(last);
        }

        private bool Violates(double before, double after) => falling ? after > before : after < before;

        public readonly record struct Block(double Value, double Weight, int Count)
        {
            public Block Joined(Block next) => new(
                ((Value * Weight) + (next.Value * next.Weight)) / (Weight + next.Weight), Weight + next.Weight, Count + next.Count);
        }
    }
}
