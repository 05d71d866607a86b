using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The cost of each position along the epipolar curve of one left pixel, and the match that it shows.</summary>
/// <remarks>Immutable. Positions are in the pictures as the lenses formed them.</remarks>
public sealed class CostCurve
{
    internal CostCurve(StereoPair pair, RawPixel from, WindowCost cost, IReadOnlyList<CostSample> samples, CostPeak peak, Picture leftPatch, Picture? rightPatch)
    {
        (Pair, From, Cost, Samples, LeftPatch, RightPatch) = (pair, from, cost, samples, leftPatch, rightPatch);
        (BestIndex, SecondBestIndex, PeakRatio, Match, MatchDepthMm, MatchCost, SigmaPx, Objection) = peak;
    }

    /// <summary>The pair that was searched.</summary>
    public StereoPair Pair { get; }

    /// <summary>The pixel of the left picture whose match was sought.</summary>
    public RawPixel From { get; }

    /// <summary>How windows were compared.</summary>
    public Cost Cost { get; }

    /// <summary>The samples along the curve, from far to near; those whose window leaves the picture are missing.</summary>
    public IReadOnlyList<CostSample> Samples { get; }

    /// <summary>The place of the lowest cost in <see cref="Samples"/>; −1 where there are none.</summary>
    public int BestIndex { get; }

    /// <summary>The place of the lowest cost outside the best one's dip; −1 where there is none.</summary>
    public int SecondBestIndex { get; }

    /// <summary>
    /// The cost of the second best over that of the best, each with half a percent of an unrelated pair's cost added so that equal windows do
    /// not divide by zero. 1 is ambiguous. For correlation it is about the ratio of the residual variances.
    /// </summary>
    public double PeakRatio { get; }

    /// <summary>The match, to a fraction of a pixel; NaN where there is none.</summary>
    public RawPixel Match { get; }

    /// <summary>The match's depth along the left camera's axis, in millimetres; NaN where there is none.</summary>
    public double MatchDepthMm { get; }

    /// <summary>The cost at the match.</summary>
    public double MatchCost { get; }

    /// <summary>
    /// The standard uncertainty of the match along the curve, in pixels, from what is left between the windows at the match and their gradient
    /// along the curve; infinite where the window has no gradient along it.
    /// </summary>
    public double SigmaPx { get; }

    /// <summary>Whether the match can be believed: nothing speaks against it.</summary>
    public bool Distinct => Objection.Length == 0;

    /// <summary>What speaks against the match, in one sentence; empty where nothing does.</summary>
    public string Objection { get; }

    /// <summary>The window of the left picture.</summary>
    public Picture LeftPatch { get; }

    /// <summary>The window of the right picture at the match, brought into the left window's shape; nothing where there is no match.</summary>
    public Picture? RightPatch { get; }
}
