using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>One search along an epipolar curve; see <see cref="CurveSearching.Search"/>.</summary>
internal sealed class CurveSearch
{
    private const double StepPx = 0.5;

    // At these ratios of residual variances, windows of the usual size differ beyond chance (F test with some 100 degrees of freedom, 1 %).
    private const double DistinctRatio = 1.5;

    private readonly StereoPair pair;
    private readonly Rig rig;
    private readonly RawPixel from;
    private readonly WindowCost cost;
    private readonly CubicLevels rightLevels;
    private readonly Vector3D[] turned;
    private readonly float[] leftWindow;

    // The epipolar curve is the image of cos θ · axis + sin θ · baseline for θ from 0, infinity, to a right angle, depth zero.
    private readonly Vector3D axis;
    private readonly Vector3D baseline;
    private readonly double tangentPerInverseMm;

    // What unrelated windows cost: the cost's own figure, else the mean over the samples.
    private double unrelated;

    public CurveSearch(StereoPair pair, Rig rig, RawPixel from, WindowCost cost)
    {
        (this.pair, this.rig, this.from, this.cost) = (pair, rig, from, cost);
        rightLevels = new(pair.Right);
        var area = (int)cost.Window.Area;
        (turned, leftWindow) = (new Vector3D[area], new float[area]);
        var levels = new CubicLevels(pair.Left);
        var camera = rig.Left.Matrix;
        for (var i = 0; i < area; i++)
        {
            var pixel = new RawPixel(from.U + i % cost.Window.Width - cost.Window.Width / 2, from.V + i / cost.Window.Width - cost.Window.Height / 2);
            if (!levels.Holds(pixel.U, pixel.V))
            {
                throw new UserErrorException(
                    $"The window of {cost.Window} px around ({from.U:0.##}, {from.V:0.##}) is not wholly on usable pixels of the left picture of {pair.Left.Size} px; choose a pixel farther in or a smaller window.");
            }

            leftWindow[i] = levels.At(pixel.U, pixel.V) * GreyLevels.ScaleOf(pair.Left);
            var ideal = rig.Left.Undistort(pixel);
            turned[i] = rig.RightFromLeft.Rotation * new Vector3D((ideal.U - camera.CentreU) / camera.FocalU, (ideal.V - camera.CentreV) / camera.FocalV, 1);
        }

        var direction = turned[area / 2];
        (axis, baseline) = (direction.Normalized, rig.RightFromLeft.Translation.Normalized);
        tangentPerInverseMm = rig.BaselineMm / direction.Norm;
    }

    public CostCurve Run(double nearestMm, double farthestMm)
    {
        var (samples, angles) = Samples(Angle(farthestMm), nearestMm > 0 ? Angle(nearestMm) : Math.PI / 2);
        var leftPatch = Patch(leftWindow, pair.Left);
        if (samples.Count == 0)
        {
            var none = new CostPeak(
                -1, -1, double.NaN, new(double.NaN, double.NaN), double.NaN, double.NaN, double.PositiveInfinity,
                "The epipolar curve does not cross usable pixels of the right picture between these depths.");
            return new(pair, from, cost, samples, none, leftPatch, null);
        }

        unrelated = double.IsNaN(cost.Unrelated)
            ? samples.Select(sample => sample.Cost).Where(double.IsFinite).DefaultIfEmpty(1).Average()
            : cost.Unrelated;
        var best = Enumerable.Range(0, samples.Count).MinBy(i => samples[i].Cost);
        var second = SecondBest(samples, best);
        var (angle, lowest) = Refined(samples, angles, best);
        var right = new float[leftWindow.Length];
        Window(angle, right);
        var rival = second < 0 ? unrelated : samples[second].Cost;
        var floor = 0.005 * unrelated;
        var ratio = (rival + floor) / (lowest + floor);
        var sigma = Sigma(angle, right);
        var peak = new CostPeak(
            best, second, ratio, Project(angle), Depth(angle), lowest, sigma, Objection(samples, best, second, lowest, ratio, sigma));
        return new(pair, from, cost, samples, peak, leftPatch, Patch(right, pair.Right));
    }

