namespace Pairwright.Matching;

/// <summary>Counts rows that several threads have done, tells the share now and then, and ends the work when it is asked to stop.</summary>
internal sealed class RowCounter(int all, IProgress<double>? progress)
{
    private readonly Lock gate = new();
    private readonly int step = Math.Max(1, all / 200);
    private int done;

    /// <summary>Counts a row.</summary>
    /// <exception cref="OperationCanceledException">It was asked to stop.</exception>
    public void Add(CancellationToken stop)
    {
        stop.ThrowIfCancellationRequested();
        if (Interlocked.Increment(ref done) % step != 0 || progress is null)
        {
            return;
        }

        // The share is read inside, so that reports only grow.
        lock (gate)
        {
            progress.Report(0.99 * Volatile.Read(ref done) / all);
        }
    }
}
