using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Factorization;

namespace Pairwright.Calibration;

/// <summary>One board's share of the normal equations after its elimination: what turns the shared step into the board's own.</summary>
/// <param name="Factor">The factor of the pose × pose block.</param>
/// <param name="Cross">The pose × shared block; nothing where nothing is shared.</param>
/// <param name="Right">The right-hand side.</param>
internal sealed record EliminatedPose(Cholesky<double> Factor, Matrix<double>? Cross, Vector<double> Right)
{
    public double[] Solve(double[] shared) =>
        Factor.Solve(Cross is null ? Right : Right - Cross * Vector<double>.Build.Dense(shared)).ToArray();
}
