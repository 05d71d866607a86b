namespace Pairwright.Matching;

/// <summary>Left-right consistency; see <see cref="Check.LeftRight"/>.</summary>
internal sealed class LeftRightCheck : Check
{
    private readonly int tolerance;

    public LeftRightCheck(int tolerance)
    {
        if (tolerance < 0)
        {
            throw new UserErrorException($"A left-right tolerance of {tolerance} px is negative; give 0 or more.");
        }

        this.tolerance = tolerance;
    }

    public override string Name => "left-right";

    public override IReadOnlyList<StageSetting> Settings => [Setting("tolerance px", tolerance)];

    public override void Apply(RowMatches row)
    {
        var winner = row.Winner;
        var rightWinner = row.RightWinner;
        var labels = row.Labels;

        // A left pixel at which some right pixel points was seen by the right camera: a mismatch, not an occlusion.
        Span<bool> seen = new bool[winner.Length];
        for (var r = 0; r < rightWinner.Length; r++)
        {
            if (rightWinner[r] != RowMatches.None)
            {
                seen[r + rightWinner[r]] = true;
            }
        }

        for (var u = 0; u < winner.Length; u++)
        {
            if (labels[u] == DisparityLabel.Measured && Math.Abs(rightWinner[u - winner[u]] - winner[u]) > tolerance)
            {
                labels[u] = seen[u] ? DisparityLabel.NoMatch : DisparityLabel.Occluded;
            }
        }
    }
}
