namespace Pairwright.Matching;

/// <summary>How one disparity per pixel is chosen from the costs: the third stage of a recipe.</summary>
/// <remarks>Derive from it in a cell to try one of your own.</remarks>
public abstract class Optimisation : Stage
{
    /// <summary>Each pixel for itself: the lowest aggregated cost wins.</summary>
    public static Optimisation WinnerTakesAll { get; } = new WinnerTakesAll();

    /// <summary>Semi-global matching: the costs of the best paths to a pixel from several directions, summed (Hirschmüller 2008).</summary>
    /// <param name="smallPenalty">
    /// What a change of disparity by one costs on a path, on the scale of the cost; a fitting share of what unrelated pixels cost when left out.
    /// </param>
    /// <param name="largePenalty">What any larger change costs, not below the small one; a fitting share of what unrelated pixels cost when left out.</param>
    /// <param name="paths">From how many directions: 4, 8 or 16.</param>
    /// <param name="flatLevels">
    /// Adapts the large penalty to the picture: where two neighbours on a path differ by more grey levels of the 8-bit scale than this, it is
    /// divided by how many times more, but never below the small one. The same everywhere when left out.
    /// </param>
    /// <exception cref="UserErrorException">A penalty is negative or not finite, the large one is below the small one, or another number does not fit.</exception>
    public static Optimisation SemiGlobal(double? smallPenalty = null, double? largePenalty = null, int paths = 8, double? flatLevels = null) =>
        new SemiGlobal(smallPenalty, largePenalty, paths, flatLevels, twoParents: false);

    /// <summary>
    /// Semi-global matching in four passes in which a pixel follows from two neighbours at right angles, so that each pass sees a quarter of the
    /// picture: fewer streaks than single paths, in more time (Facciolo, de Franchis and Meinhardt 2015).
    /// </summary>
    /// <param name="smallPenalty">As of <see cref="SemiGlobal"/>.</param>
    /// <param name="largePenalty">As of <see cref="SemiGlobal"/>.</param>
    /// <param name="flatLevels">As of <see cref="SemiGlobal"/>.</param>
    /// <exception cref="UserErrorException">A penalty is negative or not finite, the large one is below the small one, or another number does not fit.</exception>
    public static Optimisation SemiGlobalWithTwoParents(double? smallPenalty = null, double? largePenalty = null, double? flatLevels = null) =>
        new SemiGlobal(smallPenalty, largePenalty, 4, flatLevels, twoParents: true);

    /// <summary>
    /// Turns the costs of the whole picture into totals, in place; the lowest total of a pixel wins. Costs stay as they are where it is not
    /// overridden. The optimisations that come with the library do without: they never hold the whole volume.
    /// </summary>
    /// <param name="costs">All rows.</param>
    /// <param name="stop">Asks to stop.</param>
    public virtual void Apply(CostVolume costs, CancellationToken stop)
    {
    }
}