    private double Angle(double depthMm) => Math.Atan(tangentPerInverseMm / depthMm);

    private double Depth(double angle) => angle > 0 ? tangentPerInverseMm / Math.Tan(angle) : double.PositiveInfinity;

    private RawPixel Project(double angle) => rig.Right.Project(Math.Cos(angle) * axis + Math.Sin(angle) * baseline);

    private (List<CostSample> Samples, List<double> Angles) Samples(double first, double last)
    {
        var (samples, angles) = (new List<CostSample>(), new List<double>());
        var focal = rig.Right.Matrix.FocalU;
        var window = new float[leftWindow.Length];
        var along = 0.0;
        RawPixel? before = null;
        for (var angle = first; angle <= last;)
        {
            var here = Project(angle);
            var probe = 0.01 / focal;
            var speed = Distance(Project(angle + probe), here) / probe;
            if (double.IsFinite(here.U) && before is { } earlier)
            {
                along += Distance(here, earlier);
            }

            before = double.IsFinite(here.U) ? here : before;
            if (pair.Right.Size.Contains(here.U, here.V) && Window(angle, window))
            {
                samples.Add(new(here, Depth(angle), along, Compare(window)));
                angles.Add(angle);
            }

            angle += StepPx / (speed > focal / 8 ? speed : focal / 8);
        }

        return (samples, angles);
    }

    // The levels of the right picture where a plane at a depth, facing the left camera, shows the left window; false where that is not all usable.
    private bool Window(double angle, Span<float> levels)
    {
        var rightScale = GreyLevels.ScaleOf(pair.Right);
        var inverseDepth = Math.Tan(angle) / tangentPerInverseMm;
        for (var i = 0; i < levels.Length; i++)
        {
            var pixel = rig.Right.Project(turned[i] + inverseDepth * rig.RightFromLeft.Translation);
            if (!rightLevels.Holds(pixel.U, pixel.V))
            {
                return false;
            }

            levels[i] = rightLevels.At(pixel.U, pixel.V) * rightScale;
        }

        return true;
    }

    private double Compare(ReadOnlySpan<float> window)
    {
        var value = cost.Compare(leftWindow, window);
        return !double.IsNaN(value) ? value : double.IsNaN(cost.Unrelated) ? double.PositiveInfinity : cost.Unrelated;
    }

    private static int SecondBest(List<CostSample> samples, int best)
    {
        // The best one's dip reaches as far as the cost rises, and never less than three samples.
        var (first, last) = (best, best);
        while (first > 0 && (best - first < 3 || samples[first - 1].Cost >= samples[first].Cost))
        {
            first--;
        }

        while (last < samples.Count - 1 && (last - best < 3 || samples[last + 1].Cost >= samples[last].Cost))
        {
            last++;
        }

        var second = -1;
        for (var i = 0; i < samples.Count; i++)
        {
            if ((i < first || i > last) && (second < 0 || samples[i].Cost < samples[second].Cost))
            {
                second = i;
            }
        }

        return second;
    }

    private static bool Joined(List<CostSample> samples, int i, int j) => j >= 0 && j < samples.Count && Math.Abs(samples[i].AlongPx - samples[j].AlongPx) < 1.5 * StepPx;

