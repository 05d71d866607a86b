using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Tests.Geometry;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Imaging;

public sealed class FeatureMatchingTests(ITestOutputHelper output)
{
    /// <summary>
    /// The two uncalibrated views of Debian's opencv-doc. Reference: OpenCV's findFundamentalMat (random sample consensus, same tolerance) on
    /// the same matches.
    /// </summary>
    [SkippableFact]
    public void The_fundamental_matrix_of_the_uncalibrated_views_fits_more_matches_and_better_than_OpenCVs()
    {
        var pair = StereoPair.Read(OpenData.Find("two-views/left.jpg"), OpenData.Find("two-views/right.jpg"));
        var ours = pair.FundamentalMatrixFromFeatures(tolerancePx: 1);
        var estimation = ours.Estimation!;
        var theirs = FundamentalMatrix.From(
            ReferenceOpenCv.Fundamental(estimation.Matches, FundamentalMatMethods.Ransac, 1, out var usedByThem));
        IdealMatch[] both = [.. estimation.Matches.Where((_, i) => estimation.Consistent[i] && usedByThem[i])];
        output.WriteLine(
            $"{estimation.ConsistentCount} of {estimation.Matches.Length} matches consistent, Sampson RMS {estimation.SampsonRmsPx:0.000} px; "
            + $"OpenCV used {usedByThem.Count(used => used)}; on the {both.Length} of both ours {Rms(ours, both):0.000} px, OpenCV {Rms(theirs, both):0.000} px");

        Assert.True(estimation.Matches.Length >= 80);
        Assert.True(estimation.ConsistentCount >= usedByThem.Count(used => used));
        Assert.True(Rms(ours, both) <= Rms(theirs, both));
        Assert.InRange(estimation.SampsonRmsPx, 0.05, 0.4);
        Assert.Equal(2, ours.Rank);

        // Where OpenCV is sure of a match, our line passes by it too.
        Assert.All(both, match => Assert.InRange(Math.Abs(ours.EpipolarDistance(match.Left, match.Right)), 0, 2));
    }

    [SkippableFact]
    public void Another_seed_finds_the_same_matrix_in_the_uncalibrated_views()
    {
        var pair = StereoPair.Read(OpenData.Find("two-views/left.jpg"), OpenData.Find("two-views/right.jpg"));
        var matches = pair.FundamentalMatrixFromFeatures().Estimation!.Matches;
        var counts = Enumerable.Range(1, 8).Select(seed => FundamentalMatrix.FromMatches(matches, 1, seed).Estimation!.ConsistentCount).ToArray();
        output.WriteLine(string.Join(", ", counts));
        Assert.InRange(counts.Max() - counts.Min(), 0, 3);
    }

    /// <summary>
    /// The Aloe pair of Middlebury 2006, whose rows match and whose left and right are known. Its focal length and baseline (3740 px at three
    /// times the size, 160 mm) are typed from memory; the order depends on neither.
    /// </summary>
    [SkippableFact]
    public void A_swapped_real_pair_is_told_from_its_rig()
    {
        var (left, right) = (Picture.Read(OpenData.Find("aloe/aloeL.jpg")), Picture.Read(OpenData.Find("aloe/aloeR.jpg")));
        var camera = new Camera(new(3740 / 3.0, 3740 / 3.0, left.Size.Width / 2.0, left.Size.Height / 2.0), left.Size);
        var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(-160, 0, 0)));
        Assert.Equal(PairOrder.AsNamed, new StereoPair(left, right, rig).OrderFromFeatures().Order);
        Assert.Equal(PairOrder.Swapped, new StereoPair(right, left, rig).OrderFromFeatures().Order);
        Assert.Throws<UserErrorException>(() => new StereoPair(left, right).OrderFromFeatures());
    }

    /// <summary>Reference: Gaussian blobs drawn at known places; the same picture on both sides.</summary>
    [Fact]
    public void Features_lie_where_the_blobs_were_drawn()
    {
        var random = new Random(1);
        var blobs = Enumerable.Range(0, 25)
            .Select(i => (U: 40 + 70 * (i % 5) + random.NextDouble(), V: 40 + 55 * (i / 5) + random.NextDouble(), Sigma: 2.5 + 2 * random.NextDouble()))
            .ToArray();
        var picture = Drawn(new(400, 320), (u, v) => 40 + blobs.Sum(b => 120 * Math.Exp(-(((u - b.U) * (u - b.U)) + ((v - b.V) * (v - b.V))) / (2 * b.Sigma * b.Sigma))));
        var places = new StereoPair(picture, picture).MatchFeatures(distinctness: 1).Select(match => match.Left).ToArray();
        var errors = blobs
            .Select(blob => (Blob: blob, Found: places.MinBy(place => Math.Abs(place.U - blob.U) + Math.Abs(place.V - blob.V))))
            .Select(pair => (U: pair.Found.U - pair.Blob.U, V: pair.Found.V - pair.Blob.V))
            .Where(error => Math.Abs(error.U) + Math.Abs(error.V) < 1)
            .ToArray();
        Assert.True(errors.Length >= 15, $"{errors.Length}");
        Assert.InRange(errors.Average(error => error.U), -0.05, 0.05);
        Assert.InRange(errors.Average(error => error.V), -0.05, 0.05);
    }

    [Fact]
    public void Plain_pictures_have_no_matches_and_no_fundamental_matrix()
    {
        var plain = Drawn(new(100, 80), (_, _) => 100);
        var pair = new StereoPair(plain, plain);
        Assert.Empty(pair.MatchFeatures());
        Assert.Throws<UserErrorException>(() => pair.FundamentalMatrixFromFeatures());
        Assert.Throws<UserErrorException>(() => pair.MatchFeatures(distinctness: 0));
        Assert.Throws<UserErrorException>(() => pair.MatchFeatures(mostFeatures: 3));
    }

    private static double Rms(FundamentalMatrix matrix, IdealMatch[] matches) =>
        Math.Sqrt(matches.Average(match => matrix.SampsonDistance(match.Left, match.Right) is var distance ? distance * distance : 0));

    private static Picture Drawn(PictureSize size, Func<int, int, double> level) => new(
        size, [.. Enumerable.Range(0, (int)size.Area).Select(i => (ushort)Math.Clamp(Math.Round(level(i % size.Width, i / size.Width)), 0, 255))]);
}
