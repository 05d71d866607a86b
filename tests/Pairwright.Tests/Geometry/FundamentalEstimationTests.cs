using MathNet.Numerics.Distributions;
using OpenCvSharp;
using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class FundamentalEstimationTests
{
    [Fact]
    public void Eight_exact_matches_give_the_matrix_of_the_rig()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 101, count: 100, pointsPerRig: 40))
        {
            IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point))];
            var f = FundamentalMatrix.FromEightPoints(matches);
            foreach (var match in matches)
            {
                Assert.InRange(Math.Abs(f.SampsonDistance(match.Left, match.Right)), 0, 1e-6);
            }

            Assert.Equal(40, f.Estimation!.ConsistentCount);
            Assert.InRange(f.RankTwoDeviation, 0, 1e-6);
        }
    }

    /// <summary>Reference: OpenCV's findFundamentalMat with eight points, on the same noisy matches.</summary>
    [Fact]
    public void The_eight_point_method_agrees_with_OpenCV()
    {
        var random = new Random(102);
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 102, count: 100, pointsPerRig: 40))
        {
            IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point).Noisy(random, 0.3))];
            var ours = FundamentalMatrix.FromEightPoints(matches);
            var theirs = FundamentalMatrix.From(ReferenceOpenCv.Fundamental(matches, FundamentalMatMethods.Point8, 1, out _));
            foreach (var match in matches)
            {
                var (a, b) = (ours.SampsonDistance(match.Left, match.Right), theirs.SampsonDistance(match.Left, match.Right));
                Assert.InRange(Math.Abs(a - b), 0, 1e-4 * (1 + Math.Abs(a)));
            }
        }
    }

    [Fact]
    public void Outliers_are_left_out_and_the_matrix_is_that_of_the_rest()
    {
        var random = new Random(103);
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 103, count: 5, pointsPerRig: 150))
        {
            const double sigma = 0.2;
            var (width, height) = (rig.Right.Size.Width, rig.Right.Size.Height);
            IdealMatch[] matches =
            [
                .. points.Select((point, i) => Matches.Of(rig, point).Noisy(random, sigma) is var match && i % 3 != 0
                    ? match
                    : match with { Right = new(width * random.NextDouble(), height * random.NextDouble()) }),
            ];
            var f = FundamentalMatrix.FromMatches(matches, tolerancePx: 4 * sigma, seed: 7);
            var estimation = f.Estimation!;
            Assert.True(Enumerable.Range(0, 150).Where(i => i % 3 != 0).Count(i => estimation.Consistent[i]) >= 97);
            Assert.True(Enumerable.Range(0, 150).Where(i => i % 3 == 0).Count(i => estimation.Consistent[i]) <= 5);
            Assert.InRange(estimation.SigmaPx, 0.8 * sigma, 1.2 * sigma);

            // Against the exact matches, which the estimate never saw.
            var exact = points.Select(point => Matches.Of(rig, point)).Select(match => f.SampsonDistance(match.Left, match.Right));
            Assert.InRange(Math.Sqrt(exact.Average(distance => distance * distance)), 0, sigma);
        }
    }

    /// <summary>
    /// Reference: for independent noise of size σ the sum of squared Sampson distances at the least-squares solution is σ² times chi-squared
    /// with n − 7 degrees of freedom, to first order. Over 40 trials of n = 40 the sum must lie within the 99.9 % interval.
    /// </summary>
    [Fact]
    public void Refined_residuals_are_as_large_as_the_noise_says()
    {
        const double sigma = 0.1;
        var random = new Random(104);
        var (sum, freedoms) = (0.0, 0);
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 104, count: 40, pointsPerRig: 40))
        {
            IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point).Noisy(random, sigma))];
            var estimation = FundamentalMatrix.FromMatches(matches, tolerancePx: 10 * sigma).Estimation!;
            Assert.Equal(40, estimation.ConsistentCount);
            sum += estimation.SampsonDistancesPx.Sum(distance => distance * distance) / (sigma * sigma);
            freedoms += 40 - 7;
        }

        Assert.InRange(sum, ChiSquared.InvCDF(freedoms, 0.0005), ChiSquared.InvCDF(freedoms, 0.9995));
    }

    [Fact]
    public void Refinement_never_fits_worse_than_eight_points()
    {
        var random = new Random(105);
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 105, count: 15, pointsPerRig: 30))
        {
            IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point).Noisy(random, 0.5))];
            var refined = FundamentalMatrix.FromMatches(matches, tolerancePx: 20).Estimation!;
            Assert.True(refined.SampsonRmsPx <= FundamentalMatrix.FromEightPoints(matches).Estimation!.SampsonRmsPx + 1e-12);
        }
    }

    [Fact]
    public void The_same_seed_gives_the_same_matrix_and_residuals_have_the_sign_of_the_matrix()
    {
        var random = new Random(106);
        var (rig, points) = RandomRigs.WithPoints(seed: 106, count: 1, pointsPerRig: 60).Single();
        IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point).Noisy(random, 0.5))];
        var (a, b) = (FundamentalMatrix.FromMatches(matches, seed: 3), FundamentalMatrix.FromMatches(matches, seed: 3));
        Assert.Equal(a.Matrix, b.Matrix);
        Assert.Equal(a.SampsonDistance(matches[5].Left, matches[5].Right), a.Estimation!.SampsonDistancesPx[5], 12);
    }

    [Fact]
    public void Too_few_matches_or_matches_that_fix_nothing_are_refused()
    {
        var (rig, points) = RandomRigs.WithPoints(seed: 107, count: 1, pointsPerRig: 20).Single();
        IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point))];
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromEightPoints(matches[..7]));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromMatches(matches[..7]));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromMatches([.. Enumerable.Repeat(matches[0], 20)]));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromMatches([.. matches[..10], new(new(double.NaN, 0), new(0, 0))]));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromMatches(matches, tolerancePx: 0));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromMatches(matches, confidence: 1));

        // A plane: one homography explains all matches, and a family of matrices fits.
        IdealMatch[] plane =
        [
            .. Enumerable.Range(0, 25).Select(i => Matches.Of(rig, 10 * rig.BaselineMm * new Vector3D(0.02 * (i % 5), 0.02 * (i / 5), 1))),
        ];
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.FromEightPoints(plane));
    }
}
