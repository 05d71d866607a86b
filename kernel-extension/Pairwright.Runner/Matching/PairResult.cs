using Pairwright.Matching;
using Pairwright.Trials;

namespace Pairwright.Runner.Matching;

/// <summary>What came of one pair.</summary>
/// <param name="Map">The map.</param>
/// <param name="Accuracy">How near its measured values come to the truth, where that is known.</param>
/// <param name="AccuracyWithFilled">The same of measured and filled values, where gaps were filled.</param>
internal sealed record PairResult(DisparityMap Map, DisparityAccuracy? Accuracy, DisparityAccuracy? AccuracyWithFilled);
