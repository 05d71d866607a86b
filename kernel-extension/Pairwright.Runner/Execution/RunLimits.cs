namespace Pairwright.Runner.Execution;

/// <summary>How much a whole run may take.</summary>
/// <param name="Time">Wall time from the start of the kernel to the end of the last cell.</param>
/// <param name="MemoryMb">Resident memory of the process that runs the cells, in MB (2^20 bytes).</param>
internal sealed record RunLimits(TimeSpan Time, int MemoryMb)
{
    /// <summary>Below this the kernel and the compiler alone would reach the limit (measured here: about 250 MB).</summary>
    public const int LeastMemoryMb = 384;

    public const int DefaultSeconds = 3600;

    public long MemoryBytes => (long)MemoryMb << 20;

    /// <summary>Three quarters of what this machine, or the container we are in, has.</summary>
    public static int DefaultMemoryMb =>
        Math.Max(LeastMemoryMb, (int)Math.Min(int.MaxValue, (GC.GetGCMemoryInfo().TotalAvailableMemoryBytes * 3 / 4) >> 20));
}
