namespace Pairwright.Notebook.Drawing;

/// <summary>Maps 0 to 1 to colours whose lightness only rises, so that the order survives grey printing and colour blindness.</summary>
/// <remarks>A few anchors are joined by straight lines in Oklab (Ottosson 2020), where equal steps look about equal.</remarks>
internal sealed class ColourScale
{
    private const int Steps = 256;
    private readonly (byte R, byte G, byte B)[] table = new (byte R, byte G, byte B)[Steps];

    private ColourScale(params (double Lightness, double A, double B)[] anchors)
    {
        for (var i = 0; i < Steps; i++)
        {
            var along = i / (Steps - 1.0) * (anchors.Length - 1);
            var before = Math.Min((int)along, anchors.Length - 2);
            var share = along - before;
            var (from, to) = (anchors[before], anchors[before + 1]);
            table[i] = Colour(
                from.Lightness + share * (to.Lightness - from.Lightness),
                from.A + share * (to.A - from.A),
                from.B + share * (to.B - from.B));
        }
    }

    /// <summary>For disparities and depths: deep blue over green to pale yellow.</summary>
    public static ColourScale Heights { get; } =
        new((0.25, 0.02, -0.13), (0.42, -0.04, -0.10), (0.58, -0.09, -0.02), (0.75, -0.08, 0.11), (0.95, -0.02, 0.10));

    /// <summary>For shares and confidences: dark to light without a hue of its own.</summary>
    public static ColourScale Shares { get; } = new((0.22, 0.01, -0.03), (0.60, 0.03, 0.03), (0.96, 0.00, 0.02));

    /// <summary>For uncertainties: pale where it is small, dark red where it is large, so that trouble stands out on paper.</summary>
    public static ColourScale Spreads { get; } = new((0.96, 0.00, 0.02), (0.80, 0.06, 0.09), (0.58, 0.15, 0.09), (0.33, 0.13, 0.04));

    public (byte R, byte G, byte B) At(double share) => table[(int)Math.Round(Math.Clamp(share, 0, 1) * (Steps - 1))];

    // Oklab to sRGB, coefficients from Ottosson's publication (B. Ottosson, "A perceptual color space for image processing", 2020), from memory;
    // a test holds white, black and the sRGB primaries against it.
    internal static (byte R, byte G, byte B) Colour(double lightness, double a, double b)
    {
        var l = Math.Pow(lightness + 0.3963377774 * a + 0.2158037573 * b, 3);
        var m = Math.Pow(lightness - 0.1055613458 * a - 0.0638541728 * b, 3);
        var s = Math.Pow(lightness - 0.0894841775 * a - 1.2914855480 * b, 3);
        return (
            Encoded(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
            Encoded(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
            Encoded(-0.0041960863 * l - 0.7034186147 * m + 1.7076147010 * s));
    }

    private static byte Encoded(double linear)
    {
        var value = linear <= 0.0031308 ? 12.92 * linear : 1.055 * Math.Pow(linear, 1 / 2.4) - 0.055;
        return (byte)Math.Clamp(Math.Round(255 * value), 0, 255);
    }
}
