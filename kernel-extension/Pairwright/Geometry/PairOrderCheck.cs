namespace Pairwright.Geometry;

/// <summary>Whether matches fit a rig as named or only with left and right exchanged.</summary>
/// <param name="Matches">How many matches were given.</param>
/// <param name="FitAsNamed">How many of them fit as named: in front of both cameras, and near their epipolar lines.</param>
/// <param name="FitSwapped">How many fit with left and right exchanged.</param>
/// <param name="TolerancePx">The Sampson distance up to which a match counts as near, in pixels.</param>
public sealed record PairOrderCheck(int Matches, int FitAsNamed, int FitSwapped, double TolerancePx)
{
    /// <summary>The judgement: the order that at least half of the matches fit, and more than twice as many as the other.</summary>
    public PairOrder Order =>
        2 * FitAsNamed >= Matches && FitAsNamed > 2 * FitSwapped ? PairOrder.AsNamed
        : 2 * FitSwapped >= Matches && FitSwapped > 2 * FitAsNamed ? PairOrder.Swapped
        : PairOrder.Undecided;

    /// <summary>The judgement in one sentence, with what to do.</summary>
    public string Explanation => Order switch
    {
        PairOrder.AsNamed => $"{FitAsNamed} of {Matches} matches fit the rig as the pictures are named.",
        PairOrder.Swapped =>
            $"The pictures look swapped: {FitSwapped} of {Matches} matches fit the rig with left and right exchanged, but {FitAsNamed} as named; exchange the two files.",
        _ =>
            $"The matches do not tell whether the pictures are swapped: {FitAsNamed} of {Matches} fit the rig as named and {FitSwapped} exchanged; check the rig and the matches.",
    };

    internal static PairOrderCheck Of(Rig rig, IReadOnlyList<RawMatch> matches, double tolerancePx)
    {
        ArgumentNullException.ThrowIfNull(matches);
        if (matches.Count == 0)
        {
            throw new UserErrorException("No matches are given, so nothing tells whether the pictures are swapped; give at least one match.");
        }

        return new(
            matches.Count,
            matches.Count(match => Fits(match.Left, match.Right)),
            matches.Count(match => Fits(match.Right, match.Left)),
            tolerancePx);

        bool Fits(RawPixel left, RawPixel right) =>
            rig.Left.TryUndistort(left) is { } idealLeft
            && rig.Right.TryUndistort(right) is { } idealRight
            && Math.Abs(rig.FundamentalMatrix.SampsonDistance(idealLeft, idealRight)) <= tolerancePx
            && Triangulation.IsInFrontOfBoth(rig.Left.Matrix, rig.Right.Matrix, rig.RightFromLeft, new(idealLeft, idealRight));
    }
}
