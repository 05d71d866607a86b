using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Calibration;

/// <summary>The simulator's boards through the corner finder and the adjustment, against the rig that the simulator knows.</summary>
public class The_demos_boards_give_the_true_rig(ITestOutputHelper output)
{
    [Fact]
    public void Baseline_and_focal_lengths_are_covered_by_their_uncertainty()
    {
        var (found, truth) = (BoardData.Demo.Rig, RigFile.Read(Path.Combine(BoardData.DemoFolder, "rig-true.yaml")));
        output.WriteLine($"stereo {BoardData.Demo.StereoRmsPx:0.0000} px, sides {BoardData.Demo.SideRmsMm:0.0000} mm, left out {BoardData.Demo.LeaveOneOut.ReprojectionRmsPx:0.0000} px");
        output.WriteLine(string.Join("\n", BoardData.Demo.Advice));
        (string Name, double Found, double Truth, double Sigma)[] parameters =
        [
            ("left focal u", found.Left.Matrix.FocalU, truth.Left.Matrix.FocalU, found.StandardUncertainty(0)),
            ("left centre u", found.Left.Matrix.CentreU, truth.Left.Matrix.CentreU, found.StandardUncertainty(2)),
            ("right focal v", found.Right.Matrix.FocalV, truth.Right.Matrix.FocalV, found.StandardUncertainty(RigParameters.RightCamera + 1)),
            ("right centre v", found.Right.Matrix.CentreV, truth.Right.Matrix.CentreV, found.StandardUncertainty(RigParameters.RightCamera + 3)),
            ("translation x", found.RightFromLeft.Translation.X, truth.RightFromLeft.Translation.X, found.StandardUncertainty(RigParameters.TranslationStart)),
            ("translation z", found.RightFromLeft.Translation.Z, truth.RightFromLeft.Translation.Z, found.StandardUncertainty(RigParameters.TranslationStart + 2)),
        ];
        foreach (var (name, value, true_, sigma) in parameters)
        {
            output.WriteLine(FormattableString.Invariant($"{name}: {value:0.0000} ± {sigma:0.0000}, true {true_:0.0000}, {(value - true_) / sigma:0.00} σ"));
        }

        // One draw of noise: 3 σ for six parameters is a significance of 1.6 %.
        Assert.All(parameters, p => Assert.InRange(Math.Abs(p.Found - p.Truth), 0, 3 * p.Sigma));
        Assert.All(parameters, p => Assert.InRange(p.Sigma, 1e-4, 2));
    }

    [Fact]
    public void Fourteen_views_are_used_and_none_stands_out()
    {
        Assert.Equal(14, BoardData.Demo.Views.Count(view => view.Used));
        Assert.DoesNotContain(BoardData.Demo.Views, view => view.Outlying);
    }
}
