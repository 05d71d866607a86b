using OpenCvSharp;
using OpenCvSharp.Features2D;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Finds points that both pictures of a pair show, without knowing the cameras.</summary>
public static class FeatureMatching
{
    // The detector doubles the picture about its top-left corner and halves positions about the centre of the top-left pixel, so that all of
    // them come out a quarter of a pixel too far right and down; blobs at known places show it.
    private const double DetectorShiftPx = 0.25;

    /// <summary>Matches of scale-invariant features (Lowe 2004) of both pictures.</summary>
    /// <remarks>
    /// A match must be the best both ways, and its descriptor distance less than <paramref name="distinctness"/> of that to the second best
    /// (Lowe's ratio). Some matches will be wrong: estimate robustly. Features off a picture's usable pixels are not taken. In the order of
    /// the left picture's rows.
    /// </remarks>
    /// <param name="pair">The pair.</param>
    /// <param name="mostFeatures">The greatest number of features per picture, strongest first.</param>
    /// <param name="distinctness">The greatest share of the second best distance, above 0 and at most 1.</param>
    /// <exception cref="UserErrorException">A setting is out of its range.</exception>
    public static IReadOnlyList<RawMatch> MatchFeatures(this StereoPair pair, int mostFeatures = 5000, double distinctness = 0.75)
    {
        ArgumentNullException.ThrowIfNull(pair);
        if (mostFeatures < 8 || !(distinctness is > 0 and <= 1))
        {
            throw new UserErrorException(
                $"Features cannot be matched with at most {mostFeatures} of them and a distinctness of {distinctness}; give at least 8 and a distinctness above 0 and up to 1.");
        }

        OpenCvLibrary.Require();
        using var left = Features.Of(pair.Left, mostFeatures);
        using var right = Features.Of(pair.Right, mostFeatures);
        if (left.Places.Length < 2 || right.Places.Length < 2)
        {
            return [];
        }

        var back = Best(right.Descriptors, left.Descriptors, distinctness: 1);
        return
        [
            .. Best(left.Descriptors, right.Descriptors, distinctness)
                .Where(match => back.TryGetValue(match.Value, out var returned) && returned == match.Key)
                .Select(match => new RawMatch(left.Places[match.Key], right.Places[match.Value]))
                .Distinct()
                .OrderBy(match => match.Left.V)
                .ThenBy(match => match.Left.U)
                .ThenBy(match => match.Right.U),
        ];
    }

    /// <summary>The fundamental matrix told from the pictures alone, by <see cref="MatchFeatures"/> and <see cref="FundamentalMatrix.FromMatches"/>.</summary>
    /// <remarks>Lens distortion is taken out where the pair has a rig; otherwise raw pixels stand in for ideal ones. The rig's pose is not used.</remarks>
    /// <param name="pair">The pair.</param>
    /// <param name="tolerancePx">A match counts as consistent when its Sampson distance is at most this, in pixels.</param>
    /// <param name="seed">The seed of the random samples.</param>
    /// <exception cref="UserErrorException">The pictures have too little in common.</exception>
    public static FundamentalMatrix FundamentalMatrixFromFeatures(this StereoPair pair, double tolerancePx = 1, int seed = 1)
    {
        var matches = pair.MatchFeatures();
        return FundamentalMatrix.FromMatches([.. pair.Rig is { } rig ? Ideal(rig, matches) : matches.Select(AsIdeal)], tolerancePx, seed);
    }

    /// <summary>Whether the pair's pictures are swapped against its rig, told by <see cref="MatchFeatures"/> and <see cref="Rig.OrderOf"/>.</summary>
    /// <param name="pair">The pair, with a rig whose cameras take pictures of one size.</param>
    /// <exception cref="UserErrorException">The pair has no rig, or the pictures have no feature in common.</exception>
    public static PairOrderCheck OrderFromFeatures(this StereoPair pair)
    {
        ArgumentNullException.ThrowIfNull(pair);
        var rig = pair.Rig ?? throw new UserErrorException("The pair has no rig to hold its order against; read it with its rig.");
        return rig.OrderOf(pair.MatchFeatures(mostFeatures: 1000));
    }

    private static IEnumerable<IdealMatch> Ideal(Rig rig, IEnumerable<RawMatch> matches)
    {
        foreach (var match in matches)
        {
            if (rig.Left.TryUndistort(match.Left) is { } left && rig.Right.TryUndistort(match.Right) is { } right)
            {
                yield return new(left, right);
            }
        }
    }

    private static IdealMatch AsIdeal(RawMatch match) => new(new(match.Left.U, match.Left.V), new(match.Right.U, match.Right.V));

    private static Dictionary<int, int> Best(Mat from, Mat to, double distinctness)
    {
        using var matcher = new BFMatcher(NormTypes.L2);
        return matcher.KnnMatch(from, to, 2)
            .Where(best => best.Length == 2 && best[0].Distance <= distinctness * best[1].Distance)
            .ToDictionary(best => best[0].QueryIdx, best => best[0].TrainIdx);
    }

    private sealed record Features(RawPixel[] Places, Mat Descriptors) : IDisposable
    {
        public static Features Of(Picture picture, int most)
        {
            var down = picture.SignificantBits - 8;
            var levels = new byte[picture.Size.Area];
            for (var i = 0; i < levels.Length; i++)
            {
                levels[i] = (byte)(picture.Grey[i] >> down);
            }

            using var grey = Mat.FromPixelData(picture.Size.Height, picture.Size.Width, MatType.CV_8UC1, levels);
            using var usable = new Mat();
            if (picture.Usable is { } mask)
            {
                using var marks = Mat.FromPixelData(
                    picture.Size.Height, picture.Size.Width, MatType.CV_8UC1, Array.ConvertAll(mask.Usable.ToArray(), pixel => pixel ? (byte)255 : (byte)0));
                marks.CopyTo(usable);
            }

            using var detector = SIFT.Create(most);
            var descriptors = new Mat();
            detector.DetectAndCompute(grey, usable, out var points, descriptors);
            return new([.. points.Select(point => new RawPixel(point.Pt.X - DetectorShiftPx, point.Pt.Y - DetectorShiftPx))], descriptors);
        }

        public void Dispose() => Descriptors.Dispose();
    }
}
