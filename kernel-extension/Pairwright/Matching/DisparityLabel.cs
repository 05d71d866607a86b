namespace Pairwright.Matching;

/// <summary>What became of a pixel in a match.</summary>
public enum DisparityLabel : byte
{
    /// <summary>Its disparity was measured.</summary>
    Measured,

    /// <summary>No match that the checks accept: too plain, repeating, or the two directions disagree.</summary>
    NoMatch,

    /// <summary>Most likely hidden from the right camera (Hirschmüller 2008, section 2.5).</summary>
    Occluded,

    /// <summary>The best match stood at an end of what could be searched, so the true one may lie beyond.</summary>
    RangeEnd,

    /// <summary>It belonged to a patch too small to be believed.</summary>
    Speckle,

    /// <summary>The pixel is marked as not usable in the left picture.</summary>
    Unusable,

    /// <summary>Not measured; the value was filled in from its surroundings and never counts as measured.</summary>
    Filled,
}
