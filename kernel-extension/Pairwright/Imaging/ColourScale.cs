namespace Pairwright.Imaging;

/// <summary>Colours for numbers: ever lighter from low to high, from dark wine through olive and green to pale aqua, so that order shows even in grey print.</summary>
/// <remarks>
/// Computed, not tabled: lightness rises evenly in OKLab (Ottosson 2020), whose steps look equal to the eye, while the hue turns from 20° to
/// 205°. Pixels without a value are striped in two violets, a hue that the scale does not hold.
/// </remarks>
public static class ColourScale
{
    private const int Steps = 1024;
    private static readonly byte[] Table = MakeTable();
    private static readonly (byte Red, byte Green, byte Blue)[] Stripes = [FromOklab(0.45, 0.07, 305), FromOklab(0.53, 0.07, 305)];

    /// <summary>The colour of a number.</summary>
    /// <param name="share">0 for the lowest, 1 for the highest; beyond them the end colours.</param>
    public static (byte Red, byte Green, byte Blue) Colour(double share)
    {
        var at = 3 * (int)Math.Round(Math.Clamp(double.IsNaN(share) ? 0 : share, 0, 1) * (Steps - 1));
        return (Table[at], Table[at + 1], Table[at + 2]);
    }

    /// <summary>The colour of a pixel without a value.</summary>
    /// <param name="u">Its column, which chooses the stripe.</param>
    /// <param name="v">Its row, which chooses the stripe.</param>
    public static (byte Red, byte Green, byte Blue) NoValue(int u, int v) => Stripes[(u + v) / 4 % 2];

    /// <summary>A map in colours.</summary>
    /// <param name="map">The map.</param>
    /// <param name="low">The number of the lowest colour.</param>
    /// <param name="high">The number of the highest colour.</param>
    /// <returns>Red, green, blue by turns, row after row.</returns>
    public static byte[] Paint(ScalarMap map, double low, double high)
    {
        ArgumentNullException.ThrowIfNull(map);
        var rgb = new byte[3 * map.Size.Area];
        var span = high > low ? high - low : 1;
        for (var v = 0; v < map.Size.Height; v++)
        {
            var row = map.Row(v);
            for (var u = 0; u < row.Length; u++)
            {
                var at = 3 * (v * row.Length + u);
                (rgb[at], rgb[at + 1], rgb[at + 2]) = float.IsNaN(row[u]) ? NoValue(u, v) : Colour((row[u] - low) / span);
            }
        }

        return rgb;
    }

    private static byte[] MakeTable()
    {
        var table = new byte[3 * Steps];
        for (var i = 0; i < Steps; i++)
        {
            var share = i / (Steps - 1.0);
            var chroma = 0.045 + 0.05 * Math.Sin(Math.PI * share);
            (table[3 * i], table[3 * i + 1], table[3 * i + 2]) = FromOklab(0.22 + 0.74 * share, chroma, 20 + 185 * share);
        }

        return table;
    }

    // OKLab's published matrices to linear sRGB, then the transfer function of IEC 61966-2-1.
    private static (byte Red, byte Green, byte Blue) FromOklab(double lightness, double chroma, double hueDegrees)
    {
        var (a, b) = (chroma * Math.Cos(hueDegrees * Math.PI / 180), chroma * Math.Sin(hueDegrees * Math.PI / 180));
        var l = Cube(lightness + 0.3963377774 * a + 0.2158037573 * b);
        var m = Cube(lightness - 0.1055613458 * a - 0.0638541728 * b);
        var s = Cube(lightness - 0.0894841775 * a - 1.2914855480 * b);
        return (
            Encode(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
            Encode(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
            Encode(-0.0041960863 * l - 0.7034186147 * m + 1.7076147010 * s));
    }

    private static double Cube(double x) => x * x * x;

    private static byte Encode(double linear)
    {
        var c = Math.Clamp(linear, 0, 1);
        return (byte)Math.Round(255 * (c <= 0.0031308 ? 12.92 * c : 1.055 * Math.Pow(c, 1 / 2.4) - 0.055));
    }
}
