namespace Pairwright.Matching;

/// <summary>Semi-global matching over eight paths; see <see cref="Optimisation.SemiGlobal"/>.</summary>
/// <remarks>
/// Hirschmüller, Stereo processing by semiglobal matching and mutual information, PAMI 2008, equations 13 and 14:
/// L_r(p, d) = C(p, d) + min(L_r(p−r, d), L_r(p−r, d±1) + P1, min_i L_r(p−r, i) + P2) − min_k L_r(p−r, k), and S(p, d) = Σ_r L_r(p, d).
/// </remarks>
internal sealed class SemiGlobal : Optimisation
{
    private readonly double? small;
    private readonly double? large;

    public SemiGlobal(double? small, double? large)
    {
        if (small is { } s && !(s >= 0 && double.IsFinite(s)) || large is { } l && !(l >= (small ?? 0) && double.IsFinite(l)))
        {
            throw new UserErrorException(
                $"Penalties of {small} and {large} do not fit semi-global matching; give finite ones, not below zero, the large one not below the small one.");
        }

        (this.small, this.large) = (small, large);
    }

    public override string Name => "semi-global";

    public override IReadOnlyList<StageSetting> Settings =>
    [
        .. small is { } s ? [Setting("small penalty", s)] : Array.Empty<StageSetting>(),
        .. large is { } l ? [Setting("large penalty", l)] : Array.Empty<StageSetting>(),
    ];

    /// <summary>The penalty of a change by one for a cost's typical value between unrelated pixels; whole where the scale of the cost allows it.</summary>
    public double SmallPenalty(double unrelated) => small ?? Math.Min(Share(unrelated, 0.25), large ?? double.PositiveInfinity);

    /// <summary>The penalty of a larger change.</summary>
    public double LargePenalty(double unrelated) => Math.Max(large ?? Share(unrelated, 1.5), SmallPenalty(unrelated));

    // Whole penalties keep census on whole numbers, where the fast path works.
    private static double Share(double unrelated, double share) => unrelated >= 4 ? Math.Round(unrelated * share) : unrelated * share;
}
