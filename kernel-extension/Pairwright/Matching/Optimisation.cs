namespace Pairwright.Matching;

/// <summary>How one disparity per pixel is chosen from the costs: the third stage of a recipe.</summary>
public abstract class Optimisation : Stage
{
    /// <summary>Semi-global matching: the costs of the best paths to a pixel from eight directions, summed (Hirschmüller 2008).</summary>
    /// <param name="smallPenalty">
    /// What a change of disparity by one costs on a path, on the scale of the cost; a fitting share of <see cref="Cost.Unrelated"/> when left out.
    /// </param>
    /// <param name="largePenalty">What any larger change costs, not below the small one; a fitting share of <see cref="Cost.Unrelated"/> when left out.</param>
    /// <exception cref="UserErrorException">A penalty is negative or not finite, or the large one is below the small one.</exception>
    public static Optimisation SemiGlobal(double? smallPenalty = null, double? largePenalty = null) => new SemiGlobal(smallPenalty, largePenalty);
}
