namespace Pairwright.Geometry;

/// <summary>Whether the left and right pictures of a pair are what their names say.</summary>
public enum PairOrder
{
    /// <summary>The matches fit the rig as named.</summary>
    AsNamed,

    /// <summary>The matches fit the rig only when left and right are exchanged.</summary>
    Swapped,

    /// <summary>The matches fit neither way, or both alike.</summary>
    Undecided,
}
