using Pairwright.Imaging;

namespace Pairwright.Notebook.Drawing;

/// <summary>Colours for shares from 0 to 1 whose lightness only rises or only falls, so that the order survives grey printing and colour blindness.</summary>
internal sealed class Ramp
{
    private readonly Func<double, (byte Red, byte Green, byte Blue)> colour;

    private Ramp(Func<double, (byte Red, byte Green, byte Blue)> colour) => this.colour = colour;

    /// <summary>For disparities and depths: the library's own scale.</summary>
    public static Ramp Values { get; } = new(ColourScale.Colour);

    /// <summary>For confidences: dark to light, without a hue that could be read as good or bad.</summary>
    public static Ramp Shares { get; } = Between(0x14202B, 0x4F6A80, 0xA9BDC9, 0xF7F8F4);

    /// <summary>For uncertainties: pale where small, dark red where large, so that trouble stands out on paper.</summary>
    public static Ramp Spreads { get; } = Between(0xFBF6E6, 0xF0C27B, 0xC8643C, 0x5E1224);

    public (byte Red, byte Green, byte Blue) At(double share) => colour(Math.Clamp(double.IsNaN(share) ? 0 : share, 0, 1));

    private static Ramp Between(params int[] anchors) => new(share =>
    {
        var along = share * (anchors.Length - 1);
        var before = Math.Min((int)along, anchors.Length - 2);
        byte Mixed(int shift)
        {
            var (from, to) = (anchors[before] >> shift & 255, anchors[before + 1] >> shift & 255);
            return (byte)Math.Round(from + (along - before) * (to - from));
        }

        return (Mixed(16), Mixed(8), Mixed(0));
    });
}
