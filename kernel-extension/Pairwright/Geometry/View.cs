namespace Pairwright.Geometry;

/// <summary>Which picture of a pair. The left one is the reference.</summary>
public enum View
{
    /// <summary>The reference view.</summary>
    Left,

    /// <summary>The other view.</summary>
    Right,
}
