using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>A calibrated camera: a camera matrix, a lens distortion and the size of its pictures.</summary>
/// <remarks>Immutable; equal when all three are equal. Points are in the camera's own frame: X right, Y down, Z forward, in millimetres.</remarks>
public sealed record Camera
{
    private readonly Lazy<ImmutableArray<IdealPixel>> border;

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
        if (!values.All(double.IsFinite))
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
        border = new(() => BorderDrawnIn(0));
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
            ? Matrix.Pixel(x, y)
            : null;

    /// <summary>The ideal pixel of the raw pixel (u, v); short for <see cref="Undistort"/>.</summary>
    /// <exception cref="UserErrorException">The pixel lies outside the lens model's valid field.</exception>
    public IdealPixel Ideal(double u, double v) => Undistort(new RawPixel(u, v));

    /// <summary>The direction, of length one, from the camera's centre through an ideal pixel.</summary>
    public Vector3D Ray(IdealPixel pixel) => Matrix.Direction(pixel).Normalized;

    /// <summary>The angles that the camera sees, lens distortion included.</summary>
    public FieldOfView FieldOfView
    {
        get
        {
            var (right, bottom) = (Size.Width - 0.5, Size.Height - 0.5);
            var (middleU, middleV) = ((right - 0.5) / 2, (bottom - 0.5) / 2);
            return new(
                Angle(new(-0.5, middleV), new(right, middleV)),
                Angle(new(middleU, -0.5), new(middleU, bottom)),
                Math.Max(Angle(new(-0.5, -0.5), new(right, bottom)), Angle(new(-0.5, bottom), new(right, -0.5))));

            double Angle(RawPixel a, RawPixel b)
            {
                var (first, second) = (Matrix.Direction(LastValidTowards(a)), Matrix.Direction(LastValidTowards(b)));
                return Math.Atan2(first.Cross(second).Norm, first.Dot(second)) * 180 / Math.PI;
            }
        }
    }

    /// <summary>Whether two cameras have equal parts.</summary>
    public bool Equals(Camera? other) =>
        other is not null && Matrix == other.Matrix && Distortion == other.Distortion && Size == other.Size;

    /// <summary>Hashes the parts.</summary>
    public override int GetHashCode() => HashCode.Combine(Matrix, Distortion, Size);

    /// <summary>Size, linear part and lens.</summary>
    public override string ToString() => $"{Size} px, {Matrix}, {Distortion}";

    /// <summary>The border of the picture in ideal pixels, in order from the top-left corner; where the lens model ends before the picture, its end.</summary>
    internal ImmutableArray<IdealPixel> Border => border.Value;

    /// <summary>As <see cref="Border"/>, drawn in by some pixels: half a pixel leads through the outermost pixels' centres.</summary>
    internal ImmutableArray<IdealPixel> BorderDrawnIn(double pixels)
    {
        const int pointsPerSide = 48;
        var (left, top, right, bottom) = (pixels - 0.5, pixels - 0.5, Size.Width - 0.5 - pixels, Size.Height - 0.5 - pixels);
        RawPixel[] corners = [new(left, top), new(right, top), new(right, bottom), new(left, bottom)];
        var points = ImmutableArray.CreateBuilder<IdealPixel>(4 * pointsPerSide);
        for (var side = 0; side < 4; side++)
        {
            var (from, to) = (corners[side], corners[(side + 1) % 4]);
            for (var i = 0; i < pointsPerSide; i++)
            {
                points.Add(LastValidTowards(Between(from, to, i / (double)pointsPerSide)));
            }
        }

        return points.MoveToImmutable();
    }

    private static RawPixel Between(RawPixel from, RawPixel to, double share) =>
        new(from.U + share * (to.U - from.U), from.V + share * (to.V - from.V));

    // The ideal pixel of a raw one or, where the lens model ends before it, of the last one on the way there from the principal point.
    private IdealPixel LastValidTowards(RawPixel pixel)
    {
        if (TryUndistort(pixel) is { } ideal)
        {
            return ideal;
        }

        var centre = new RawPixel(Matrix.CentreU, Matrix.CentreV);
        var (last, low, high) = (new IdealPixel(centre.U, centre.V), 0.0, 1.0);
        for (var halving = 0; halving < 40; halving++)
        {
            var middle = (low + high) / 2;
            if (TryUndistort(Between(centre, pixel, middle)) is { } valid)
            {
                (last, low) = (valid, middle);
            }
            else
            {
                high = middle;
            }
        }

        return last;
    }

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