    private (double Angle, double Cost) Refined(List<CostSample> samples, List<double> angles, int best)
    {
        var (angle, lowest) = (angles[best], samples[best].Cost);
        if (!Joined(samples, best, best - 1) || !Joined(samples, best, best + 1))
        {
            return (angle, lowest);
        }

        // Half a pixel either way in angle. Costs that are not smooth gain nothing from going round again, but lose nothing either.
        var half = (angles[best + 1] - angles[best - 1]) / 2;
        var window = new float[leftWindow.Length];
        var centre = angle;
        for (var round = 0; round < 4; round++)
        {
            double At(double where) => Window(where, window) ? Compare(window) : double.NaN;
            var (before, middle, after) = (At(centre - half), At(centre), At(centre + half));
            var curvature = before + after - 2 * middle;
            if (!(curvature > 0))
            {
                break;
            }

            var shift = Math.Clamp((before - after) / (2 * curvature), -1, 1) * half;
            centre = Math.Clamp(centre + shift, angles[best - 1], angles[best + 1]);
            (angle, lowest) = (centre, Math.Min(lowest, At(centre) is var c && double.IsNaN(c) ? lowest : c));
            if (Math.Abs(shift) < 1e-3 * half)
            {
                break;
            }
        }

        return (angle, lowest);
    }

    // Least squares of left = gain · right(shifted) + offset: the shift's standard deviation from what is left and from the gradient's part that
    // gain and offset cannot explain.
    private double Sigma(double angle, float[] right)
    {
        var here = Project(angle);
        var turn = 0.25 / rig.Right.Matrix.FocalU;
        var (ahead, behind) = (new float[right.Length], new float[right.Length]);
        if (!Window(angle + turn, ahead) || !Window(angle - turn, behind))
        {
            return double.PositiveInfinity;
        }

        var length = Distance(Project(angle + turn), here) + Distance(here, Project(angle - turn));
        var gradient = ahead.Zip(behind, (a, b) => (a - b) / length).ToArray();
        var (meanLeft, meanRight, meanGradient) = (leftWindow.Average(), right.Average(), gradient.Average());
        double rr = 0, rl = 0, rg = 0, gg = 0, ll = 0;
        for (var i = 0; i < right.Length; i++)
        {
            var (l, r, g) = (leftWindow[i] - meanLeft, right[i] - meanRight, gradient[i] - meanGradient);
            (rr, rl, rg, gg, ll) = (rr + r * r, rl + r * l, rg + r * g, gg + g * g, ll + l * l);
        }

        if (!(rr > 0))
        {
            return double.PositiveInfinity;
        }

        var gain = rl / rr;
        var (leftStep, rightStep) = (GreyLevels.ScaleOf(pair.Left), gain * GreyLevels.ScaleOf(pair.Right));
        var rounding = (leftStep * leftStep + rightStep * rightStep) / 12;
        var variance = Math.Max((ll - gain * rl) / (right.Length - 3), rounding);
        var free = gain * gain * (gg - rg * rg / rr);
        return free > 0 ? Math.Sqrt(variance / free) : double.PositiveInfinity;
    }

    private string Objection(List<CostSample> samples, int best, int second, double lowest, double ratio, double sigma)
    {
        if (!(sigma < 0.5))
        {
            return $"The window is too plain along the curve to place a match (σ {sigma:0.##} px).";
        }

        if (!Joined(samples, best, best - 1) || !Joined(samples, best, best + 1))
        {
            return "The best match stands at an end of what could be searched; the true one may lie beyond.";
        }

        if (lowest > 0.5 * unrelated)
        {
            return $"Even the best window is unlike the left one (cost {lowest:0.###} of {unrelated:0.###} for unrelated windows).";
        }

        return ratio < DistinctRatio && second >= 0
            ? $"Another place, at ({samples[second].Position.U:0.#}, {samples[second].Position.V:0.#}), fits nearly as well (peak ratio {ratio:0.00})."
            : "";
    }

    private Picture Patch(float[] levels, Picture picture) =>
        new(
            cost.Window,
            Array.ConvertAll(levels, level => (ushort)Math.Clamp(Math.Round(level / GreyLevels.ScaleOf(picture)), 0, (1 << picture.SignificantBits) - 1)),
            picture.SignificantBits,
            picture.SaturationLevel,
            provenance: picture.Provenance);

    private static double Distance(RawPixel a, RawPixel b) => Math.Sqrt((a.U - b.U) * (a.U - b.U) + (a.V - b.V) * (a.V - b.V));
}
