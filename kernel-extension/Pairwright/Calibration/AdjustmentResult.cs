using System.Collections.Immutable;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>What an adjustment came to.</summary>
internal sealed class AdjustmentResult
{
    public required AdjustmentState State { get; init; }

    /// <summary>The sum of squared residual coordinates, in square pixels.</summary>
    public required double SumOfSquares { get; init; }

    /// <summary>Measured coordinates minus unknowns, the boards' poses included.</summary>
    public required int DegreesOfFreedom { get; init; }

    /// <summary>Measured corners, of both pictures.</summary>
    public required int Corners { get; init; }

    /// <summary>(JᵀJ)⁻¹ of the shared unknowns, the boards' poses eliminated: their covariance for corners of one pixel standard deviation; nothing where they are not determined.</summary>
    public required Matrix<double>? Cofactors { get; init; }

    /// <summary>Measured minus modelled, per view.</summary>
    public required ImmutableArray<(ImmutableArray<Residual> Left, ImmutableArray<Residual> Right)> Residuals { get; init; }

    /// <summary>Root of the mean squared length of a residual, in pixels.</summary>
    public double RmsPx => Math.Sqrt(SumOfSquares / Corners);

    /// <summary>The variance of one corner coordinate as the residuals tell it, in square pixels.</summary>
    public double Variance => SumOfSquares / DegreesOfFreedom;
}
