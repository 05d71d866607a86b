using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>Where measured points come from: for each one its pixel pair, its position and its random covariance.</summary>
internal abstract class PointSource
{
    /// <summary>The rig that measured them; nothing where the pair came rectified without one.</summary>
    public abstract Rig? Rig { get; }

    /// <summary>How far the errors of neighbouring points are correlated, in pixels; 0 where they are independent.</summary>
    public abstract double CorrelationLengthPx { get; }

    /// <summary>The standard uncertainty of the disparities' pull towards or away from whole pixels, in pixels; 0 where there is none.</summary>
    public virtual double PullSigmaPx => 0;

    /// <summary>Whether the left pixel is exact, as on the grid of a dense map.</summary>
    public abstract bool OnLeftRay { get; }

    /// <summary>The position in the left camera's own frame, in millimetres.</summary>
    public abstract Vector3D Position(int index);

    /// <summary>The covariance of the random part, in mm²; NaN where it is not known.</summary>
    public abstract Matrix3x3 Covariance(int index);

    /// <summary>Where the point lies in the picture, in pixels.</summary>
    public abstract (double U, double V) Place(int index);

    /// <summary>The raw pixels that were matched.</summary>
    public abstract (RawPixel Left, RawPixel Right) Pair(int index);

    /// <summary>The disparity, in pixels, and how the position moves with it, in millimetres per pixel; only where there is a pull.</summary>
    public virtual (double Disparity, Vector3D Step) Lever(int index) => (double.NaN, new(double.NaN, double.NaN, double.NaN));

    /// <summary>The distance of neighbouring points on a surface that faces the camera there, in millimetres; 0 for single features.</summary>
    public abstract double PitchMm(int index);
}
