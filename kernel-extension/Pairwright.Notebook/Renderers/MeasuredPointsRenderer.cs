using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>How many points were measured, where they are, and what their uncertainty rests on.</summary>
internal sealed class MeasuredPointsRenderer : Renderer<MeasuredPoints>
{
    public override string Plain(MeasuredPoints points) => points.ToString();

    public override Card Draw(MeasuredPoints points)
    {
        var centre = points.Centroid;
        return new Card("Measured points", "Frame: the left camera's own, X to the right, Y down, Z forward, millimetres.")
            .Facts(
                ("points", $"{points.Count}"),
                ("centroid", $"({Numbers.Text(centre.X, 1)}, {Numbers.Text(centre.Y, 1)}, {Numbers.Text(centre.Z, 1)}) mm"),
                ("errors correlated up to", points.CorrelationLengthPx > 0 ? Numbers.Text(points.CorrelationLengthPx, 0, "px") : "not at all"),
                ("common part", points.Rig?.Covariance is null ? "not known: no rig with a covariance" : "from the rig's covariance"));
    }
}
