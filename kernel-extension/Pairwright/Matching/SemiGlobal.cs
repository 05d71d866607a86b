namespace Pairwright.Matching;

/// <summary>Semi-global matching; see <see cref="Optimisation.SemiGlobal"/>.</summary>
/// <remarks>
/// <para>
/// Hirschmüller, Stereo processing by semiglobal matching and mutual information, PAMI 2008, equations 13 and 14:
/// L_r(p, d) = C(p, d) + min(L_r(p−r, d), L_r(p−r, d±1) + P1, min_i L_r(p−r, i) + P2) − min_k L_r(p−r, k), and S(p, d) = Σ_r L_r(p, d).
/// </para>
/// <para>
/// With two parents (Facciolo, de Franchis and Meinhardt, MGM: a significantly more global matching for stereovision, BMVC 2015) the step is the
/// mean over the pixel before and the one at right angles, so that each of four passes sums over a quarter of the picture instead of a line.
/// </para>
/// </remarks>
internal sealed class SemiGlobal : Optimisation
{
    private readonly double? small;
    private readonly double? large;

    public SemiGlobal(double? small, double? large, int paths, double? flatLevels, bool twoParents)
    {
        if (small is { } s && !(s >= 0 && double.IsFinite(s)) || large is { } l && !(l >= (small ?? 0) && double.IsFinite(l)))
        {
            throw new UserErrorException(
                $"Penalties of {small} and {large} do not fit semi-global matching; give finite ones, not below zero, the large one not below the small one.");
        }

        if (paths is not (4 or 8 or 16))
        {
            throw new UserErrorException($"Semi-global matching over {paths} paths is not one; give 4, 8 or 16.");
        }

        if (flatLevels is { } flat && !(flat > 0 && double.IsFinite(flat)))
        {
            throw new UserErrorException(
                $"A flat difference of {flatLevels} grey levels is not one; give a number above zero, or none for a large penalty that is the same everywhere.");
        }

        (this.small, this.large, Paths, FlatLevels, TwoParents) = (small, large, paths, flatLevels, twoParents);
    }

    public override string Name => TwoParents ? "semi-global with two parents" : "semi-global";

    public override IReadOnlyList<StageSetting> Settings =>
    [
        .. TwoParents ? Array.Empty<StageSetting>() : [Setting("paths", Paths)],
        .. small is { } s ? [Setting("small penalty", s)] : Array.Empty<StageSetting>(),
        .. large is { } l ? [Setting("large penalty", l)] : Array.Empty<StageSetting>(),
        .. FlatLevels is { } flat ? [Setting("flat levels", flat)] : Array.Empty<StageSetting>(),
    ];

    /// <summary>How many paths lead to a pixel.</summary>
    public int Paths { get; }

    /// <summary>The difference of grey levels, on the 8-bit scale, beyond which the large penalty falls; nothing where it is the same everywhere.</summary>
    public double? FlatLevels { get; }

    /// <summary>Whether a path comes from two pixels at right angles.</summary>
    public bool TwoParents { get; }

    /// <summary>The penalty of a change by one for a cost's typical value between unrelated pixels; whole where the scale of the cost allows it.</summary>
    public double SmallPenalty(double unrelated) => small ?? Math.Min(Share(unrelated, 0.25), large ?? double.PositiveInfinity);

    /// <summary>The penalty of a larger change.</summary>
    public double LargePenalty(double unrelated) => Math.Max(large ?? Share(unrelated, 1.5), SmallPenalty(unrelated));

    // Whole penalties keep census on whole numbers, where the fast path works.
    private static double Share(double unrelated, double share) => unrelated >= 4 ? Math.Round(unrelated * share) : unrelated * share;
}
