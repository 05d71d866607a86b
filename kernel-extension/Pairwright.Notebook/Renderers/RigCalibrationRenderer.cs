using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>How good a calibration is: residuals, views, coverage, parameters, figures on unseen views, and what to capture next.</summary>
internal sealed class RigCalibrationRenderer : Renderer<RigCalibration>
{
    public override string Plain(RigCalibration calibration) => Lines(
    [
        $"Rig calibration from {calibration.Views.Count(view => view.Used)} of {calibration.Views.Length} views of a {calibration.Board}; {calibration.Model}",
        $"reprojection RMS {Numbers.Text(calibration.StereoRmsPx, 3, "px")}, epipolar RMS {Numbers.Text(calibration.EpipolarRmsPx, 3, "px")}, "
        + $"square side RMS error {Numbers.Text(calibration.SideRmsMm, 3, "mm")} (all in sample)",
        $"on views left out: reprojection {Numbers.Text(calibration.LeaveOneOut.ReprojectionRmsPx, 3, "px")}, "
        + $"epipolar {Numbers.Text(calibration.LeaveOneOut.EpipolarRmsPx, 3, "px")}, side {Numbers.Text(calibration.LeaveOneOut.SideRmsMm, 3, "mm")}",
        $"baseline {RigRenderer.Baseline(calibration.Rig)}, left focal length {Numbers.WithSigma(calibration.Rig.Left.Matrix.FocalU, calibration.Rig.StandardUncertainty(0), "px")}",
        $"coverage: left {Numbers.Percent(calibration.CoverageLeft.Share)}, right {Numbers.Percent(calibration.CoverageRight.Share)} of the picture's cells",
        .. calibration.Advice.Select(advice => "next: " + advice),
    ]);

    public override Card Draw(RigCalibration calibration)
    {
        var used = calibration.Views.Where(view => view.Used).ToArray();
        var card = new Card(
            "Rig calibration from boards",
            $"{calibration.Board}; {used.Length} of {calibration.Views.Length} views used; {calibration.Model}; all parameters of both cameras and their pose estimated together");
        card.Warnings(calibration.Views.Where(view => !view.Used).Select(view => $"view {view.Name} is not used. {view.WhyNotUsed}"));
        card.Warnings(used.Where(view => view.Outlying).Select(view =>
            $"view {view.Name} stands out with {Numbers.Text(view.RmsPx, 3, "px")} ({RigCalibration.OutlyingRule}); look at its pictures before you keep it."));
        card.Table(
            ["root mean square over all corners", "in sample", "on views left out"],
            [
                ["reprojection, both pictures", Numbers.Text(calibration.StereoRmsPx, 3, "px"), Numbers.Text(calibration.LeaveOneOut.ReprojectionRmsPx, 3, "px")],
                ["right corner from its epipolar line", Numbers.Text(calibration.EpipolarRmsPx, 3, "px"), Numbers.Text(calibration.LeaveOneOut.EpipolarRmsPx, 3, "px")],
                ["triangulated square side minus stated side", Numbers.Text(calibration.SideRmsMm, 3, "mm"), Numbers.Text(calibration.LeaveOneOut.SideRmsMm, 3, "mm")],
            ]);
        card.Caption(
            "In sample flatters: the rig was fitted to these corners. Left out means that the rig was calibrated without the view and then judged on it (Stone 1974); that is what to expect of the next capture.");
        card.Facts(
            ("baseline", RigRenderer.Baseline(calibration.Rig)),
            ("one corner coordinate's standard deviation", $"{Numbers.Text(calibration.ResidualSigmaPx, 3, "px")} ({calibration.DegreesOfFreedom} degrees of freedom)"),
            ("single cameras alone", $"left {Numbers.Text(calibration.SingleLeft.RmsPx, 3, "px")}, right {Numbers.Text(calibration.SingleRight.RmsPx, 3, "px")} RMS"));
        card.Row(Scatter(used), PerView(used, calibration.LeaveOneOut));
        card.Row(
            CoverageMap("Left: where corners were seen", calibration.Rig.Left.Size, calibration.CoverageLeft, used.SelectMany(view => view.Left)),
            CoverageMap("Right: where corners were seen", calibration.Rig.Right.Size, calibration.CoverageRight, used.SelectMany(view => view.Right)));
        Advise(card, calibration);
        return card
            .Details("All parameters ± standard uncertainty", new(
                Card.TableOf(["parameter", "left", "right"], RigRenderer.CameraRows(calibration.Rig)) + Card.TableOf(["pose, right from left", "value"], RigRenderer.PoseRows(calibration.Rig))))
            .Details("Every view", new(Card.TableOf(["view", "left RMS, px", "right RMS, px", "epipolar, px", "side error, mm", "tilt, °", "distance, mm", "remark"], ViewRows(calibration.Views))))
            .From(calibration.Rig.Provenance);
    }

