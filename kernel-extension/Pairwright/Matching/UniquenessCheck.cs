namespace Pairwright.Matching;

/// <summary>Uniqueness of the lowest total; see <see cref="Check.Uniqueness"/>.</summary>
internal sealed class UniquenessCheck : Check
{
    private readonly double margin;

    public UniquenessCheck(double margin)
    {
        if (!(margin >= 0) || !double.IsFinite(margin))
        {
            throw new UserErrorException($"A uniqueness margin of {margin} is not one; give a finite share of 0 or more, such as 0.05.");
        }

        this.margin = margin;
    }

    public override string Name => "uniqueness";

    public override IReadOnlyList<StageSetting> Settings => [Setting("margin", margin)];

    public override void Apply(RowMatches row)
    {
        var lowest = row.Lowest;
        var second = row.SecondLowest;
        var labels = row.Labels;
        var factor = (float)(1 + margin);
        for (var u = 0; u < labels.Length; u++)
        {
            // Equal totals fail at any margin: two zeros are as ambiguous as two large ones.
            if (labels[u] == DisparityLabel.Measured && !(second[u] > lowest[u] * factor))
            {
                labels[u] = DisparityLabel.NoMatch;
            }
        }
    }
}
