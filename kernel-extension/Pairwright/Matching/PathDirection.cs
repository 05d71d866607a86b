namespace Pairwright.Matching;

/// <summary>The pixels that a path comes to a pixel from: one, or two at right angles.</summary>
/// <param name="U">Columns from the first of them to the pixel.</param>
/// <param name="V">Rows from the first of them to the pixel.</param>
/// <param name="Second">The same for the second; nothing where there is one alone.</param>
internal readonly record struct PathDirection(int U, int V, (int U, int V)? Second = null)
{
    private static readonly PathDirection[] Sixteen =
    [
        new(1, 0), new(-1, 0), new(0, 1), new(0, -1),
        new(1, 1), new(-1, -1), new(-1, 1), new(1, -1),
        new(2, 1), new(-2, -1), new(-2, 1), new(2, -1),
        new(1, 2), new(-1, -2), new(-1, 2), new(1, -2),
    ];

    // Each sees one quarter of the picture: the path's own way, and the one at right angles to it that the same pass has been over.
    private static readonly PathDirection[] Quarters = [new(1, 0, (0, 1)), new(-1, 0, (0, -1)), new(0, 1, (-1, 0)), new(0, -1, (1, 0))];

    /// <summary>The directions of a number of paths.</summary>
    public static PathDirection[] Of(int paths, bool twoParents) => twoParents ? Quarters : Sixteen[..paths];

    /// <summary>Whether the path lies within a row and knows nothing of others.</summary>
    public bool IsWithinRow => V == 0 && Second is null;

    /// <summary>Whether the path is followed from the top down; those within a row are neither.</summary>
    public bool IsDown => V > 0 || Second is { V: > 0 };

    /// <summary>Whether the path is followed from the bottom up.</summary>
    public bool IsUp => V < 0 || Second is { V: < 0 };

    /// <summary>Whether a pixel depends on another of its own row.</summary>
    public bool NeedsOwnRow => Second is not null;

    /// <summary>How many earlier rows a row depends on.</summary>
    public int Depth => Math.Max(Math.Abs(V), Math.Abs(Second?.V ?? 0));
}
