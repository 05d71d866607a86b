namespace Pairwright.Imaging;

/// <summary>Grey from colours for matching: Y = 0.299 R + 0.587 G + 0.114 B (Recommendation ITU-R BT.601-7, 2.5.1), rounded to the nearest level.</summary>
internal static class Luma
{
    /// <summary>One grey level of one colour.</summary>
    public static ushort Of(int red, int green, int blue) => (ushort)((299 * red + 587 * green + 114 * blue + 500) / 1000);

    /// <summary>The grey levels of red, green, blue by turns.</summary>
    public static ushort[] OfRgb(ReadOnlySpan<ushort> rgb)
    {
        var grey = new ushort[rgb.Length / 3];
        for (var i = 0; i < grey.Length; i++)
        {
            grey[i] = Of(rgb[3 * i], rgb[3 * i + 1], rgb[3 * i + 2]);
        }

        return grey;
    }
}
