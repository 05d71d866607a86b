using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>Rigs for simulated captures.</summary>
public static class SimulatedRig
{
    /// <summary>Two equal cameras side by side.</summary>
    /// <param name="size">The size of both pictures.</param>
    /// <param name="focalPx">The focal length of both, in pixels.</param>
    /// <param name="baselineMm">The distance between them, in millimetres.</param>
    /// <param name="vergenceDegrees">How much the two axes turn towards each other in all; each camera by half of it.</param>
    /// <param name="distortion">The lens of both; none when left out.</param>
    public static Rig SideBySide(
        PictureSize size, double focalPx, double baselineMm, double vergenceDegrees = 0, Distortion? distortion = null)
    {
        var camera = new Camera(new(focalPx, focalPx, (size.Width - 1) / 2.0, (size.Height - 1) / 2.0), size, distortion);
        var half = vergenceDegrees / 2 * Math.PI / 180;

        // Both cameras turn inwards from a frame whose X axis is the baseline; the rig is told in the left camera's own frame.
        var leftFromBase = Rotation.FromVector(new(0, -half, 0));
        var rightFromBase = Rotation.FromVector(new(0, half, 0));
        var rotation = rightFromBase * leftFromBase.Transpose;
        return new(camera, camera, new(rotation, -(rightFromBase * new Vector3D(baselineMm, 0, 0))));
    }

    /// <summary>The rectification of two cameras with parallel axes and equal matrices: nothing turns, only the lenses' distortion is taken out.</summary>
    /// <param name="rig">A rig whose axes are parallel and whose camera matrices are equal.</param>
    /// <exception cref="UserErrorException">The rig is not so.</exception>
    public static Rectification Unturned(Rig rig)
    {
        ArgumentNullException.ThrowIfNull(rig);
        var (k, t) = (rig.Left.Matrix, rig.RightFromLeft.Translation);
        if (rig.RightFromLeft.Rotation != Matrix3x3.Identity || rig.Right.Matrix != k || k.FocalU != k.FocalV || t.Y != 0 || t.Z != 0 || t.X >= 0 || rig.Right.Size != rig.Left.Size)
        {
            throw new UserErrorException("Only cameras with parallel axes along the baseline and equal, square-pixel matrices are rectified without a turn; rectify this rig instead.");
        }

        return new(rig, new(k.FocalU, -t.X, 0, k.CentreU, k.CentreV, rig.Left.Size));
    }
}
