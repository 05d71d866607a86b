using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>The raw pixel of a point and its derivatives, for the least squares of a calibration.</summary>
/// <remarks>The same model as <see cref="Camera.Project"/>, with the twelve camera parameters in the order of <see cref="RigParameters"/>.</remarks>
internal static class CornerProjection
{
    public const int CameraParameters = RigParameters.RightCamera;

    /// <summary>The twelve parameters of a camera.</summary>
    public static double[] Parameters(Camera camera)
    {
        var (k, d) = (camera.Matrix, camera.Distortion);
        return [k.FocalU, k.FocalV, k.CentreU, k.CentreV, d.K1, d.K2, d.P1, d.P2, d.K3, d.K4, d.K5, d.K6];
    }

    /// <summary>The camera of twelve parameters.</summary>
    public static Camera Camera(ReadOnlySpan<double> c, PictureSize size) =>
        new(new(c[0], c[1], c[2], c[3]), size, new(c[4], c[5], c[6], c[7], c[8], c[9], c[10], c[11]));

    /// <summary>The raw pixel; NaN behind the camera or beyond a pole of the rational factor.</summary>
    public static RawPixel Project(ReadOnlySpan<double> camera, Vector3D point)
    {
        if (!(point.Z > 0))
        {
            return new(double.NaN, double.NaN);
        }

        var (x, y) = (point.X / point.Z, point.Y / point.Z);
        var (xx, yy, xy) = (x * x, y * y, x * y);
        var r2 = xx + yy;
        var denominator = 1 + r2 * (camera[9] + r2 * (camera[10] + r2 * camera[11]));
        var g = (1 + r2 * (camera[4] + r2 * (camera[5] + r2 * camera[8]))) / denominator;
        var (p1, p2) = (camera[6], camera[7]);
        return denominator > 0
            ? new(
                camera[0] * (x * g + 2 * p1 * xy + p2 * (r2 + 2 * xx)) + camera[2],
                camera[1] * (y * g + p1 * (r2 + 2 * yy) + 2 * p2 * xy) + camera[3])
            : new(double.NaN, double.NaN);
    }

    /// <summary>The raw pixel and its derivatives.</summary>
    /// <param name="camera">Twelve parameters.</param>
    /// <param name="point">The point in the camera's frame, in front of it.</param>
    /// <param name="byPoint">Filled with ∂u/∂(X, Y, Z), ∂v/∂(X, Y, Z): six numbers.</param>
    /// <param name="byCamera">Filled with ∂u/∂(parameters), ∂v/∂(parameters): twenty-four numbers.</param>
    public static RawPixel Project(ReadOnlySpan<double> camera, Vector3D point, Span<double> byPoint, Span<double> byCamera)
    {
        var (x, y) = (point.X / point.Z, point.Y / point.Z);
        var (xx, yy, xy) = (x * x, y * y, x * y);
        var r2 = xx + yy;
        var (r4, r6) = (r2 * r2, r2 * r2 * r2);
        var (k1, k2, p1, p2, k3, k4, k5, k6) = (camera[4], camera[5], camera[6], camera[7], camera[8], camera[9], camera[10], camera[11]);
        var numerator = 1 + k1 * r2 + k2 * r4 + k3 * r6;
        var denominator = 1 + k4 * r2 + k5 * r4 + k6 * r6;
        var g = numerator / denominator;
        var slope = (k1 + 2 * k2 * r2 + 3 * k3 * r4 - g * (k4 + 2 * k5 * r2 + 3 * k6 * r4)) / denominator;
        var (fu, fv) = (camera[0], camera[1]);
        var distortedX = x * g + 2 * p1 * xy + p2 * (r2 + 2 * xx);
        var distortedY = y * g + p1 * (r2 + 2 * yy) + 2 * p2 * xy;

        // The Jacobian of the distortion is symmetric: it is the gradient of a potential.
        var cross = 2 * (xy * slope + p1 * x + p2 * y);
        var uByX = fu * (g + 2 * xx * slope + 2 * p1 * y + 6 * p2 * x);
        var vByY = fv * (g + 2 * yy * slope + 6 * p1 * y + 2 * p2 * x);
        var (uByY, vByX) = (fu * cross, fv * cross);
        byPoint[0] = uByX / point.Z;
        byPoint[1] = uByY / point.Z;
        byPoint[2] = -(uByX * x + uByY * y) / point.Z;
        byPoint[3] = vByX / point.Z;
        byPoint[4] = vByY / point.Z;
        byPoint[5] = -(vByX * x + vByY * y) / point.Z;

        var u = byCamera[..CameraParameters];
        var v = byCamera[CameraParameters..];
        (u[0], v[0]) = (distortedX, 0);
        (u[1], v[1]) = (0, distortedY);
        (u[2], v[2]) = (1, 0);
        (u[3], v[3]) = (0, 1);
        var (radialU, radialV) = (fu * x / denominator, fv * y / denominator);
        (u[4], v[4]) = (radialU * r2, radialV * r2);
        (u[5], v[5]) = (radialU * r4, radialV * r4);
        (u[6], v[6]) = (2 * fu * xy, fv * (r2 + 2 * yy));
        (u[7], v[7]) = (fu * (r2 + 2 * xx), 2 * fv * xy);
        (u[8], v[8]) = (radialU * r6, radialV * r6);
        (u[9], v[9]) = (-g * u[4], -g * v[4]);
        (u[10], v[10]) = (-g * u[5], -g * v[5]);
        (u[11], v[11]) = (-g * u[8], -g * v[8]);
        return new(fu * distortedX + camera[2], fv * distortedY + camera[3]);
    }
}
