namespace Pairwright.Geometry;

/// <summary>Where one view sees the other camera's centre: a pixel, or a direction at infinity. All epipolar lines of the view pass through it.</summary>
/// <remarks>Immutable. Counted as at infinity when farther from the pixel origin than 10⁹ px.</remarks>
public readonly record struct Epipole
{
    private const double FarthestPixel = 1e9;

    /// <summary>Makes an epipole from homogeneous pixel coordinates of any scale but zero.</summary>
    /// <param name="homogeneous">(U, V, W): the pixel is (U/W, V/W) where W is not zero.</param>
    /// <param name="view">The view that sees it.</param>
    public Epipole(Vector3D homogeneous, View view) => (Homogeneous, View) = (homogeneous.Normalized, view);

    /// <summary>Homogeneous pixel coordinates of length one.</summary>
    public Vector3D Homogeneous { get; }

    /// <summary>The view that sees it.</summary>
    public View View { get; }

    /// <summary>Whether the epipole is a pixel; otherwise it is a direction at infinity.</summary>
    public bool IsFinite => Math.Sqrt(Homogeneous.X * Homogeneous.X + Homogeneous.Y * Homogeneous.Y) < FarthestPixel * Math.Abs(Homogeneous.Z);

    /// <summary>The pixel, usually outside the picture; nothing at infinity.</summary>
    public IdealPixel? Pixel => IsFinite ? new IdealPixel(Homogeneous.X / Homogeneous.Z, Homogeneous.Y / Homogeneous.Z) : null;

    /// <summary>The unit vector in pixels from the pixel origin towards the epipole; at infinity its sign means nothing.</summary>
    public (double U, double V) Direction
    {
        get
        {
            var length = Math.CopySign(Math.Sqrt(Homogeneous.X * Homogeneous.X + Homogeneous.Y * Homogeneous.Y), IsFinite ? Homogeneous.Z : 1);
            return (Homogeneous.X / length, Homogeneous.Y / length);
        }
    }

    /// <summary>The pixel or the direction, for people.</summary>
    public override string ToString() => Pixel is { } pixel
        ? FormattableString.Invariant($"({pixel.U:0.##}, {pixel.V:0.##}) px in the {View.Name()} view")
        : FormattableString.Invariant($"at infinity in the {View.Name()} view, direction ({Direction.U:0.####}, {Direction.V:0.####})");
}
