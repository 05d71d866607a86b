namespace Pairwright.Geometry;

/// <summary>The size of a picture in pixels.</summary>
/// <param name="Width">Columns.</param>
/// <param name="Height">Rows.</param>
public readonly record struct PictureSize(int Width, int Height)
{
    /// <summary>The number of pixels.</summary>
    public long Area => (long)Width * Height;

    /// <summary>Whether a position lies on the picture, the outer half pixel included.</summary>
    public bool Contains(double u, double v) => u >= -0.5 && v >= -0.5 && u <= Width - 0.5 && v <= Height - 0.5;

    /// <summary>Columns × rows.</summary>
    public override string ToString() => $"{Width} × {Height}";
}
