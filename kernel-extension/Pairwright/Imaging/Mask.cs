using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Which pixels of a picture may be used.</summary>
/// <remarks>Immutable by convention: the maker hands its array over and keeps no other reference to it.</remarks>
public sealed class Mask
{
    private readonly bool[] usable;

    /// <summary>Makes a mask.</summary>
    /// <param name="size">The size.</param>
    /// <param name="usable">Row after row, true where the pixel may be used, handed over.</param>
    /// <exception cref="ArgumentException">The number of entries is not the size's area.</exception>
    public Mask(PictureSize size, bool[] usable)
    {
        ArgumentNullException.ThrowIfNull(usable);
        if (usable.LongLength != size.Area)
        {
            throw new ArgumentException($"A mask of {size} pixels takes {size.Area} entries, not {usable.LongLength}.", nameof(usable));
        }

        (Size, this.usable) = (size, usable);
    }

    /// <summary>The size.</summary>
    public PictureSize Size { get; }

    /// <summary>Row after row, true where the pixel may be used.</summary>
    public ReadOnlySpan<bool> Usable => usable;

    /// <summary>Whether the pixel at column <paramref name="u"/> of row <paramref name="v"/> may be used.</summary>
    public bool this[int u, int v] => usable[(long)v * Size.Width + u];

    /// <summary>The share of usable pixels, 0 to 1.</summary>
    public double Share => usable.Length == 0 ? 0 : usable.Count(pixel => pixel) / (double)usable.Length;

    /// <summary>A mask made pixel by pixel.</summary>
    public static Mask From(PictureSize size, Func<int, int, bool> usable)
    {
        ArgumentNullException.ThrowIfNull(usable);
        var entries = new bool[size.Area];
        for (var v = 0; v < size.Height; v++)
        {
            for (var u = 0; u < size.Width; u++)
            {
                entries[v * size.Width + u] = usable(u, v);
            }
        }

        return new(size, entries);
    }

    /// <summary>Reads a mask picture: black (level 0) forbids a pixel, every other level allows it.</summary>
    /// <param name="path">A picture file of the size of the picture that it is for.</param>
    /// <exception cref="UserErrorException">The file cannot be read as a picture.</exception>
    public static Mask Read(string path)
    {
        var picture = Picture.Read(path);
        return From(picture.Size, (u, v) => picture[u, v] > 0);
    }

    /// <summary>What both masks allow.</summary>
    /// <exception cref="UserErrorException">The sizes differ.</exception>
    public Mask And(Mask other)
    {
        ArgumentNullException.ThrowIfNull(other);
        if (other.Size != Size)
        {
            throw new UserErrorException($"A mask of {other.Size} px does not fit one of {Size} px; give a mask of the picture's own size.");
        }

        return From(Size, (u, v) => this[u, v] && other[u, v]);
    }

    /// <summary>The size and the share of usable pixels in a line.</summary>
    public override string ToString() => string.Create(System.Globalization.CultureInfo.InvariantCulture, $"Mask of {Size} px, {Share:0.0%} usable");
}
