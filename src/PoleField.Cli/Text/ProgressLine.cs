using PoleField.Beam;

namespace PoleField.Cli.Text;

/// <summary>One line on the terminal that says how far the solve is, at most ten times a second; silent elsewhere.</summary>
internal sealed class ProgressLine(Terminal terminal, bool on, double asked, TimeProvider time) : IDisposable
{
    private static readonly TimeSpan Interval = TimeSpan.FromSeconds(0.1);

    private readonly Lock _gate = new();
    private readonly bool _on = on && terminal.ErrorIsTerminal;
    private long? _last;
    private int _shown;

    public void Report(SolveProgress progress) => Show(() => Words(progress));

    /// <summary>Shows other words.</summary>
    public void Show(Func<string> words)
    {
        lock (_gate)
        {
            if (!_on || (_last is { } last && time.GetElapsedTime(last) < Interval))
            {
                return;
            }

            _last = time.GetTimestamp();
            string text = Cell.Of(words(), terminal.Width - 1);
            terminal.Error.Write("\r" + text.PadRight(_shown));
            terminal.Error.Flush();
            _shown = text.Length;
        }
    }

    /// <summary>Wipes the line.</summary>
    public void Dispose()
    {
        lock (_gate)
        {
            if (_shown > 0)
            {
                terminal.Error.Write("\r" + new string(' ', _shown) + "\r");
                terminal.Error.Flush();
                _shown = 0;
            }
        }
    }

    private string Words(SolveProgress progress)
    {
        var words = new List<string> { progress.What };
        if (progress.AdaptiveStep > 0)
        {
            words.Add(FormattableString.Invariant($"mesh {progress.AdaptiveStep}"));
        }

        if (progress.Unknowns > 0)
        {
            words.Add(FormattableString.Invariant($"{progress.Unknowns} unknowns"));
        }

        if (progress.NewtonStep > 0)
        {
            words.Add(FormattableString.Invariant($"step {progress.NewtonStep}"));
        }

        if (double.IsFinite(progress.Residual))
        {
            words.Add($"last change {Numbers.Accuracy(progress.Residual)}");
        }

        if (double.IsFinite(progress.Accuracy))
        {
            words.Add($"accuracy {Numbers.Accuracy(progress.Accuracy)} of {Numbers.Accuracy(asked)} asked");
        }

        return string.Join(", ", words);
    }
}
