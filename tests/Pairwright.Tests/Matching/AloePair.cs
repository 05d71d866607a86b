using OpenCvSharp;
using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Tests.Matching;

/// <summary>The Aloe pair of Middlebury 2006 with its truth (whole disparities, 0 for none), as Debian's package opencv-doc brings it.</summary>
internal sealed class AloePair
{
    private AloePair(RectifiedPair pair, int[] truth) => (Pair, Truth) = (pair, truth);

    public RectifiedPair Pair { get; }

    /// <summary>True disparities in pixels, row after row; 0 where there is none.</summary>
    public int[] Truth { get; }

    /// <summary>A stripe of the pair's rows; all when left out.</summary>
    public static AloePair Read(int first = 0, int count = int.MaxValue)
    {
        var (left, right) = (Picture.Read(OpenData.Find("aloe/aloeL.jpg")), Picture.Read(OpenData.Find("aloe/aloeR.jpg")));
        var truth = Picture.Read(OpenData.Find("aloe/aloeGT.png"));
        var region = new PixelRegion(0, first, left.Size.Width, Math.Min(count, left.Size.Height - first));
        return new(
            new(left.Cropped(region), right.Cropped(region)),
            Array.ConvertAll(truth.Cropped(region).Grey.ToArray(), level => (int)level));
    }

    /// <summary>
    /// OpenCV's semi-global matcher in eight directions with block size 3, penalties 8·9 and 32·9, left-right check 1 and uniqueness 10. Both
    /// pictures are padded on the left by repeating their first column, so that it loses no stripe; NaN where it finds no match.
    /// </summary>
    public float[] OpenCv(int disparities)
    {
        using var left = Padded(Pair.Left, disparities);
        using var right = Padded(Pair.Right, disparities);
        using var matcher = StereoSGBM.Create(
            minDisparity: 0, numDisparities: disparities, blockSize: 3, p1: 8 * 9, p2: 32 * 9, disp12MaxDiff: 1, uniquenessRatio: 10, mode: StereoSGBMMode.HH);
        using var result = new Mat();
        matcher.Compute(left, right, result);
        var (width, height) = (Pair.Size.Width, Pair.Size.Height);
        var map = new float[width * height];
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                // Sixteenths of a pixel; below the least disparity stands what has no match.
                var value = result.At<short>(v, u + disparities);
                map[v * width + u] = value < 0 ? float.NaN : value / 16f;
            }
        }

        return map;
    }

    public Shares SharesOf(ReadOnlySpan<float> disparity)
    {
        var (known, none, beyondOne, beyondTwo) = (0, 0, 0, 0);
        for (var i = 0; i < disparity.Length; i++)
        {
            if (Truth[i] == 0)
            {
                continue;
            }

            known++;
            none += float.IsNaN(disparity[i]) ? 1 : 0;
            beyondOne += Math.Abs(disparity[i] - Truth[i]) > 1 ? 1 : 0;
            beyondTwo += Math.Abs(disparity[i] - Truth[i]) > 2 ? 1 : 0;
        }

        double Share(int part, int of) => 100.0 * part / of;
        return new(Share(none, known), Share(beyondOne, known - none), Share(beyondTwo, known - none), Share(none + beyondOne, known), Share(none + beyondTwo, known));
    }

    private static Mat Padded(Picture picture, int columns)
    {
        using var mat = new Mat(picture.Size.Height, picture.Size.Width, MatType.CV_8UC1);
        mat.SetArray(Array.ConvertAll(picture.Grey.ToArray(), level => (byte)level));
        var padded = new Mat();
        Cv2.CopyMakeBorder(mat, padded, 0, 0, columns, 0, BorderTypes.Replicate);
        return padded;
    }

    /// <summary>Shares of the pixels with truth in per cent; wrong means strictly more than a bound, and integer truth judges nothing below 1 px.</summary>
    internal sealed record Shares(double NoMatch, double MatchedBeyondOne, double MatchedBeyondTwo, double AllBeyondOne, double AllBeyondTwo)
    {
        public override string ToString() =>
            $"no match {NoMatch:0.0} %; among matched > 1 px {MatchedBeyondOne:0.0} %, > 2 px {MatchedBeyondTwo:0.0} %; all, no match counted as wrong, > 1 px {AllBeyondOne:0.0} %, > 2 px {AllBeyondTwo:0.0} %";
    }
}
