namespace Pairwright.Trials;

/// <summary>Parts of a picture over which a disparity map is judged, after Scharstein and Szeliski, IJCV 2002, section 5.1.</summary>
public enum TruthRegion
{
    /// <summary>Every pixel whose true disparity is known.</summary>
    All,

    /// <summary>Those that both cameras see.</summary>
    Unoccluded,

    /// <summary>Those that both cameras see and that lie within <see cref="DisparityTruth.EdgeReachPx"/> of a jump in depth.</summary>
    NearDepthEdges,

    /// <summary>Those that both cameras see and whose surroundings have no texture along the row.</summary>
    Plain,
}
