using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Pairwright.Matching;

/// <summary>Vectors of 256 bits: 32 bytes or 16 words. Processors without them work on halves.</summary>
internal readonly unsafe struct Lanes256 : ILanes<Vector256<byte>, Vector256<ushort>, Vector256<byte>>
{
    public static int Bytes => 32;

    public static int Words => 16;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Load(byte* from) => Vector256.Load(from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Store(byte* to, Vector256<byte> value) => value.Store(to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Expect(byte* at)
    {
        if (Sse.IsSupported)
        {
            Sse.Prefetch0(at);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void StorePast(byte* to, Vector256<byte> value) => value.StoreAlignedNonTemporal(to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> All(byte value) => Vector256.Create(value);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Add(Vector256<byte> a, Vector256<byte> b) => a + b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> AddUpTo255(Vector256<byte> a, Vector256<byte> b) => Vector256.AddSaturate(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Subtract(Vector256<byte> a, Vector256<byte> b) => a - b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> AbsoluteDifference(Vector256<byte> a, Vector256<byte> b) => Vector256.SubtractSaturate(a, b) | Vector256.SubtractSaturate(b, a);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Min(Vector256<byte> a, Vector256<byte> b) => Vector256.Min(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Or(Vector256<byte> a, Vector256<byte> b) => a | b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Select(Vector256<byte> mask, Vector256<byte> a, Vector256<byte> b) => Vector256.ConditionalSelect(mask, a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static byte Least(Vector256<byte> value)
    {
        var half = Vector128.Min(value.GetLower(), value.GetUpper());

        // The lower byte of each word becomes the lesser of both, the upper one zero: then the least word is the least byte.
        var words = Vector128.Min(half, (half.AsUInt16() >>> 8).AsByte()).AsUInt16();
        return (byte)LeastOfWords(words);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> Table(byte* from) => Vector256.Load(from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<byte> LookUp(Vector256<byte> table, Vector256<byte> indices) =>
        Avx2.IsSupported
            ? Avx2.Shuffle(table, indices)
            : Vector256.Create(Vector128.Shuffle(table.GetLower(), indices.GetLower()), Vector128.Shuffle(table.GetLower(), indices.GetUpper()));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> LoadWords(ushort* from) => Vector256.Load(from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void StoreWords(ushort* to, Vector256<ushort> value) => value.Store(to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> Widen(byte* from)
    {
        if (Avx2.IsSupported)
        {
            return Avx2.ConvertToVector256Int16(from).AsUInt16();
        }

        var (lower, upper) = Vector128.Widen(Vector128.Load(from));
        return Vector256.Create(lower, upper);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> AllWords(ushort value) => Vector256.Create(value);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> AddWords(Vector256<ushort> a, Vector256<ushort> b) => a + b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> ShiftLeft(Vector256<ushort> value, int by) => value << by;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> OrWords(Vector256<ushort> a, Vector256<ushort> b) => a | b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> AndWords(Vector256<ushort> a, Vector256<ushort> b) => a & b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> MaxWords(Vector256<ushort> a, Vector256<ushort> b) => Vector256.Max(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> Multiply(Vector256<ushort> a, Vector256<ushort> b) => a * b;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> MinWords(Vector256<ushort> a, Vector256<ushort> b) => Vector256.Min(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> SelectWords(Vector256<ushort> mask, Vector256<ushort> a, Vector256<ushort> b) =>
        Avx2.IsSupported ? Avx2.BlendVariable(b, a, mask) : Vector256.ConditionalSelect(mask, a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<ushort> EqualWords(Vector256<ushort> a, Vector256<ushort> b) => Vector256.Equals(a, b);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static ushort LeastWord(Vector256<ushort> value) => LeastOfWords(Vector128.Min(value.GetLower(), value.GetUpper()));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static int FirstEqual(Vector256<ushort> a, Vector256<ushort> b)
    {
        // As bytes, since a mask of bytes is one instruction; each word gives two bits.
        var mask = Vector256.Equals(a, b).AsByte().ExtractMostSignificantBits();
        return mask == 0 ? -1 : BitOperations.TrailingZeroCount(mask) / 2;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    internal static ushort LeastOfWords(Vector128<ushort> words)
    {
        if (Sse41.IsSupported)
        {
            return Sse41.MinHorizontal(words).ToScalar();
        }

        words = Vector128.Min(words, Vector128.Shuffle(words, Vector128.Create((ushort)4, 5, 6, 7, 0, 1, 2, 3)));
        words = Vector128.Min(words, Vector128.Shuffle(words, Vector128.Create((ushort)2, 3, 0, 1, 6, 7, 4, 5)));
        return Math.Min(words[0], words[1]);
    }
}