    private static Svg Scatter(IReadOnlyList<BoardView> views)
    {
        var reach = Reach([.. views.SelectMany(view => view.LeftResiduals.Concat(view.RightResiduals))]);
        var chart = Chart.Isometric("Residuals: measured minus modelled", new("to the right, px", -reach, reach), new("down, px", -reach, reach), 400, 330, yDown: true);
        return chart
            .MarkX(0, Stroke.Frame).MarkY(0, Stroke.Frame)
            .Dots(views.SelectMany(view => view.LeftResiduals).Select(r => (r.U, r.V)), Ink.Left, 1.7, 0.55, "left")
            .Dots(views.SelectMany(view => view.RightResiduals).Select(r => (r.U, r.V)), Ink.Right, 1.7, 0.55, "right")
            .ToSvg();
    }

    private static double Reach(IReadOnlyList<Residual> residuals) =>
        Math.Max(0.05, 1.1 * residuals.Select(residual => Math.Max(Math.Abs(residual.U), Math.Abs(residual.V))).DefaultIfEmpty(0).Max());

    private static Svg PerView(IReadOnlyList<BoardView> views, LeaveOneOut leftOut)
    {
        var held = leftOut.Views.ToDictionary(view => view.Name, view => view.ReprojectionRmsPx);
        var most = views.SelectMany(view => new[] { view.LeftRmsPx, view.RightRmsPx, held.GetValueOrDefault(view.Name, double.NaN) });
        var chart = new Chart("Reprojection RMS of each view", new("view", -0.6, views.Count - 0.4) { IsHidden = true }, Axis.Over("px", most, fromZero: true, room: 0.18), 480, 330);
        foreach (var (i, view) in views.Index())
        {
            chart.Bar(i - 0.38, i, view.LeftRmsPx, Ink.Left, 0.85).Bar(i, i + 0.38, view.RightRmsPx, Ink.Right, 0.85);
            chart.Line([(i - 0.42, held.GetValueOrDefault(view.Name, double.NaN)), (i + 0.42, held.GetValueOrDefault(view.Name, double.NaN))], new(Ink.Text, 2), i == 0 ? "left out, both" : null);
            chart.Text(i, 0, Short(view.Name) + (view.Outlying ? " !" : ""), Anchor.Middle, "#ffffff", 9.5, lift: 5);
        }

        return chart.Key("left", Ink.Left).Key("right", Ink.Right).ToSvg();
    }

    // The digits that tell views of one folder apart; the whole name stands in the table.
    private static string Short(string name)
    {
        var digits = new string([.. name.Reverse().SkipWhile(c => !char.IsDigit(c)).TakeWhile(char.IsDigit).Reverse()]);
        return digits.Length > 0 ? digits : name[..Math.Min(name.Length, 4)];
    }

    private static Svg CoverageMap(string heading, PictureSize size, Coverage coverage, IEnumerable<RawPixel> corners)
    {
        var canvas = new PictureCanvas($"{heading} ({Numbers.Percent(coverage.Share)} of cells)", size, null, 400);
        var most = Math.Max(1, coverage.Counts.Max());
        for (var row = 0; row < coverage.Rows; row++)
        {
            for (var column = 0; column < coverage.Columns; column++)
            {
                var (u0, u1) = (Edge(column, coverage.Columns, size.Width), Edge(column + 1, coverage.Columns, size.Width));
                var (v0, v1) = (Edge(row, coverage.Rows, size.Height), Edge(row + 1, coverage.Rows, size.Height));
                var count = coverage[column, row];
                canvas.Polygon([(u0, v0), (u1, v0), (u1, v1), (u0, v1)], count == 0 ? "#ffffff" : Ink.Met, count == 0 ? 0.9 : 0.12 + 0.5 * count / most, Stroke.Hair);
                if (count == 0)
                {
                    canvas.Line(u0, v0, u1, v1, Stroke.Frame).Line(u0, v1, u1, v0, Stroke.Frame);
                }
            }
        }

        foreach (var corner in corners)
        {
            canvas.Dot(corner.U, corner.V, Ink.Text, 1.1, 0.7);
        }

        return canvas.ToSvg();
    }

    private static double Edge(int cell, int cells, int length) => (double)cell * length / cells - 0.5;

    private static void Advise(Card card, RigCalibration calibration)
    {
        card.Caption("A crossed cell holds no corner: there the lens model is a guess.");
        foreach (var advice in calibration.Advice)
        {
            card.Note("Next: " + advice);
        }

        if (calibration.Advice.IsEmpty)
        {
            card.Note("Nothing is missing that more captures would mend.");
        }
    }

    private static IEnumerable<IEnumerable<string>> ViewRows(IEnumerable<BoardView> views) => views.Select(view => new[]
    {
        view.Name,
        Cell(view.LeftRmsPx, 3),
        Cell(view.RightRmsPx, 3),
        Cell(view.EpipolarRmsPx, 3),
        Cell(view.SideRmsMm, 3),
        Cell(view.TiltDegrees, 1),
        Cell(view.DistanceMm, 0),
        string.Join(' ', new[] { view.WhyNotUsed, view.Mended, view.Outlying ? "Stands out." : null }.OfType<string>()),
    });

    private static string Cell(double value, int decimals) => double.IsNaN(value) ? "" : Numbers.Fixed(value, decimals);
}
