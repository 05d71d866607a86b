namespace Pairwright.Matching;

/// <summary>Large blocks that one match leaves to the next: touching fresh memory takes longer than filling used one.</summary>
/// <remarks>A block that nobody takes for some seconds goes back to the system.</remarks>
internal static class WorkingMemory
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(5);
    private static readonly Lock Gate = new();
    private static readonly List<AlignedMemory> Idle = [];
    private static readonly Timer Sweeper = new(_ => Release());

    /// <summary>A block of at least so many bytes; its content means nothing.</summary>
    public static AlignedMemory Rent(long bytes)
    {
        lock (Gate)
        {
            // A block more than a quarter too large would break a memory limit.
            if (Idle.Find(block => block.Bytes >= bytes && block.Bytes - bytes <= bytes / 4) is { } found)
            {
                Idle.Remove(found);
                return found;
            }
        }

        // Blocks of another size are in the way of this one.
        Release();
        return new(bytes);
    }

    /// <summary>Gives a block back.</summary>
    public static void Return(AlignedMemory block)
    {
        lock (Gate)
        {
            Idle.Add(block);
        }

        Sweeper.Change(Patience, Timeout.InfiniteTimeSpan);
    }

    /// <summary>Gives all idle blocks back to the system.</summary>
    public static void Release()
    {
        lock (Gate)
        {
            Idle.ForEach(block => block.Dispose());
            Idle.Clear();
        }
    }
}
