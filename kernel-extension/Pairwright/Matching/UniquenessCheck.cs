using System.Runtime.Intrinsics;

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

        // Equal totals fail at any margin: two zeros are as ambiguous as two large ones.
        var u = 0;
        for (; u <= labels.Length - LabelVectors.Step; u += LabelVectors.Step)
        {
            var label = LabelVectors.Load(labels, u);
            var stands = Vector256.GreaterThan(Vector256.Create<float>(second[u..]), Vector256.Create<float>(lowest[u..]) * factor).AsInt32();
            var fails = LabelVectors.Are(label, DisparityLabel.Measured) & ~stands;
            LabelVectors.Store(Vector256.ConditionalSelect(fails, Vector256.Create((int)DisparityLabel.NoMatch), label), labels, u);
        }

        for (; u < labels.Length; u++)
        {
            if (labels[u] == DisparityLabel.Measured && !(second[u] > lowest[u] * factor))
            {
                labels[u] = DisparityLabel.NoMatch;
            }
        }
    }
}
