using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Pairwright.Matching;

/// <summary>Vectors of 512 bits: 64 bytes or 32 words. Processors without them work on halves.</summary>
internal readonly unsafe struct Lanes512 : ILanes<Vector512<byte>, Vector512<ushort>, Vector512<byte>>
{
    /// <summary>Whether the processor has byte operations this wide.</summary>
    public static bool Pays => Avx512BW.IsSupported;

    public static int Bytes => 64;

    public static int Words => 32;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Load(byte* from) => Vector512.Load(from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Store(byte* to, Vector512<byte> value) => value.Store(to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Expect(byte* at)
    {
        if (Sse.IsSupported)
        {
            Sse.Prefetch0(at);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void StorePast(byte* to, Vector512<byte> value) => value.StoreAlignedNonTemporal(to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> All(byte value) => Vector512.Create(value);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Add(Vector512<byte> a, Vector512<byte> b) => a + b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> AddUpTo255(Vector512<byte> a, Vector512<byte> b) => Vector512.AddSaturate(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Subtract(Vector512<byte> a, Vector512<byte> b) => a - b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> AbsoluteDifference(Vector512<byte> a, Vector512<byte> b) => Vector512.SubtractSaturate(a, b) | Vector512.SubtractSaturate(b, a);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Min(Vector512<byte> a, Vector512<byte> b) => Vector512.Min(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Or(Vector512<byte> a, Vector512<byte> b) => a | b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Select(Vector512<byte> mask, Vector512<byte> a, Vector512<byte> b) => Vector512.ConditionalSelect(mask, a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static byte Least(Vector512<byte> value) => Lanes256.Least(Vector256.Min(value.GetLower(), value.GetUpper()));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> Table(byte* from) => Vector512.Load(from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<byte> LookUp(Vector512<byte> table, Vector512<byte> indices) =>
        Avx512BW.IsSupported
            ? Avx512BW.Shuffle(table, indices)
            : Vector512.Create(Lanes256.LookUp(table.GetLower(), indices.GetLower()), Lanes256.LookUp(table.GetLower(), indices.GetUpper()));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> LoadWords(ushort* from) => Vector512.Load(from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void StoreWords(ushort* to, Vector512<ushort> value) => value.Store(to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> Widen(byte* from) =>
        Avx512BW.IsSupported
            ? Avx512BW.ConvertToVector512UInt16(Vector256.Load(from))
            : Vector512.Create(Lanes256.Widen(from), Lanes256.Widen(from + 16));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> AllWords(ushort value) => Vector512.Create(value);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> AddWords(Vector512<ushort> a, Vector512<ushort> b) => a + b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> ShiftLeft(Vector512<ushort> value, int by) => value << by;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> OrWords(Vector512<ushort> a, Vector512<ushort> b) => a | b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> AndWords(Vector512<ushort> a, Vector512<ushort> b) => a & b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> MaxWords(Vector512<ushort> a, Vector512<ushort> b) => Vector512.Max(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> Multiply(Vector512<ushort> a, Vector512<ushort> b) => a * b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> MinWords(Vector512<ushort> a, Vector512<ushort> b) => Vector512.Min(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> SelectWords(Vector512<ushort> mask, Vector512<ushort> a, Vector512<ushort> b) => Vector512.ConditionalSelect(mask, a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ushort> EqualWords(Vector512<ushort> a, Vector512<ushort> b) => Vector512.Equals(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static ushort LeastWord(Vector512<ushort> value) => Lanes256.LeastWord(Vector256.Min(value.GetLower(), value.GetUpper()));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static int FirstEqual(Vector512<ushort> a, Vector512<ushort> b)
    {
        var mask = Vector512.Equals(a, b).ExtractMostSignificantBits();
        return mask == 0 ? -1 : BitOperations.TrailingZeroCount(mask);
    }
}
