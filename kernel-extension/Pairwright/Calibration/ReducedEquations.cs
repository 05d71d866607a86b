using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Factorization;

namespace Pairwright.Calibration;

/// <summary>The normal equations of the shared unknowns after the boards' poses are eliminated.</summary>
/// <param name="Factor">The factor of the matrix, scaled on both sides to a unit diagonal; nothing where nothing is shared.</param>
/// <param name="Scale">That scale, per unknown.</param>
/// <param name="Right">The right-hand side, unscaled.</param>
/// <param name="Poses">What was eliminated, per view.</param>
internal sealed record ReducedEquations(Cholesky<double>? Factor, double[] Scale, double[] Right, EliminatedPose[] Poses)
{
    public double[] SolveShared()
    {
        if (Factor is null)
        {
            return [];
        }

        var scale = Vector<double>.Build.Dense(Scale);
        return Factor.Solve(Vector<double>.Build.Dense(Right).PointwiseMultiply(scale)).PointwiseMultiply(scale).ToArray();
    }

    public double[][] SolvePoses(double[] shared) => [.. Poses.Select(pose => pose.Solve(shared))];

    /// <summary>The inverse of the matrix; nothing where nothing is shared.</summary>
    public Matrix<double>? Cofactors()
    {
        if (Factor is null)
        {
            return null;
        }

        var inverse = Factor.Solve(Matrix<double>.Build.DenseIdentity(Scale.Length));
        return Matrix<double>.Build.Dense(Scale.Length, Scale.Length, (i, j) => (inverse[i, j] + inverse[j, i]) / 2 * Scale[i] * Scale[j]);
    }
}
