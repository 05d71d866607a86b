namespace Pairwright.Matching;

/// <summary>Turns what a stage throws into one sentence that names the stage: it may have been written in a cell.</summary>
internal static class StageGuard
{
    /// <summary>Runs a part of a stage's work.</summary>
    /// <exception cref="UserErrorException">The stage failed.</exception>
    /// <exception cref="OperationCanceledException">It was asked to stop.</exception>
    public static void Run(Stage stage, CancellationToken stop, Action work) => Run(stage, stop, () =>
    {
        work();
        return 0;
    });

    /// <summary>Runs a part of a stage's work that gives something.</summary>
    /// <exception cref="UserErrorException">The stage failed.</exception>
    /// <exception cref="OperationCanceledException">It was asked to stop.</exception>
    public static T Run<T>(Stage stage, CancellationToken stop, Func<T> work)
    {
        try
        {
            return work();
        }
        catch (Exception fault) when (!(fault is OperationCanceledException && stop.IsCancellationRequested))
        {
            // Several threads may have failed at once; the first tells enough.
            var first = fault is AggregateException { InnerExceptions: [var one, ..] } ? one : fault;
            throw first as UserErrorException ?? new UserErrorException(
                $"The {StageKind.Of(stage)} '{stage.Name}' failed with {first.GetType().Name} ({first.Message.ReplaceLineEndings(" ").TrimEnd('.')}); mend it or choose another.",
                first);
        }
    }
}
