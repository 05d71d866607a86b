namespace Pairwright;

/// <summary>Every verdict that this process has made, in the order in which they were made.</summary>
/// <remarks>
/// A verdict counts when it is made, whether or not anything shows it: the headless runner takes its exit code and its
/// reports from here. Safe to use from several threads.
/// </remarks>
public static class VerdictLedger
{
    private static readonly Lock Gate = new();
    private static readonly List<VerdictRecord> Records = [];

    /// <summary>Raised once for each verdict, after it has been entered, on the thread that made it.</summary>
    public static event Action<VerdictRecord>? Recorded;

    /// <summary>A snapshot of all verdicts so far, oldest first.</summary>
    public static IReadOnlyList<VerdictRecord> All
    {
        get
        {
            lock (Gate)
            {
                return [.. Records];
            }
        }
    }

    /// <summary>Enters a verdict.</summary>
    /// <exception cref="ArgumentException">The outcome is none of the three that <see cref="VerdictRecord"/> names.</exception>
    public static void Record(VerdictRecord verdict)
    {
        ArgumentNullException.ThrowIfNull(verdict);
        if (verdict.Outcome is not (VerdictRecord.Met or VerdictRecord.NotMet or VerdictRecord.Undecided))
        {
            throw new ArgumentException($"A verdict's outcome is met, not met or undecided, not '{verdict.Outcome}'.", nameof(verdict));
        }

        lock (Gate)
        {
            Records.Add(verdict);
        }
        Recorded?.Invoke(verdict);
    }

    /// <summary>Forgets all verdicts so far, so that a notebook can start over.</summary>
    public static void Clear()
    {
        lock (Gate)
        {
            Records.Clear();
        }
    }
}
