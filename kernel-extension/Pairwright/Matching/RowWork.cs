using System.Runtime.ExceptionServices;

namespace Pairwright.Matching;

/// <summary>Work on many rows at once, with the first fault thrown as it is.</summary>
internal static class RowWork
{
    public static void ForEach(int first, int end, int threads, CancellationToken stop, Action<int> body) =>
        ForEach(first, end, threads, stop, () => 0, (v, _) => body(v));

    /// <summary>The same with something of each thread's own, such as buffers.</summary>
    public static void ForEach<TState>(int first, int end, int threads, CancellationToken stop, Func<TState> start, Action<int, TState> body)
    {
        try
        {
            Parallel.For(
                first,
                end,
                new() { MaxDegreeOfParallelism = threads, CancellationToken = stop },
                start,
                (v, _, state) =>
                {
                    body(v, state);
                    return state;
                },
                _ => { });
        }
        catch (AggregateException several)
        {
            // Several threads may have met the same trouble; one sentence tells it.
            ExceptionDispatchInfo.Throw(several.InnerExceptions[0]);
        }
    }
}
