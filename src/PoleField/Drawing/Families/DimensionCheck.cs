using static System.FormattableString;

namespace PoleField.Drawing;

/// <summary>Collects everything wrong with a family's dimensions, then throws once.</summary>
internal sealed class DimensionCheck(string family)
{
    private readonly List<Finding> _faults = [];

    /// <summary>Demands a positive finite number.</summary>
    public bool Positive(string name, double value, string unit = "mm")
    {
        if (value > 0.0 && double.IsFinite(value))
        {
            return true;
        }

        Fault(Invariant($"{name} is {value:g6} {unit}; it must be a positive number."), "Correct the dimension.");
        return false;
    }

    /// <summary>Demands a finite number.</summary>
    public bool Finite(string name, double value)
    {
        if (double.IsFinite(value))
        {
            return true;
        }

        Fault(Invariant($"{name} is not a finite number."), "Correct the dimension.");
        return false;
    }

    /// <summary>Demands one dimension to be less than another, both finite.</summary>
    public bool Less((string Name, double Value) low, (string Name, double Value) high, string fix)
    {
        if (low.Value < high.Value)
        {
            return true;
        }

        Fault(Invariant($"{low.Name} is {low.Value:g6} mm; it must be less than {high.Name}, {high.Value:g6} mm."), fix);
        return false;
    }

    /// <summary>Notes a fault.</summary>
    public void Fault(string text, string fix) => _faults.Add(new Finding(Severity.Fault, "family-dimension", $"{family}: {text}", fix));

    /// <summary>True while nothing is wrong.</summary>
    public bool IsClean => _faults.Count == 0;

    /// <exception cref="InputException">Something was wrong; carries all of it.</exception>
    public void ThrowIfFaulty()
    {
        if (_faults.Count > 0)
        {
            throw new InputException(_faults);
        }
    }
}
