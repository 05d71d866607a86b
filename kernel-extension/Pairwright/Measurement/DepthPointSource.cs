using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>The points of a depth map, indexed row after row.</summary>
internal sealed class DepthPointSource(DepthMap map) : PointSource
{
    public override Rig? Rig => map.Rig;

    public override double CorrelationLengthPx => map.CorrelationLengthPx;

    public override bool OnLeftRay => true;

    public override Vector3D Position(int index) => map.Geometry.PointInLeftCamera(Pixel(index), map.Disparity.Values[index]);

    public override double PullSigmaPx => map.PullSigmaPx;

    // A disparity error moves the point along its ray, in proportion to its distance: dP/dd = −P / (d + offset).
    public override (double Disparity, Vector3D Step) Lever(int index)
    {
        var disparity = map.Disparity.Values[index];
        return (disparity, -1 / (disparity + map.Geometry.OffsetPixels) * Position(index));
    }

    public override Matrix3x3 Covariance(int index)
    {
        var step = map.RandomSigmaPx(index) * Lever(index).Step;
        return Matrix3x3.FromRows(step.X * step, step.Y * step, step.Z * step);
    }

    public override (double U, double V) Place(int index) => (index % map.Size.Width, index / map.Size.Width);

    public override (RawPixel Left, RawPixel Right) Pair(int index)
    {
        var left = Pixel(index);
        var right = left with { U = left.U - map.Disparity.Values[index] };
        return (map.Rectification!.RawFromRectified(View.Left, left), map.Rectification.RawFromRectified(View.Right, right));
    }

    public override double PitchMm(int index) => map.Geometry.DepthMm(map.Disparity.Values[index]) / map.Geometry.FocalPixels;

    private RectifiedPixel Pixel(int index) => new(index % map.Size.Width, index / map.Size.Width);
}
