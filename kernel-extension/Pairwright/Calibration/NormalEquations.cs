using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Factorization;

namespace Pairwright.Calibration;

/// <summary>The normal equations of an adjustment in their blocks: shared × shared, and per board shared × pose and pose × pose.</summary>
internal sealed class NormalEquations
{
    private const int PoseUnknowns = 6;

    // Of a matrix with unit diagonal: below it rounding has eaten the digits, and the unknown is not determined.
    private const double SmallestPivot = 1e-7;

    private readonly int shared;

    // One block per view over (shared, pose) by (shared, pose), upper triangle, row after row, and its right-hand side.
    private readonly double[][] blocks;
    private readonly double[][] rights;

    public NormalEquations(int shared, int views)
    {
        this.shared = shared;
        blocks = [.. Enumerable.Range(0, views).Select(_ => new double[Width * Width])];
        rights = [.. Enumerable.Range(0, views).Select(_ => new double[Width])];
    }

    private int Width => shared + PoseUnknowns;

    /// <summary>The sum of squared residuals so far.</summary>
    public double SumOfSquares { get; private set; }

    /// <summary>Adds one residual with its derivatives: shared, then the view's pose.</summary>
    public void Add(int view, ReadOnlySpan<double> row, double residual)
    {
        var block = blocks[view].AsSpan();
        var right = rights[view].AsSpan();
        for (var i = 0; i < row.Length; i++)
        {
            var factor = row[i];
            if (factor == 0)
            {
                continue;
            }

            right[i] += factor * residual;
            var target = block.Slice(i * row.Length, row.Length);
            for (var j = i; j < row.Length; j++)
            {
                target[j] += factor * row[j];
            }
        }

        SumOfSquares += residual * residual;
    }

    public double SharedDiagonal(int i) => blocks.Sum(block => block[i * Width + i]);

    public double SharedRight(int i) => rights.Sum(right => right[i]);

    public double PoseDiagonal(int view, int i) => blocks[view][(shared + i) * Width + shared + i];

    public double PoseRight(int view, int i) => rights[view][shared + i];

    /// <summary>Eliminates the boards' poses with every diagonal entry enlarged by 1 + damping; nothing where a pose or the rest is not determined.</summary>
    public ReducedEquations? Reduce(double damping)
    {
        var matrix = new double[shared, shared];
        var right = new double[shared];
        var poses = new EliminatedPose[blocks.Length];
        for (var view = 0; view < blocks.Length; view++)
        {
            var block = blocks[view];
            var pose = Matrix<double>.Build.Dense(
                PoseUnknowns, PoseUnknowns, (i, j) => block[(shared + Math.Min(i, j)) * Width + shared + Math.Max(i, j)] * (i == j ? 1 + damping : 1));
            if (Factor(pose) is not { } factor)
            {
                return null;
            }

            var poseRight = Vector<double>.Build.Dense(PoseUnknowns, i => rights[view][shared + i]);
            if (shared == 0)
            {
                poses[view] = new(factor, null, poseRight);
                continue;
            }

            var cross = Matrix<double>.Build.Dense(PoseUnknowns, shared, (i, j) => block[j * Width + shared + i]);
            poses[view] = new(factor, cross, poseRight);
            var eliminated = cross.TransposeThisAndMultiply(factor.Solve(cross));
            var eliminatedRight = cross.TransposeThisAndMultiply(factor.Solve(poseRight));
            for (var i = 0; i < shared; i++)
            {
                right[i] += rights[view][i] - eliminatedRight[i];
                for (var j = i; j < shared; j++)
                {
                    matrix[i, j] += block[i * Width + j] * (i == j ? 1 + damping : 1) - eliminated[i, j];
                }
            }
        }

        for (var i = 0; i < shared; i++)
        {
            for (var j = 0; j < i; j++)
            {
                matrix[i, j] = matrix[j, i];
            }
        }

        if (shared == 0)
        {
            return new(null, [], [], poses);
        }

        // Scaled to a unit diagonal: a focal length and k3 differ by many powers of ten.
        double[] scale = [.. Enumerable.Range(0, shared).Select(i => 1 / Math.Sqrt(matrix[i, i]))];
        var scaled = Matrix<double>.Build.Dense(shared, shared, (i, j) => matrix[i, j] * scale[i] * scale[j]);
        return Factor(scaled) is { } sharedFactor && sharedFactor.Factor.Diagonal().Minimum() > SmallestPivot
            ? new(sharedFactor, scale, [.. right], poses)
            : null;
    }

    private static Cholesky<double>? Factor(Matrix<double> matrix)
    {
        try
        {
            return matrix.Cholesky();
        }
        catch (ArgumentException)
        {
            return null;
        }
    }
}
