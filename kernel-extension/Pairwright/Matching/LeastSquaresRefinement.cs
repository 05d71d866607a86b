using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Least squares on the pictures themselves; see <see cref="Filter.LeastSquares"/>.</summary>
/// <remarks>
/// <para>
/// With the right picture warped by the map so far, the difference of the two pictures around a pixel is, to first order, the error of the
/// disparity times the pictures' slope along the row, plus a difference of gain and of offset (Lucas and Kanade 1981; gain and offset after
/// Ackermann 1984). A weighted least-squares solution over the window gives the step of its centre. Each neighbour is warped by its own
/// disparity, so that slants and depth edges inside a window do no harm; weights fall off as a pyramid (a box twice over), whose transfer
/// function has no negative lobe.
/// </para>
/// <para>
/// After the first round the pair's <see cref="RowOffset"/> is estimated, and the right picture looked up that much beside the row: where texture
/// runs aslant, an offset of the rows would pass for disparity.
/// </para>
/// <para>
/// Before every round the map is smoothed along its surfaces, each pixel by what its window knows. Without that, rounds would sharpen what
/// windows blur, and with it the noise. Planes pass through smoothing and windows unchanged.
/// </para>
/// <para>
/// The right picture's slope stands in the equations and the left one's asks them (instrumental variables; Durbin 1954): the noises of the two
/// are independent, so that noise neither pulls nor passes for texture. The left slopes are those of a Gaussian: texture near the pixels' own
/// fineness, which no interpolation carries over rightly (Schreier, Braasch and Sutton 2000), then hardly pulls.
/// </para>
/// <para>
/// The σ is that of the weighted solution: noise over slopes, as in Sabater, Morel and Almansa (2011), with the noise of both pictures taken
/// from the window's own residual.
/// </para>
/// </remarks>
internal sealed class LeastSquaresRefinement : Filter
{
    /// <summary>The share of white noise's variance that is left on average after a look-up between pixels along one axis by cubic splines: ∫η² of the cardinal spline η.</summary>
    internal const double NoiseLeft = 0.87423;

    private const int Rounds = 3;
    private const int BandRows = 64;

    // A pixel that the pictures move farther than this from its match was no match.
    private const float FarthestMovePx = 1;

    // Noise finds a place within reach where it looks like noise; four standard deviations keep that out.
    private const float LargestSigmaPx = FarthestMovePx / 4;

    // Windows with less than this share of their weight on matched pixels say too little.
    private const double LeastShare = 0.15;

    // The Gaussian of the left slopes: the standard deviation, in pixels, at which they keep their noise low and most of the texture.
    private const double SlopeSigmaPx = 0.8;
    private const int SlopeReach = 2;

    private static readonly float[] BlurWeights = Normalised(_ => 1, _ => 1);
    private static readonly float[] SlopeWeights = Normalised(k => k, k => k * k);

    private readonly int reach;
    private readonly double energy;

    public LeastSquaresRefinement(int window)
    {
        if (window < 5 || window % 4 != 1)
        {
            throw new UserErrorException($"A refinement window of {window} px is not one; give 5, 9, 13, 17 and so on.");
        }

        Window = window;
        reach = (window - 1) / 4;
        energy = Energy();
    }

    public override string Name => "least squares";

    public override IReadOnlyList<StageSetting> Settings => [Setting("window", Window)];

    /// <summary>The window's side, in pixels.</summary>
    public int Window { get; }

    /// <inheritdoc/>
    public override int? CorrelationLengthPx => Window;

    // Simulated planes of speckle, wood, rubber and concrete: 0.002 to 0.005 px.
    public override double? PullSigmaPx => 0.004;

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var size = map.Size;
        var options = new ParallelOptions { CancellationToken = stop };
        var pictures = new Pictures(map, options);
        var refined = new float[size.Area];
        for (var i = 0; i < refined.Length; i++)
        {
            refined[i] = map.LabelArray[i] == DisparityLabel.Measured ? map.DisparityArray[i] : float.NaN;
        }

