using System.Numerics;

namespace Pairwright.Matching;

/// <summary>For each four bits a table of its Hamming distances to all four bits, repeated over 64 bytes so that any vector can hold it.</summary>
internal static unsafe class HammingTables
{
    private const int TableBytes = 64;

    private static readonly byte* tables = Make();

    public static byte* Of(byte bits) => tables + bits * TableBytes;

    // Held as long as the program runs.
    private static byte* Make()
    {
        var start = new AlignedMemory(16 * TableBytes);
        GC.SuppressFinalize(start);
        for (var i = 0; i < 16 * TableBytes; i++)
        {
            start.Start[i] = (byte)BitOperations.PopCount((uint)(i / TableBytes ^ i % 16));
        }

        return start.Start;
    }
}
