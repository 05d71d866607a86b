using MathNet.Numerics.LinearAlgebra;

namespace Pairwright.Geometry;

/// <summary>Minimises the sum of squared Sampson distances over matrices of rank two.</summary>
/// <remarks>
/// F = U·diag(cos φ, sin φ, 0)·Vᵀ with rotations U and V has the seven freedoms of a fundamental matrix and no more (Bartoli and Sturm 2004).
/// The steps are those of Levenberg (1944) and Marquardt (1963), in conditioned coordinates.
/// </remarks>
internal static class SampsonRefinement
{
    private const int Parameters = 7;
    private const double DifferenceStep = 1e-6;

    public static Matrix3x3 Refine(Matrix3x3 start, IdealMatch[] matches)
    {
        var left = FundamentalEstimator.Conditioning(matches.Select(match => match.Left));
        var right = FundamentalEstimator.Conditioning(matches.Select(match => match.Right));
        var state = State.From(right.Inverse.Transpose * start * left.Inverse);
        var residuals = Residuals(state);
        var (sum, damping) = (residuals.DotProduct(residuals), 1e-3);
        for (var iteration = 0; iteration < 100; iteration++)
        {
            var jacobian = Matrix<double>.Build.Dense(matches.Length, Parameters);
            for (var parameter = 0; parameter < Parameters; parameter++)
            {
                var step = new double[Parameters];
                step[parameter] = DifferenceStep;
                var ahead = Residuals(state.Moved(step));
                step[parameter] = -DifferenceStep;
                jacobian.SetColumn(parameter, (ahead - Residuals(state.Moved(step))) / (2 * DifferenceStep));
            }

            var normal = jacobian.TransposeThisAndMultiply(jacobian);
            var slope = jacobian.TransposeThisAndMultiply(residuals);
            var improved = false;
            while (!improved && damping < 1e12)
            {
                var damped = normal + Matrix<double>.Build.DenseDiagonal(Parameters, Parameters, i => damping * Math.Max(normal[i, i], 1e-12));
                var candidate = state.Moved([.. -damped.Solve(slope)]);
                var candidateResiduals = Residuals(candidate);
                var candidateSum = candidateResiduals.DotProduct(candidateResiduals);
                if (candidateSum < sum)
                {
                    improved = sum - candidateSum > 1e-10 * sum;
                    (state, residuals, sum, damping) = (candidate, candidateResiduals, candidateSum, damping / 10);
                    if (!improved)
                    {
                        break;
                    }
                }
                else
                {
                    damping *= 10;
                }
            }

            if (!improved)
            {
                break;
            }
        }

        return Matrix(state);

        Matrix3x3 Matrix(State at) => right.Transpose * at.Matrix * left;

        Vector<double> Residuals(State at)
        {
            var matrix = Matrix(at);
            return Vector<double>.Build.Dense(matches.Length, i => FundamentalEstimator.Sampson(matrix, matches[i]));
        }
    }

    private readonly record struct State(Matrix3x3 U, Matrix3x3 V, double Angle)
    {
        public Matrix3x3 Matrix => U * new Matrix3x3(Math.Cos(Angle), 0, 0, 0, Math.Sin(Angle), 0, 0, 0, 0) * V.Transpose;

        public static State From(Matrix3x3 matrix)
        {
            // The third columns meet a zero, so that their signs are free to make rotations.
            var svd = matrix.ToMatrix().Svd();
            var (u, v) = (Matrix3x3.From(svd.U), Matrix3x3.From(svd.VT.Transpose()));
            return new(AsRotation(u), AsRotation(v), Math.Atan2(svd.S[1], svd.S[0]));
        }

        public State Moved(double[] step) => new(
            U * Rotation.FromVector(new(step[0], step[1], step[2])),
            V * Rotation.FromVector(new(step[3], step[4], step[5])),
            Angle + step[6]);

        private static Matrix3x3 AsRotation(Matrix3x3 m) =>
            m.Determinant < 0 ? new(m.M11, m.M12, -m.M13, m.M21, m.M22, -m.M23, m.M31, m.M32, -m.M33) : m;
    }
}
