using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Pairwright.Matching;

/// <summary>Eight labels as eight 32-bit words and back, beside eight floats.</summary>
internal static class LabelVectors
{
    /// <summary>How many columns a step takes.</summary>
    public const int Step = 8;

    /// <summary>The labels of eight columns.</summary>
    public static Vector256<int> Load(ReadOnlySpan<DisparityLabel> labels, int u)
    {
        var bytes = Vector64.LoadUnsafe(ref Unsafe.As<DisparityLabel, byte>(ref MemoryMarshal.GetReference(labels[u..(u + Step)])));
        var (lower, upper) = Vector128.Widen(Vector128.WidenLower(bytes.ToVector128Unsafe()));
        return Vector256.Create(lower, upper).AsInt32();
    }

    /// <summary>Puts the labels of eight columns down.</summary>
    public static void Store(Vector256<int> values, Span<DisparityLabel> labels, int u)
    {
        var words = Vector128.Narrow(values.GetLower(), values.GetUpper()).AsUInt16();
        Vector128.Narrow(words, words).GetLower().StoreUnsafe(ref Unsafe.As<DisparityLabel, byte>(ref MemoryMarshal.GetReference(labels[u..(u + Step)])));
    }

    /// <summary>Ones where the label is a given one.</summary>
    public static Vector256<int> Are(Vector256<int> labels, DisparityLabel label) => Vector256.Equals(labels, Vector256.Create((int)label));
}
