using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Where a fitted plane is, how it is tilted, and how the points lie about it.</summary>
internal sealed class PlaneFitRenderer : Renderer<PlaneFit>
{
    public override string Plain(PlaneFit fit) => Lines(
        $"Plane through {fit.Points.Count} points: distance {fit.DistanceFromCamera} from the left camera, tilt {fit.Tilt}",
        $"points lie {Numbers.Text(fit.RmsMm, 3, "mm")} RMS from it, {Numbers.Percent(fit.OutlierShare)} have no say");

    public override Card Draw(PlaneFit fit)
    {
        var heights = fit.Points.Positions.Select(point => fit.Normal.Dot(point - fit.Centroid)).ToArray();
        var reach = Math.Max(4 * fit.RmsMm, 1e-3);
        return new Card("Fitted plane", "Orthogonal distances in the left camera's own frame; heights count towards the camera. ± is one standard uncertainty.")
            .Facts(
                ("distance from the left camera", Value(fit.DistanceFromCamera)),
                ("tilt of its normal against the optical axis", Value(fit.Tilt)),
                ("points", $"{fit.Points.Count}, of which {Numbers.Percent(fit.OutlierShare)} have no say"),
                ("distance of the points, RMS", Numbers.Text(fit.RmsMm, 3, "mm")),
                ("random part rests on", fit.RandomPartBasis))
            .Row(Histograms.Of("Height of each point over the plane", "mm", "points", heights, -reach, reach));
    }

    private static string Value(MeasuredValue value) => Numbers.WithSigma(value.Value, value.StandardUncertainty, value.Unit);
}
