using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>Where the rays of a pixel pair come nearest to each other, for many points at once.</summary>
internal static class RayMeeting
{
    /// <summary>The meeting point in the left camera's frame; NaN outside a lens model's field.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="left">The pixel in the left picture.</param>
    /// <param name="right">The pixel in the right picture.</param>
    /// <param name="onLeftRay">
    /// True for dense matches: the left pixel is where the grid says and the point stays on its ray. False for two located features: the
    /// point halfway between both rays.
    /// </param>
    public static Vector3D Of(Rig rig, RawPixel left, RawPixel right, bool onLeftRay)
    {
        if (Direction(rig.Left, left) is not { } leftRay || Direction(rig.Right, right) is not { } rightRay)
        {
            return new(double.NaN, double.NaN, double.NaN);
        }

        var back = rig.RightFromLeft.Rotation.Transpose;
        var (ray, centre) = (back * rightRay, -(back * rig.RightFromLeft.Translation));

        // Least distance between λ·leftRay and centre + μ·ray: both partial derivatives are zero.
        var (aa, ab, bb) = (leftRay.Dot(leftRay), leftRay.Dot(ray), ray.Dot(ray));
        var (ac, bc) = (leftRay.Dot(centre), ray.Dot(centre));
        var determinant = aa * bb - ab * ab;
        var onLeft = (ac * bb - ab * bc) / determinant * leftRay;
        return onLeftRay ? onLeft : 0.5 * (onLeft + centre + (ab * ac - aa * bc) / determinant * ray);
    }

    private static Vector3D? Direction(Camera camera, RawPixel pixel) =>
        camera.TryUndistort(pixel) is { } ideal
            ? new((ideal.U - camera.Matrix.CentreU) / camera.Matrix.FocalU, (ideal.V - camera.Matrix.CentreV) / camera.Matrix.FocalV, 1)
            : null;
}
