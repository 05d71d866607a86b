namespace Pairwright.Imaging;

/// <summary>The check sum of PNG chunks: CRC-32 of ISO 3309 with polynomial EDB88320, bits from the lowest (W3C PNG, third edition, 5.5).</summary>
/// <remarks>Own code because one table is less than one more package to carry into notebooks.</remarks>
internal static class PngChecksum
{
    private static readonly uint[] Table = [.. Enumerable.Range(0, 256).Select(index =>
    {
        var value = (uint)index;
        for (var bit = 0; bit < 8; bit++)
        {
            value = (value & 1) != 0 ? 0xEDB88320 ^ (value >> 1) : value >> 1;
        }

        return value;
    })];

    /// <summary>The check sum of a chunk's type and data.</summary>
    public static uint Of(ReadOnlySpan<byte> typeAndData)
    {
        var sum = uint.MaxValue;
        foreach (var value in typeAndData)
        {
            sum = Table[(byte)(sum ^ value)] ^ (sum >> 8);
        }

        return ~sum;
    }
}
