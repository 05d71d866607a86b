using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A rig's parameters with their uncertainty, what both cameras see, and what a pixel of disparity means in depth.</summary>
internal sealed class RigRenderer : Renderer<Rig>
{
    private const double Degree = 180 / Math.PI;

    public override string Plain(Rig rig) => Lines(
        $"Rig, baseline {Baseline(rig)}, right camera turned by {Turn(rig)}",
        $"left  camera {rig.Left.Size} px, focal length {Numbers.WithSigma(rig.Left.Matrix.FocalU, rig.StandardUncertainty(0), "px")}, field of view {CameraRenderer.FieldOfView(rig.Left)}",
        $"right camera {rig.Right.Size} px, focal length {Numbers.WithSigma(rig.Right.Matrix.FocalU, rig.StandardUncertainty(RigParameters.RightCamera), "px")}, field of view {CameraRenderer.FieldOfView(rig.Right)}",
        rig.Covariance is null ? "covariance not known: measurements will have no common part" : "with the covariance of all parameters; ± is one standard uncertainty");

    public override Card Draw(Rig rig)
    {
        var top = new RigTopView(rig);
        var card = new Card("Rig: two cameras and the pose between them", "Left camera's frame: X to the right, Y down, Z forward, millimetres. ± is one standard uncertainty.");
        if (rig.Covariance is null)
        {
            card.Warning("the covariance of this rig is not known, so measurements through it carry no common part; calibrate from boards to have it.");
        }

        card.Facts(
            ("baseline", Baseline(rig)),
            ("right camera's turn against the left", Turn(rig)),
            ("left field of view", CameraRenderer.FieldOfView(rig.Left)),
            ("right field of view", CameraRenderer.FieldOfView(rig.Right)),
            ("blind zone", double.IsNaN(top.NearestSharedMm)
                ? "the cameras share no view in this plane"
                : $"nothing nearer than {Numbers.Text(top.NearestSharedMm, 0, "mm")} is seen by both (row of the principal point)"));
        card.Columns(
            [top.ToSvg()],
            [CameraRenderer.LensShift("What the left lens shifts", rig.Left), CameraRenderer.LensShift("What the right lens shifts", rig.Right)]);
        card.Table(["depth Z", "width seen by both", "one pixel across", "0.1 px of disparity"], Depths(rig, top));
        card.Caption("0.1 px of disparity moves the depth by Z² / (f·b) · 0.1 px; it stands for the random part of a good match, the rig's own uncertainty comes on top.");
        return card
            .Details("All parameters ± standard uncertainty", new(Card.TableOf(["parameter", "left", "right"], CameraRows(rig)) + Card.TableOf(["pose", "value"], PoseRows(rig))))
            .From(rig.Provenance);
    }

    internal static string Baseline(Rig rig) => Numbers.WithSigma(rig.BaselineMm, BaselineSigma(rig), "mm");

    internal static IEnumerable<IEnumerable<string>> CameraRows(Rig rig)
    {
        var (left, right) = (Parameters(rig.Left), Parameters(rig.Right));
        for (var i = 0; i < left.Length; i++)
        {
            if (i < 6 || left[i] != 0 || right[i] != 0 || rig.StandardUncertainty(i) > 0)
            {
                yield return
                [
                    RigParameters.Names[i]["left ".Length..],
                    Numbers.WithSigma(left[i], rig.StandardUncertainty(i), RigParameters.Units[i]),
                    Numbers.WithSigma(right[i], rig.StandardUncertainty(RigParameters.RightCamera + i), RigParameters.Units[i]),
                ];
            }
        }
    }

    internal static IEnumerable<IEnumerable<string>> PoseRows(Rig rig)
    {
        var turn = Rotation.ToVector(rig.RightFromLeft.Rotation);
        var shift = rig.RightFromLeft.Translation;
        double[] angles = [turn.X, turn.Y, turn.Z];
        double[] lengths = [shift.X, shift.Y, shift.Z];
        for (var i = 0; i < 3; i++)
        {
            yield return [RigParameters.Names[RigParameters.RotationStart + i], Numbers.WithSigma(angles[i] * Degree, rig.StandardUncertainty(RigParameters.RotationStart + i) * Degree, "°")];
        }

        for (var i = 0; i < 3; i++)
        {
            yield return [RigParameters.Names[RigParameters.TranslationStart + i], Numbers.WithSigma(lengths[i], rig.StandardUncertainty(RigParameters.TranslationStart + i), "mm")];
        }

        yield return ["baseline", Baseline(rig)];
    }

    private static IEnumerable<IEnumerable<string>> Depths(Rig rig, RigTopView top)
    {
        foreach (var z in Ticks.Within(0, top.ReachMm, 5).Where(z => z > 0))
        {
            var width = top.SharedWidthMm(z);
            yield return
            [
                Numbers.Text(z, 0, "mm"),
                double.IsNaN(width) ? "none" : Numbers.Text(width, 0, "mm"),
                Numbers.Significant(z / rig.Left.Matrix.FocalU, 3, "mm"),
                Numbers.Significant(0.1 * z * z / (rig.Left.Matrix.FocalU * rig.BaselineMm), 3, "mm"),
            ];
        }
    }

    private static string Turn(Rig rig) => Numbers.Text(Rotation.ToVector(rig.RightFromLeft.Rotation).Norm * Degree, 3) + "°";

    private static double BaselineSigma(Rig rig)
    {
        var changes = rig.PrincipalChanges();
        return rig.Covariance is null
            ? double.NaN
            : Math.Sqrt(changes.Sum(change => Math.Pow(Changed(change, 1) - Changed(change, -1), 2)) / 4);

        double Changed(IReadOnlyList<double> change, int sign) =>
            (rig.RightFromLeft.Translation
                + sign * new Vector3D(change[RigParameters.TranslationStart], change[RigParameters.TranslationStart + 1], change[RigParameters.TranslationStart + 2])).Norm;
    }

    private static double[] Parameters(Camera camera)
    {
        var (k, d) = (camera.Matrix, camera.Distortion);
        return [k.FocalU, k.FocalV, k.CentreU, k.CentreV, d.K1, d.K2, d.P1, d.P2, d.K3, d.K4, d.K5, d.K6];
    }
}
