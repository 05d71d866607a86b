using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.Statistics;

namespace Pairwright.Measurement;

/// <summary>A linear model fitted to correlated readings, in millimetres, among which some are wrong.</summary>
/// <remarks>
/// <para>
/// Iteratively reweighted least squares: Huber's weights (Huber 1964, tuned at 1.345) from the plain solution to a scale by the median
/// absolute deviation, then, with that scale, Tukey's biweight (Beaton and Tukey 1974, tuned at 4.685), which gives readings beyond 4.685
/// scales no say.
/// </para>
/// <para>
/// The covariance is the sandwich of Liang and Zeger (1986) over blocks of readings, in the leave-one-block-out form for few blocks (CR3;
/// Bell and McCaffrey 2002), times (G − 1)/(G − 3) for G blocks: the variance of Student's t distribution (JCGM 101:2008, 6.4.9.4). With too
/// few blocks for that it comes from the stated σ of the readings, each block wholly correlated; NaN where none is stated.
/// </para>
/// <para>
/// A pull of the readings, which blocks share, adds what the fit makes of its patterns: with a random phase, an error σ·√2·cos(2πd + φ) has
/// the covariance σ²·cos(2π(d − d′)), which is that of two independent patterns, σ·cos 2πd and σ·sin 2πd.
/// </para>
/// </remarks>
internal sealed class RobustFit
{
    // Fewer blocks than this beyond the number of parameters say too little by their scatter.
    private const int LeastSpareBlocks = 5;
    private const double HuberTuning = 1.345;
    private const double TukeyTuning = 4.685;
    private const int Iterations = 40;

    // Residuals below this, in millimetres, are rounding.
    private const double ResolutionMm = 1e-9;

    private readonly double[] rows;
    private readonly int terms;
    private readonly double[] readings;
    private readonly double[] sigmas;
    private readonly double[] extents;
    private readonly Lazy<(Matrix<double> Covariance, string Basis)> random;

    private RobustFit(double[] rows, int terms, double[] readings, double[] sigmas, double[]? stated, PointBlocks blocks, IReadOnlyList<double[]> pull, double? knownScale)
    {
        (this.rows, this.terms, this.readings, this.sigmas) = (rows, terms, readings, sigmas);
        extents = [.. Enumerable.Range(0, terms).Select(term => Enumerable.Range(0, readings.Length).Max(i => Math.Abs(rows[i * terms + term])))];
        Weights = Array.ConvertAll(sigmas, sigma => 1 / (sigma * sigma));
        Coefficients = knownScale is null ? Solve(rows, terms, readings, Weights) : new double[terms];
        Scale = knownScale ?? Iterate(HuberWeight, null, 1e-2);
        Iterate(TukeyWeight, Scale, 1e-5);
        random = new(() => WithPull(pull, blocks.Count >= terms + LeastSpareBlocks
            ? (Sandwich(blocks), blocks.Scatter)
            : stated is null
                ? (Matrix<double>.Build.Dense(terms, terms, double.NaN), $"nothing: {blocks.Scatter} is too little, and no σ of disparity is stated")
                : (FromStated(stated, blocks), $"the stated σ of the points, because {blocks.Scatter} is too little")));
    }

    /// <summary>The parameters.</summary>
    public double[] Coefficients { get; private set; }

    /// <summary>The weight of each reading in the solution, zero for one that has no say.</summary>
    public double[] Weights { get; }

    /// <summary>The robust standard deviation of the residuals, in units of each reading's own σ.</summary>
    public double Scale { get; }

    /// <summary>The random covariance of the parameters; NaN where nothing is known about it.</summary>
    public Matrix<double> Covariance => random.Value.Covariance;

    /// <summary>What the covariance rests on, as a phrase.</summary>
    public string Basis => random.Value.Basis;

    /// <summary>Whether every term moves every reading by less than a share of the residuals' scale.</summary>
    public bool IsSettled => Enumerable.Range(0, terms).All(term => Math.Abs(Coefficients[term]) * extents[term] < 1e-4 * Scale * sigmas[0] + ResolutionMm);

    private bool IsExact => Scale * sigmas[0] <= ResolutionMm;

    /// <summary>Fits a model.</summary>
    /// <param name="rows">The model's terms at each reading, one reading after another.</param>
    /// <param name="terms">How many terms a reading has.</param>
    /// <param name="readings">The readings, in millimetres.</param>
    /// <param name="sigmas">The relative σ of each reading, above zero.</param>
    /// <param name="stated">The stated random σ of each reading, in millimetres; nothing where it is not known.</param>
    /// <param name="blocks">The blocks of readings.</param>
    /// <param name="pull">Patterns that the matcher's pull may add to the readings, of one standard deviation each; see <see cref="MeasuredPoints.PullAlong"/>.</param>
    /// <param name="knownScale">The scale of the residuals where it is known and the solution is near zero, so that Huber's steps can be left out.</param>
    public static RobustFit Of(
        double[] rows,
        int terms,
        double[] readings,
        double[] sigmas,
        double[]? stated,
        PointBlocks blocks,
        IReadOnlyList<double[]> pull,
        double? knownScale = null) =>
        new(rows, terms, readings, sigmas, stated, blocks, pull, knownScale);

    /// <summary>The weighted least-squares solution.</summary>
    public static double[] Solve(double[] rows, int terms, double[] readings, double[] weights)
    {
        var normal = new double[terms * terms];
        var right = new double[terms];
        for (var i = 0; i < readings.Length; i++)
        {
            if (weights[i] != 0)
            {
                Accumulate(normal, rows, i, terms, weights[i]);
                Accumulate(right, rows, i, terms, weights[i] * readings[i], outer: false);
            }
        }

        return Square(normal, terms).LU().Solve(Vector<double>.Build.Dense(right)).ToArray();
    }

