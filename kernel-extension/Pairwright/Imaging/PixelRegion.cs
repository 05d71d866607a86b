using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>An upright rectangle of whole pixels.</summary>
/// <param name="U">The first column.</param>
/// <param name="V">The first row.</param>
/// <param name="Width">The number of columns, above zero.</param>
/// <param name="Height">The number of rows, above zero.</param>
public readonly record struct PixelRegion(int U, int V, int Width, int Height)
{
    /// <summary>Whether the region holds the pixel at column <paramref name="u"/> of row <paramref name="v"/>.</summary>
    public bool Contains(int u, int v) => u >= U && v >= V && u < (long)U + Width && v < (long)V + Height;

    /// <summary>The mask that allows this region alone.</summary>
    /// <param name="size">The size of the picture.</param>
    /// <exception cref="UserErrorException">The region is empty or reaches over the picture's edge.</exception>
    public Mask ToMask(PictureSize size)
    {
        Require(size);
        return Mask.From(size, Contains);
    }

    /// <summary>Demands that the region lies in a picture.</summary>
    /// <exception cref="UserErrorException">It is empty or reaches over the picture's edge.</exception>
    internal void Require(PictureSize size)
    {
        if (Width <= 0 || Height <= 0 || U < 0 || V < 0 || (long)U + Width > size.Width || (long)V + Height > size.Height)
        {
            throw new UserErrorException($"The region {this} does not lie in a picture of {size} px; choose one inside it.");
        }
    }

    /// <summary>Columns and rows, first to last.</summary>
    public override string ToString() => $"columns {U} to {(long)U + Width - 1}, rows {V} to {(long)V + Height - 1}";
}
