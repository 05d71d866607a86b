using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Tests.Calibration;
using Pairwright.Tests.Simulation;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Matching;

public class Curve_searches_find_the_match(ITestOutputHelper output)
{
    /// <summary>Truth: the surface point that the ray caster meets, through the right lens (whose projection is held against OpenCV's elsewhere).</summary>
    [Fact]
    public void Through_distorting_lenses_to_a_tenth_of_a_pixel()
    {
        var rig = Scenes.Verged;
        var scene = Scene.SlantedPlane(900, yawDegrees: 10, pitchDegrees: -6, Texture.Speckle(6));
        var pair = scene.Shoot(rig, seed: 3).Pair;
        var (errors, standardised, ratios) = (new List<double>(), new List<double>(), new List<double>());
        var refused = 0;
        for (var v = 20; v < 130; v += 16)
        {
            for (var u = 40; u < 185; u += 19)
            {
                var pixel = new RawPixel(u, v);
                var truth = Truth(scene, rig, pixel);
                if (!(truth.U > 10 && truth.U < 190 && truth.V > 10 && truth.V < 140))
                {
                    continue;
                }

                var curve = pair.Search(pixel, nearestMm: 500, farthestMm: 2000);
                if (!curve.Distinct)
                {
                    refused++;
                    continue;
                }

                var error = Distance(curve.Match, truth);
                errors.Add(error);
                standardised.Add(error / curve.SigmaPx);
                ratios.Add(curve.PeakRatio);
                Assert.InRange(curve.MatchDepthMm, 700, 1200);
            }
        }

        errors.Sort();
        var rms = Math.Sqrt(errors.Average(error => error * error));
        output.WriteLine(
            $"{errors.Count} distinct, {refused} refused; median error {errors[errors.Count / 2]:0.000} px, RMS {rms:0.000} px, worst {errors[^1]:0.000} px; least peak ratio {ratios.Min():0.0}; standardised RMS {Math.Sqrt(standardised.Average(x => x * x)):0.00}");
        Assert.True(errors.Count > 35, $"only {errors.Count} pixels are distinct");
        Assert.True(refused < 0.05 * errors.Count, $"{refused} pixels were refused");
        Assert.InRange(rms, 0, 0.1);
        Assert.InRange(errors[^1], 0, 0.4);
    }

    [Fact]
    public void The_depth_is_that_of_the_surface()
    {
        var rig = Scenes.Verged;
        var scene = Scene.SlantedPlane(900, texture: Texture.Speckle(6));
        var curve = scene.Shoot(rig).Pair.Search(new RawPixel(100, 75), nearestMm: 500);
        Assert.True(curve.Distinct, curve.Objection);

        // A tenth of a pixel of disparity is Z² / (f·b) · 0.1 = 3.5 mm here.
        Assert.Equal(900, curve.MatchDepthMm, 3.5);
        Assert.Equal(curve.Samples.Min(sample => sample.Cost), curve.Samples[curve.BestIndex].Cost);
        Assert.True(curve.MatchCost <= curve.Samples[curve.BestIndex].Cost);
    }

    [Fact]
    public void A_repeating_surface_is_called_ambiguous_and_a_plain_one_plain()
    {
        // A checkerboard without end repeats every two squares of about 8 px each.
        var rig = Scenes.Parallel;
        var repeating = Scene.SlantedPlane(900, texture: Texture.From(point => (Math.Floor(point.X / 28) + Math.Floor(point.Y / 28)) % 2 == 0 ? 0.1 : 0.8));
        var curve = repeating.Shoot(rig).Pair.Search(new RawPixel(100, 75), nearestMm: 300);
        Assert.False(curve.Distinct);
        Assert.InRange(curve.PeakRatio, 0, 1.5);
        Assert.Contains("Another place", curve.Objection);

        var plain = Scene.SlantedPlane(900, texture: Texture.Plain(0.5)).Shoot(rig).Pair.Search(new RawPixel(100, 75), nearestMm: 300);
        Assert.False(plain.Distinct);
    }

    /// <summary>Outside reference: the corners that OpenCV's finder sees in the right pictures.</summary>
    [SkippableFact]
    public void At_the_corners_of_real_boards_where_the_corner_finder_sees_them()
    {
        var calibration = BoardData.Real;
        var (errors, missed, refused) = (new List<double>(), 0, 0);
        foreach (var view in calibration.Views)
        {
            var pair = new StereoPair(view.Pair!.Left, view.Pair.Right, calibration.Rig);
            for (var i = 0; i < view.Left.Length; i += 7)
            {
                // The board repeats every two squares: the working distance, which an engineer knows, keeps the others out.
                var depth = view.LeftFromBoard.Transform(calibration.Board.Corners[i]).Z;
                var curve = pair.Search(view.Left[i], Cost.Zncc(15), nearestMm: 0.93 * depth, farthestMm: 1.08 * depth);
                if (!curve.Distinct)
                {
                    refused++;
                    continue;
                }

                var error = Distance(curve.Match, view.Right[i]);
                (missed, errors) = (missed + (error > 1 ? 1 : 0), [.. errors, error]);
            }
        }

        var good = errors.Where(error => error <= 1).ToArray();
        var rms = Math.Sqrt(good.Average(error => error * error));
        output.WriteLine($"{errors.Count} corners distinct, {refused} refused, {missed} missed by over 1 px, RMS of the others {rms:0.000} px");
        Assert.True(errors.Count > 90, $"only {errors.Count} corners are distinct");
        Assert.True(missed <= 0.02 * errors.Count, $"{missed} corners were missed");
        Assert.InRange(rms, 0, 0.3);
    }

    private static RawPixel Truth(Scene scene, Rig rig, RawPixel pixel)
    {
        var ideal = rig.Left.Undistort(pixel);
        var hit = scene.Cast(default, rig.Left.Matrix.Direction(ideal))!.Value;
        return rig.Right.Project(rig.RightFromLeft.Transform(hit.Point));
    }

    private static double Distance(RawPixel a, RawPixel b) => Math.Sqrt((a.U - b.U) * (a.U - b.U) + (a.V - b.V) * (a.V - b.V));
}
