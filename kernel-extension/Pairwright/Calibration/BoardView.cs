using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>One capture of the board by both cameras, and how well the calibrated rig explains it.</summary>
/// <remarks>A view that is not used has NaN figures, no residuals, and says why.</remarks>
public sealed record BoardView
{
    /// <summary>The view's name: the left file's name without its ending, or the name that came with the corners.</summary>
    public required string Name { get; init; }

    /// <summary>The pictures, where the corners came from pictures.</summary>
    public StereoPair? Pair { get; init; }

    /// <summary>Whether the rig was calibrated with this view.</summary>
    public bool Used => WhyNotUsed is null;

    /// <summary>Why the view is not used, as a sentence; nothing where it is.</summary>
    public string? WhyNotUsed { get; init; }

    /// <summary>What was noticed and mended, as a sentence, for example corners renumbered by half a turn; nothing where all was well.</summary>
    public string? Mended { get; init; }

    /// <summary>Corners in the left picture in the order of <see cref="Board.Corners"/>; empty where none were found.</summary>
    public ImmutableArray<RawPixel> Left { get; init; } = [];

    /// <summary>Corners in the right picture in the order of <see cref="Board.Corners"/>; empty where none were found.</summary>
    public ImmutableArray<RawPixel> Right { get; init; } = [];

    /// <summary>The board's pose in the left camera's frame, X_left = R·X_board + t.</summary>
    public Pose LeftFromBoard { get; init; } = Pose.Identity;

    /// <summary>Measured minus modelled corner in the left picture, per corner.</summary>
    public ImmutableArray<Residual> LeftResiduals { get; init; } = [];

    /// <summary>Measured minus modelled corner in the right picture, per corner.</summary>
    public ImmutableArray<Residual> RightResiduals { get; init; } = [];

    /// <summary>Root of the mean squared length of the left residuals, in pixels.</summary>
    public double LeftRmsPx => Rms(LeftResiduals);

    /// <summary>Root of the mean squared length of the right residuals, in pixels.</summary>
    public double RightRmsPx => Rms(RightResiduals);

    /// <summary>Root of the mean squared length of all residuals of both pictures, in pixels.</summary>
    public double RmsPx => Rms([.. LeftResiduals, .. RightResiduals]);

    /// <summary>Root of the mean squared distance of the right corners from the epipolar lines of the left ones, in ideal pixels of the right view.</summary>
    public double EpipolarRmsPx { get; init; } = double.NaN;

    /// <summary>Root of the mean squared difference between the triangulated sides of neighbouring corners and the stated square, in millimetres.</summary>
    public double SideRmsMm { get; init; } = double.NaN;

    /// <summary>The angle between the board's normal and the left viewing direction of its centre, in degrees; 0 is a board seen square on.</summary>
    public double TiltDegrees { get; init; } = double.NaN;

    /// <summary>The distance of the board's centre from the left camera, in millimetres.</summary>
    public double DistanceMm { get; init; } = double.NaN;

    /// <summary>Whether the view stands out from the others by the rule of <see cref="RigCalibration.OutlyingRule"/>.</summary>
    public bool Outlying { get; init; }

    internal static double Rms(ImmutableArray<Residual> residuals) =>
        residuals.IsEmpty ? double.NaN : Math.Sqrt(residuals.Sum(residual => residual.Square) / residuals.Length);
}
