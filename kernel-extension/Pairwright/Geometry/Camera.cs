namespace Pairwright.Geometry;

/// <summary>A calibrated camera: a camera matrix, a lens distortion and the size of its pictures.</summary>
/// <remarks>Immutable; equal when all three are equal. Points are in the camera's own frame: X right, Y down, Z forward, in millimetres.</remarks>
public sealed record Camera
{
    /// <summary>Makes a camera.</summary>
    /// <param name="matrix">The linear part.</param>
    /// <param name="distortion">The lens; none when left out.</param>
    /// <param name="size">The size of the pictures, in pixels.</param>
    /// <exception cref="UserErrorException">A value is not finite, a focal length is not above zero (a singular camera matrix), or the size is empty.</exception>
    public Camera(CameraMatrix matrix, PictureSize size, Distortion? distortion = null)
    {
        Distortion = distortion ?? Distortion.None;
        var (k, d) = (matrix, Distortion);
        double[] values = [k.FocalU, k.FocalV, k.CentreU, k.CentreV, d.K1, d.K2, d.P1, d.P2, d.K3, d.K4, d.K5, d.K6];
        if (values.FirstOrDefault(value => !double.IsFinite(value), 0) != 0)
        {
            throw new UserErrorException("A camera parameter is not a finite number; calibrate again or correct the rig file.");
        }

        if (matrix.FocalU <= 0 || matrix.FocalV <= 0)
        {
            throw new UserErrorException(
                $"The camera matrix is singular or mirrored: focal lengths {matrix.FocalU} and {matrix.FocalV} px must be above zero; correct the rig file.");
        }

        if (size.Width <= 0 || size.Height <= 0)
        {
            throw new UserErrorException($"A camera's picture size of {size} px is empty; state the width and height of its pictures.");
        }

        Matrix = matrix;
        Size = size;
    }

    /// <summary>The linear part.</summary>
    public CameraMatrix Matrix { get; }

    /// <summary>The lens.</summary>
    public Distortion Distortion { get; }

    /// <summary>The size of the pictures, in pixels.</summary>
    public PictureSize Size { get; }

    /// <summary>Where an undistorted lens would form a point of the camera's frame; NaN behind the camera (Z ≤ 0).</summary>
    public IdealPixel ProjectIdeal(Vector3D point) =>
        point.Z > 0
            ? new(Matrix.FocalU * point.X / point.Z + Matrix.CentreU, Matrix.FocalV * point.Y / point.Z + Matrix.CentreV)
            : new(double.NaN, double.NaN);

    /// <summary>Where the lens forms a point of the camera's frame; NaN behind the camera or outside the lens model's valid field.</summary>
    public RawPixel Project(Vector3D point) =>
        point.Z > 0 ? Distort(point.X / point.Z, point.Y / point.Z) : new(double.NaN, double.NaN);

    /// <summary>Where the lens forms what an undistorted lens would form at a pixel; NaN outside the lens model's valid field.</summary>
    public RawPixel Distort(IdealPixel pixel) =>
        Distort((pixel.U - Matrix.CentreU) / Matrix.FocalU, (pixel.V - Matrix.CentreV) / Matrix.FocalV);

    /// <summary>Where an undistorted lens would form what the real one forms at a pixel.</summary>
    /// <param name="pixel">A raw pixel.</param>
    /// <exception cref="UserErrorException">The pixel lies outside the lens model's valid field.</exception>
    public IdealPixel Undistort(RawPixel pixel) =>
        TryUndistort(pixel) ?? throw new UserErrorException(
            $"Pixel ({pixel.U:0.###}, {pixel.V:0.###}) lies outside the field in which the lens model holds (undistorted radius {Distortion.ValidRadius:0.###}); choose a pixel nearer the centre or calibrate with boards out to the corners.");

    /// <summary>As <see cref="Undistort"/>, but nothing where the pixel lies outside the lens model's valid field.</summary>
    public IdealPixel? TryUndistort(RawPixel pixel) =>
        Distortion.Undistort((pixel.U - Matrix.CentreU) / Matrix.FocalU, (pixel.V - Matrix.CentreV) / Matrix.FocalV) is var (x, y)
            ? new IdealPixel(Matrix.FocalU * x + Matrix.CentreU, Matrix.FocalV * y + Matrix.CentreV)
            : null;

    /// <summary>The ideal pixel of the raw pixel (u, v); short for <see cref="Undistort"/>.</summary>
    /// <exception cref="UserErrorException">The pixel lies outside the lens model's valid field.</exception>
    public IdealPixel Ideal(double u, double v) => Undistort(new RawPixel(u, v));

    /// <summary>The direction, of length one, from the camera's centre through an ideal pixel.</summary>
    public Vector3D Ray(IdealPixel pixel) =>
        new Vector3D((pixel.U - Matrix.CentreU) / Matrix.FocalU, (pixel.V - Matrix.CentreV) / Matrix.FocalV, 1).Normalized;

    private RawPixel Distort(double x, double y)
    {
        if (x * x + y * y > Distortion.ValidRadius * Distortion.ValidRadius)
        {
            return new(double.NaN, double.NaN);
        }

        var (distortedX, distortedY) = Distortion.Distort(x, y);
        return new(Matrix.FocalU * distortedX + Matrix.CentreU, Matrix.FocalV * distortedY + Matrix.CentreV);
    }
}
