using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A camera's parameters, its fields of view and how its lens shifts the picture.</summary>
internal sealed class CameraRenderer : Renderer<Camera>
{
    public override string Plain(Camera camera) => Lines(
        $"Camera, {camera.Size} px, focal length {Numbers.Text(camera.Matrix.FocalU, 2)} × {Numbers.Text(camera.Matrix.FocalV, 2, "px")}, "
        + $"principal point ({Numbers.Text(camera.Matrix.CentreU, 2)}, {Numbers.Text(camera.Matrix.CentreV, 2)}) px",
        $"field of view {FieldOfView(camera)}",
        camera.Distortion.IsNone ? "no lens distortion" : $"lens distortion {Terms(camera.Distortion)}");

    public override Card Draw(Camera camera) => new Card("Camera", $"{camera.Size} px; parameters without uncertainty, which a calibrated rig carries.")
        .Facts(
            ("focal length", $"{Numbers.Text(camera.Matrix.FocalU, 3)} × {Numbers.Text(camera.Matrix.FocalV, 3, "px")}"),
            ("principal point", $"({Numbers.Text(camera.Matrix.CentreU, 3)}, {Numbers.Text(camera.Matrix.CentreV, 3)}) px"),
            ("field of view", FieldOfView(camera)),
            ("lens distortion", camera.Distortion.IsNone ? "none" : Terms(camera.Distortion)))
        .Row(LensShift("What the lens shifts", camera));

    internal static string FieldOfView(Camera camera)
    {
        var field = camera.FieldOfView;
        return $"{Numbers.Fixed(field.AcrossDegrees, 1)}° × {Numbers.Fixed(field.DownDegrees, 1)}°, diagonal {Numbers.Fixed(field.DiagonalDegrees, 1)}°";
    }

    /// <summary>Arrows from where an undistorted lens would form a point to where this one does, on a grid over the picture.</summary>
    internal static Svg LensShift(string heading, Camera camera)
    {
        const double width = 300;
        var canvas = new PictureCanvas(heading, camera.Size, null, width);
        var shifts = new List<(IdealPixel Ideal, RawPixel Raw)>();
        for (var row = 0; row < 9; row++)
        {
            for (var column = 0; column < 12; column++)
            {
                var raw = new RawPixel((column + 0.5) * camera.Size.Width / 12 - 0.5, (row + 0.5) * camera.Size.Height / 9 - 0.5);
                if (camera.TryUndistort(raw) is { } ideal)
                {
                    shifts.Add((ideal, raw));
                }
            }
        }

        var longest = shifts.Count == 0 ? 0 : shifts.Max(shift => Length(shift.Ideal, shift.Raw));
        var gain = longest > 0 ? Math.Min(24 / longest, 50) : 0;
        foreach (var (ideal, raw) in shifts)
        {
            canvas.Arrow(raw.U, raw.V, gain * (raw.U - ideal.U), gain * (raw.V - ideal.V), new(Ink.Left, 1.3));
        }

        canvas.Cross(camera.Matrix.CentreU, camera.Matrix.CentreV, Ink.Overlay);
        return canvas.Label(4, 0, $"longest {Numbers.Text(longest, 1, "px")}", dy: 12).ToSvg();
    }

    internal static string Terms(Distortion lens)
    {
        (string Name, double Value)[] terms =
            [("k1", lens.K1), ("k2", lens.K2), ("p1", lens.P1), ("p2", lens.P2), ("k3", lens.K3), ("k4", lens.K4), ("k5", lens.K5), ("k6", lens.K6)];
        return string.Join(", ", terms.Where(term => term.Value != 0).Select(term => $"{term.Name} = {Numbers.Significant(term.Value, 4)}"));
    }

    private static double Length(IdealPixel ideal, RawPixel raw) => Math.Sqrt(Math.Pow(raw.U - ideal.U, 2) + Math.Pow(raw.V - ideal.V, 2));
}