        var (sigma, knowledge) = (new float[size.Area], new float[size.Area]);
        for (var round = 0; round < Rounds; round++)
        {
            var from = SurfaceSmoothing.Of(size, refined, round == 0 ? null : knowledge, Window / 2, options);
            var to = refined;
            if (round > 0)
            {
                pictures.Align(from, options);
            }

            Parallel.For(0, (size.Height + BandRows - 1) / BandRows, options, band => Band(band, pictures, from, to, sigma, knowledge));
        }

        for (var i = 0; i < refined.Length; i++)
        {
            if (map.LabelArray[i] != DisparityLabel.Measured)
            {
                sigma[i] = float.NaN;
            }
            else if (sigma[i] <= LargestSigmaPx && Math.Abs(refined[i] - map.DisparityArray[i]) <= FarthestMovePx)
            {
                map.DisparityArray[i] = refined[i];
            }
            else
            {
                (map.LabelArray[i], map.DisparityArray[i], sigma[i]) = (DisparityLabel.NoMatch, float.NaN, float.NaN);
            }
        }

        map.SigmaArray = sigma;
        map.RowOffset = pictures.RowOffset;
    }

    // Σh² of the weights h with which the pixels' noise enters a disparity after all rounds. With the window's transfer function T and the
    // smoothing's S, a round makes h = T + (1 − T)·S·h; Parseval's theorem sums the squares.
    private double Energy()
    {
        const int grid = 64;
        var sum = 0.0;
        for (var i = 0; i < grid; i++)
        {
            for (var j = 0; j < grid; j++)
            {
                var (x, y) = ((i + 0.5) / (2 * grid), (j + 0.5) / (2 * grid));
                var window = Math.Pow(Box(2 * reach + 1, x) * Box(2 * reach + 1, y), 2);
                var smoothing = Box(2 * (Window / 2) + 1, x) * Box(2 * (Window / 2) + 1, y);
                var h = 0.0;
                for (var round = 0; round < Rounds; round++)
                {
                    h = window + (1 - window) * smoothing * h;
                }

                sum += h * h;
            }
        }

        return sum / (grid * grid);
    }

    // The Gaussian at 0 to SlopeReach pixels times a factor, scaled so that its sum over both sides times a measure is one.
    private static float[] Normalised(Func<int, double> factor, Func<int, double> measure)
    {
        double Gauss(int k) => Math.Exp(-k * k / (2 * SlopeSigmaPx * SlopeSigmaPx));
        var sum = Enumerable.Range(-SlopeReach, 2 * SlopeReach + 1).Sum(k => Gauss(k) * measure(k));
        return [.. Enumerable.Range(0, SlopeReach + 1).Select(k => (float)(factor(k) * Gauss(k) / sum))];
    }

    private static double Box(int side, double frequency) => Math.Sin(Math.PI * side * frequency) / (side * Math.Sin(Math.PI * frequency));

    // One round over a band of rows; rows above and below within reach are warped along with it.
    private void Band(int band, Pictures pictures, float[] from, float[] to, float[] sigma, float[] knowledge)
    {
        var (width, height) = (pictures.Size.Width, pictures.Size.Height);
        var halo = 2 * reach;
        var (firstRow, endRow) = (band * BandRows, Math.Min((band + 1) * BandRows, height));
        var rows = endRow - firstRow + 2 * halo;
        var sums = new RefinementSums(width, rows, reach);
        for (var row = Math.Max(0, halo - firstRow); row < rows && firstRow - halo + row < height; row++)
        {
            pictures.Enter(firstRow - halo + row, from, sums, row);
        }

        sums.Blur();
        var whole = Math.Pow(2 * reach + 1, 4);
        for (var v = firstRow; v < endRow; v++)
        {
            for (var u = 0; u < width; u++)
            {
                var i = v * width + u;
                (to[i], sigma[i], knowledge[i]) = (from[i], float.NaN, 0);
                if (!float.IsNaN(from[i]) && sums.Solve(v - firstRow + halo, u, LeastShare * whole) is var (step, residual, known))
                {
                    // Slope, gain and offset took three parameters from the residual's freedom.
                    var noise = residual / (1 - 3 * energy) * pictures.NoiseFactor;
                    (to[i], sigma[i], knowledge[i]) = (from[i] + (float)Math.Clamp(step, -0.5, 0.5), (float)Math.Sqrt(noise / known * energy), (float)known);
                }
            }
        }
    }

    private sealed class Pictures
    {
        private readonly RectifiedPair pair;
        private readonly CubicSpline left;
        private readonly CubicSpline right;
        private readonly float[] slopes;

        public Pictures(WorkingMap map, ParallelOptions options)
        {
            pair = map.Pair;
            left = CubicSpline.Through(pair.Left.GreyMemory, Size);
            right = CubicSpline.Through(pair.Right.GreyMemory, Size);
            slopes = Slopes(options);
            RowOffset = RowOffset.None(Size);

            // Looking up between pixels takes away fine noise, which the residual then misses, but not the coarse noise that moves a match.
            // A rectified picture was looked up along both axes; the warp looks up the right one along its rows once more.
            var rectified = pair.Rectification is null ? 1 : NoiseLeft * NoiseLeft;
            NoiseFactor = 2 / (rectified * (1 + NoiseLeft));
        }

        public Geometry.PictureSize Size => pair.Size;

        /// <summary>The coarse noise's strength over that of the residual.</summary>
        public double NoiseFactor { get; }

        /// <summary>By how much the right picture is looked up beside the row.</summary>
        public RowOffset RowOffset { get; private set; }

        /// <summary>Estimates the row offset from the disparities so far.</summary>
        public void Align(float[] disparity, ParallelOptions options) => RowOffset = RowOffsetEstimate.Of(pair, left, right, disparity, RowOffset, options);

        /// <summary>Enters the pixels of one row, the right picture warped by their disparities.</summary>
        public void Enter(int v, float[] disparity, RefinementSums sums, int row)
        {
            var width = Size.Width;
            var grey = pair.Left.Grey;
            var usable = pair.Right.Usable;
            for (var u = 0; u < width; u++)
            {
                var i = v * width + u;
                var place = u - disparity[i];
                if (!(place >= 0 && place <= width - 1) || float.IsNaN(slopes[i])
                    || (usable is not null && !(usable[(int)place, v] && usable[Math.Min((int)place + 1, width - 1), v])))
                {
                    continue;
                }

                var at = (float)Math.Clamp(v + RowOffset.At(u, v), 0, Size.Height - 1);
                var slope = right.AtByVectors(Math.Min(place + 0.5f, width - 1), at) - right.AtByVectors(Math.Max(place - 0.5f, 0), at);
                sums.Enter(row, u, slopes[i], slope, grey[i], right.AtByVectors(place, at) - grey[i]);
            }
        }

        // The left picture's slope along its rows, in levels a pixel: the derivative of a Gaussian, which leaves out what is too fine to be
        // looked up between pixels without error. Outermost pixels count again beyond the border; NaN beside pixels that may not be used.
        private float[] Slopes(ParallelOptions options)
        {
            var (width, height) = (Size.Width, Size.Height);
            var (picture, usable) = (pair.Left, pair.Left.Usable);
            var along = new float[width * height];
            var values = new float[width * height];
            Parallel.For(0, height, options, v =>
            {
                var grey = picture.Grey.Slice(v * width, width);
                for (var u = 0; u < width; u++)
                {
                    for (var k = 1; k <= SlopeReach; k++)
                    {
                        var (before, after) = (Math.Max(u - k, 0), Math.Min(u + k, width - 1));
                        var known = usable is null || (usable[before, v] && usable[u, v] && usable[after, v]);
                        along[v * width + u] += known ? SlopeWeights[k] * (grey[after] - grey[before]) : float.NaN;
                    }
                }
            });
            Parallel.For(0, height, options, v =>
            {
                for (var k = -SlopeReach; k <= SlopeReach; k++)
                {
                    var row = Math.Clamp(v + k, 0, height - 1) * width;
                    for (var u = 0; u < width; u++)
                    {
                        values[v * width + u] += BlurWeights[Math.Abs(k)] * along[row + u];
                    }
                }
            });
            return values;
        }
    }
}