    // Reweights and solves until nothing moves; returns the scale of the residuals.
    private double Iterate(Func<double, double> weight, double? fixedScale, double tolerance)
    {
        var standard = new double[readings.Length];
        var scale = fixedScale ?? 0;
        for (var iteration = 0; iteration < Iterations; iteration++)
        {
            for (var i = 0; i < standard.Length; i++)
            {
                standard[i] = Residual(i) / sigmas[i];
            }

            scale = fixedScale ?? 1.4826 * ArrayStatistics.MedianInplace(Array.ConvertAll(standard, Math.Abs));
            if (scale * sigmas[0] <= ResolutionMm)
            {
                return scale;
            }

            for (var i = 0; i < standard.Length; i++)
            {
                Weights[i] = weight(standard[i] / scale) / (sigmas[i] * sigmas[i]);
            }

            var next = Solve(rows, terms, readings, Weights);
            var moved = next.Zip(Coefficients, (a, b) => Math.Abs(a - b)).Zip(extents, (change, extent) => change * extent).Max();
            Coefficients = next;
            if (moved < tolerance * scale * sigmas[0])
            {
                break;
            }
        }

        return scale;
    }

    private Matrix<double> Sandwich(PointBlocks blocks)
    {
        // Slopes and scores of the estimating equation Σ w·ψ(residual)·row = 0, block by block.
        var blockSlopes = new double[blocks.Count][];
        var blockScores = new double[blocks.Count][];
        for (var block = 0; block < blocks.Count; block++)
        {
            (blockSlopes[block], blockScores[block]) = (new double[terms * terms], new double[terms]);
        }

        for (var i = 0; i < readings.Length; i++)
        {
            var residual = Residual(i);
            var standard = IsExact ? 0 : residual / (sigmas[i] * Scale);
            var weight = 1 / (sigmas[i] * sigmas[i]);
            Accumulate(blockSlopes[blocks.Of[i]], rows, i, terms, weight * TukeySlope(standard));
            Accumulate(blockScores[blocks.Of[i]], rows, i, terms, weight * TukeyWeight(standard) * residual, outer: false);
        }

        var slopes = blockSlopes.Select(slope => Square(slope, terms)).Aggregate((sum, slope) => sum + slope);
        var covariance = Matrix<double>.Build.Dense(terms, terms);
        for (var block = 0; block < blocks.Count; block++)
        {
            var moved = (slopes - Square(blockSlopes[block], terms)).LU().Solve(Vector<double>.Build.Dense(blockScores[block]));
            covariance += moved.OuterProduct(moved);
        }

        var g = (double)blocks.Count;
        return covariance * ((g - 1) / g * (g - 1) / (g - 3) * blocks.BorderFactor);
    }

    private Matrix<double> FromStated(double[] stated, PointBlocks blocks)
    {
        var normal = new double[terms * terms];
        var blockSums = Enumerable.Range(0, blocks.Count).Select(_ => new double[terms]).ToArray();
        for (var i = 0; i < readings.Length; i++)
        {
            Accumulate(normal, rows, i, terms, Weights[i]);
            Accumulate(blockSums[blocks.Of[i]], rows, i, terms, Weights[i] * stated[i], outer: false);
        }

        var solver = Square(normal, terms).LU();
        return blockSums
            .Select(sum => solver.Solve(Vector<double>.Build.Dense(sum)))
            .Aggregate(Matrix<double>.Build.Dense(terms, terms), (sum, moved) => sum + moved.OuterProduct(moved)) * blocks.BorderFactor;
    }

    private (Matrix<double> Covariance, string Basis) WithPull(IReadOnlyList<double[]> pull, (Matrix<double> Covariance, string Basis) scatter)
    {
        var moved = pull.Select(pattern => Vector<double>.Build.Dense(Solve(rows, terms, pattern, Weights)));
        return pull.Count == 0
            ? scatter
            : (moved.Aggregate(scatter.Covariance, (sum, step) => sum + step.OuterProduct(step)), $"{scatter.Basis}, and the matcher's pull towards whole pixels");
    }

    private double Residual(int i)
    {
        var residual = readings[i];
        for (var term = 0; term < terms; term++)
        {
            residual -= rows[i * terms + term] * Coefficients[term];
        }

        return residual;
    }

    // Adds factor · row · rowᵀ, or factor · row.
    private static void Accumulate(double[] sum, double[] rows, int i, int terms, double factor, bool outer = true)
    {
        var row = rows.AsSpan(i * terms, terms);
        for (var a = 0; a < terms; a++)
        {
            var scaled = factor * row[a];
            if (!outer)
            {
                sum[a] += scaled;
                continue;
            }

            for (var b = 0; b < terms; b++)
            {
                sum[a * terms + b] += scaled * row[b];
            }
        }
    }

    private static Matrix<double> Square(double[] entries, int terms) => Matrix<double>.Build.DenseOfColumnMajor(terms, terms, entries);

    private static double HuberWeight(double standard) => Math.Abs(standard) <= HuberTuning ? 1 : HuberTuning / Math.Abs(standard);

    private static double TukeyWeight(double standard)
    {
        var rest = 1 - standard * standard / (TukeyTuning * TukeyTuning);
        return rest > 0 ? rest * rest : 0;
    }

    // The derivative of standard · TukeyWeight(standard).
    private static double TukeySlope(double standard)
    {
        var square = standard * standard / (TukeyTuning * TukeyTuning);
        return square < 1 ? (1 - square) * (1 - 5 * square) : 0;
    }
}
