using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>What a cost curve shows; see <see cref="CostCurve"/> for the meaning of each.</summary>
internal sealed record CostPeak(
    int BestIndex, int SecondBestIndex, double PeakRatio, RawPixel Match, double MatchDepthMm, double MatchCost, double SigmaPx, string Objection);
