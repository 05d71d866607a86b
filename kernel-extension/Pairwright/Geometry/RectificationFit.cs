namespace Pairwright.Geometry;

/// <summary>What of the two pictures a rectification keeps.</summary>
public enum RectificationFit
{
    /// <summary>The largest rectangle of rows and columns that both pictures fill wholly; the rest is cropped.</summary>
    Cropped,

    /// <summary>Everything that either picture shows; pixels that a camera did not see stay empty.</summary>
    Everything,
}
