namespace Pairwright.Geometry;

internal static class FundamentalEstimator
{
    public static FundamentalMatrix Robust(IReadOnlyList<IdealMatch> matches, double tolerancePx, int seed, double confidence) =>
        throw new NotImplementedException();

    public static FundamentalMatrix EightPoints(IReadOnlyList<IdealMatch> matches) => throw new NotImplementedException();
}
