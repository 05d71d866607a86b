using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>Points located in both raw pictures, one by one, such as board corners.</summary>
internal sealed class CornerPointSource(Rig rig, IReadOnlyList<RawPixel> lefts, IReadOnlyList<RawPixel> rights, double sigmaPx) : PointSource
{
    // Small enough that the slope is one, large enough that rounding does not show.
    private const double StepPx = 1e-3;

    public override Rig Rig => rig;

    public override double CorrelationLengthPx => 0;

    public override bool OnLeftRay => false;

    public override Vector3D Position(int index) => RayMeeting.Of(rig, lefts[index], rights[index], onLeftRay: false);

    public override Matrix3x3 Covariance(int index)
    {
        var (l, r) = (lefts[index], rights[index]);
        var sum = 0 * Matrix3x3.Identity;
        if (sigmaPx == 0)
        {
            return sum;
        }

        foreach (var (du, dv) in new (double, double)[] { (StepPx, 0), (0, StepPx) })
        {
            Add(Meet(new(l.U + du, l.V + dv), r) - Meet(new(l.U - du, l.V - dv), r));
            Add(Meet(l, new(r.U + du, r.V + dv)) - Meet(l, new(r.U - du, r.V - dv)));
        }

        return sum;

        void Add(Vector3D difference)
        {
            var step = sigmaPx / (2 * StepPx) * difference;
            sum = Matrix3x3.FromRows(sum.Row1 + step.X * step, sum.Row2 + step.Y * step, sum.Row3 + step.Z * step);
        }
    }

    public override (double U, double V) Place(int index) => (lefts[index].U, lefts[index].V);

    public override (RawPixel Left, RawPixel Right) Pair(int index) => (lefts[index], rights[index]);

    public override double PitchMm(int index) => 0;

    private Vector3D Meet(RawPixel left, RawPixel right) => RayMeeting.Of(rig, left, right, onLeftRay: false);
}
