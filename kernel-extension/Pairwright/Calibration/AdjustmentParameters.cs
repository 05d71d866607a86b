using System.Collections.Immutable;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>Which of the thirty rig parameters an adjustment estimates, and which of them are one and the same unknown.</summary>
internal sealed record AdjustmentParameters
{
    private AdjustmentParameters(ImmutableArray<int> unknown) => (Unknown, Count) = (unknown, unknown.Max() + 1);

    /// <summary>For each rig parameter the unknown that moves it, or −1 where it is held fixed.</summary>
    public ImmutableArray<int> Unknown { get; }

    /// <summary>The number of unknowns.</summary>
    public int Count { get; }

    /// <summary>Whether the three of the rotation turn the right camera about its own centre, its place held, instead of about the left one's axes with t held.</summary>
    public bool TurnAboutRightCentre { get; private init; }

    /// <summary>Nothing but the boards' poses.</summary>
    public static AdjustmentParameters BoardsAlone { get; } = new([.. Enumerable.Repeat(-1, RigParameters.Count)]);

    /// <summary>A turn of the right camera about its own centre.</summary>
    public static AdjustmentParameters RightTurnAlone { get; } =
        Of(parameter => parameter is >= RigParameters.RotationStart and < RigParameters.TranslationStart) with { TurnAboutRightCentre = true };

    /// <summary>The left camera alone, for views that only it saw.</summary>
    public static AdjustmentParameters OneCamera(CalibrationModel model) => Of(parameter => parameter < RigParameters.RightCamera && IsFree(model, parameter), model);

    /// <summary>Both cameras and the pose between them.</summary>
    public static AdjustmentParameters WholeRig(CalibrationModel model) => Of(parameter => IsFree(model, parameter), model);

    /// <summary>The covariance of the thirty parameters from that of the unknowns.</summary>
    public Matrix<double> Spread(Matrix<double> ofUnknowns) => Matrix<double>.Build.Dense(
        RigParameters.Count, RigParameters.Count, (i, j) => Unknown[i] < 0 || Unknown[j] < 0 ? 0 : ofUnknowns[Unknown[i], Unknown[j]]);

    private static AdjustmentParameters Of(Func<int, bool> free, CalibrationModel? model = null)
    {
        var unknown = new int[RigParameters.Count];
        var next = 0;
        for (var parameter = 0; parameter < RigParameters.Count; parameter++)
        {
            var isFocalV = parameter is 1 or RigParameters.RightCamera + 1;
            unknown[parameter] = !free(parameter) ? -1 : isFocalV && model is { SquarePixels: true } ? unknown[parameter - 1] : next++;
        }

        return new([.. unknown]);
    }

    private static bool IsFree(CalibrationModel model, int parameter) =>
        parameter >= RigParameters.RotationStart || (parameter % RigParameters.RightCamera) switch
        {
            4 => model.Terms.HasFlag(LensTerms.K1),
            5 => model.Terms.HasFlag(LensTerms.K2),
            6 or 7 => model.Terms.HasFlag(LensTerms.Tangential),
            8 => model.Terms.HasFlag(LensTerms.K3),
            9 => model.Terms.HasFlag(LensTerms.K4),
            10 => model.Terms.HasFlag(LensTerms.K5),
            11 => model.Terms.HasFlag(LensTerms.K6),
            _ => true,
        };
}
