using System.Runtime.InteropServices;

namespace Pairwright.Matching;

/// <summary>Bytes outside the collected heap, at an address that every vector width divides.</summary>
internal sealed unsafe partial class AlignedMemory : IDisposable
{
    private const int Alignment = 64;
    private const nuint HugePage = 2 << 20;
    private const int AdviseHugePages = 14;

    private byte* start;

    public AlignedMemory(long bytes)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(bytes);
        Bytes = bytes;
        var large = (nuint)bytes >= 4 * HugePage;
        try
        {
            start = (byte*)NativeMemory.AlignedAlloc((nuint)bytes + Alignment, large ? HugePage : Alignment);
        }
        catch (OutOfMemoryException)
        {
            throw new UserErrorException($"The system has no {bytes / 1_000_000} MB of memory left for this match; set a memory limit, narrow the range, or close other programs.");
        }

        if (large && OperatingSystem.IsLinux())
        {
            // First touches of small pages would take longer than the match itself. Only advice: a refusal changes nothing but the time.
            _ = Advise(start, (nuint)bytes, AdviseHugePages);
        }
    }

    public long Bytes { get; }

    public byte* Start => start;

    /// <summary>Memory filled with one value.</summary>
    public static AlignedMemory Filled(long bytes, byte value)
    {
        var memory = new AlignedMemory(bytes);
        NativeMemory.Fill(memory.start, (nuint)bytes, value);
        return memory;
    }

    public void Dispose()
    {
        NativeMemory.AlignedFree(start);
        start = null;
        GC.SuppressFinalize(this);
    }

    ~AlignedMemory() => NativeMemory.AlignedFree(start);

    [LibraryImport("libc", EntryPoint = "madvise")]
    private static partial int Advise(void* start, nuint bytes, int advice);
}
