using MathNet.Numerics.LinearAlgebra;

namespace Pairwright.Geometry;

/// <summary>Estimates fundamental matrices from matches: eight points, random samples, refinement.</summary>
internal static class FundamentalEstimator
{
    private const int SampleSize = 8;
    private const int MostSamples = 10_000;

    // A sample free of outliers may still be a poor one, where its eight points lie close together or nearly in a plane; so many are drawn
    // however few would do.
    private const int FewestSamples = 300;

    // How many of the best samples are refined.
    private const int Refinements = 5;

    // Below this share of the largest, the second smallest singular value of the equations is rounding: they have more than one solution.
    private const double SmallestDeterminacy = 1e-9;

    public static FundamentalMatrix EightPoints(IReadOnlyList<IdealMatch> matches)
    {
        Check(matches);
        var estimate = EightPointsOf([.. matches])
            ?? throw new UserErrorException(
                $"The {matches.Count} matches do not fix a fundamental matrix: they lie in one point, line or plane, or the cameras share a centre; give matches of points at several depths.");
        return WithEstimation(estimate, [.. matches], _ => true, double.PositiveInfinity, samples: 0, seed: 0);
    }

    public static FundamentalMatrix Robust(IReadOnlyList<IdealMatch> matches, double tolerancePx, int seed, double confidence)
    {
        Check(matches);
        if (!(tolerancePx > 0) || !double.IsFinite(tolerancePx))
        {
            throw new UserErrorException($"A tolerance of {tolerancePx} px is not above zero; give one such as 1 px.");
        }

        if (!(confidence > 0 && confidence < 1))
        {
            throw new UserErrorException($"A confidence of {confidence} does not lie between 0 and 1; give one such as 0.999.");
        }

        IdealMatch[] all = [.. matches];
        var (candidates, samples) = BestSamples(all, tolerancePx, seed, confidence);
        if (candidates.Count == 0)
        {
            throw new UserErrorException(
                $"The {all.Length} matches do not fix a fundamental matrix: every sample of eight lies in one point, line or plane; give matches of points at several depths.");
        }

        var refined = candidates.Select(candidate => Refined(candidate, all, tolerancePx)).MinBy(estimate => Loss(estimate.Matrix, all, tolerancePx));
        var consistent = Consistent(refined.Matrix, all, tolerancePx).Length;
        return consistent >= SampleSize
            ? WithEstimation(refined, all, match => Math.Abs(Sampson(refined.Matrix, match)) <= tolerancePx, tolerancePx, samples, seed)
            : throw new UserErrorException(
                $"Only {consistent} of {all.Length} matches agree on a fundamental matrix within {tolerancePx} px, and eight are needed; give better matches or a larger tolerance.");
    }

    public static double Sampson(in Matrix3x3 f, IdealMatch match)
    {
        var (u, v, x, y) = (match.Left.U, match.Left.V, match.Right.U, match.Right.V);
        var (a, b, c) = (f.M11 * u + f.M12 * v + f.M13, f.M21 * u + f.M22 * v + f.M23, f.M31 * u + f.M32 * v + f.M33);
        var (d, e) = (f.M11 * x + f.M21 * y + f.M31, f.M12 * x + f.M22 * y + f.M32);
        return (x * a + y * b + c) / Math.Sqrt(a * a + b * b + d * d + e * e);
    }

    // Centroid to the origin, mean distance to √2 (Hartley 1997), without which pixel coordinates spoil the equations.
    public static Matrix3x3 Conditioning(IEnumerable<IdealPixel> pixels)
    {
        IdealPixel[] all = [.. pixels];
        var (u, v) = (all.Average(pixel => pixel.U), all.Average(pixel => pixel.V));
        var distance = all.Average(pixel => Math.Sqrt((pixel.U - u) * (pixel.U - u) + (pixel.V - v) * (pixel.V - v)));
        var scale = distance > 0 ? Math.Sqrt(2) / distance : 1;
        return new(scale, 0, -scale * u, 0, scale, -scale * v, 0, 0, 1);
    }

    // The best few, for the best sample need not lead to the best matrix.
    private static (List<Estimate> Best, int Samples) BestSamples(IdealMatch[] all, double tolerancePx, int seed, double confidence)
    {
        var random = new Random(seed);
        var places = Enumerable.Range(0, all.Length).ToArray();
        var sample = new IdealMatch[SampleSize];
        var best = new PriorityQueue<Estimate, double>();
        var (least, needed, drawn) = (double.PositiveInfinity, (double)MostSamples, 0);
        for (; drawn < needed; drawn++)
        {
            for (var i = 0; i < SampleSize; i++)
            {
                var other = random.Next(i, places.Length);
                (places[i], places[other]) = (places[other], places[i]);
                sample[i] = all[places[i]];
            }

            if (EightPointsOf(sample) is not { } estimate)
            {
                continue;
            }

            var loss = Loss(estimate.Matrix, all, tolerancePx);
            if (best.Count < Refinements)
            {
                best.Enqueue(estimate, -loss);
            }
            else
            {
                best.EnqueueDequeue(estimate, -loss);
            }

            if (loss < least)
            {
                least = loss;
                needed = SamplesFor(Consistent(estimate.Matrix, all, tolerancePx).Length / (double)all.Length, confidence);
            }
        }

        return ([.. best.UnorderedItems.OrderByDescending(item => item.Priority).Select(item => item.Element)], drawn);
    }

    // Refined by the matches that agree, until they are the same: a better matrix may gain or lose one at the tolerance.
    private static Estimate Refined(Estimate estimate, IdealMatch[] all, double tolerancePx)
    {
        IdealMatch[] consensus = [];
        for (var round = 0; round < 10; round++)
        {
            var consistent = Consistent(estimate.Matrix, all, tolerancePx);
            if (consistent.Length < SampleSize || consistent.SequenceEqual(consensus))
            {
                break;
            }

            consensus = consistent;
            estimate = estimate with { Matrix = SampsonRefinement.Refine(estimate.Matrix, consensus) };
        }

        return estimate;
    }

    // So many that with the given probability one of them is free of outliers.
    private static double SamplesFor(double consistentShare, double confidence)
    {
        var spoilt = 1 - Math.Pow(consistentShare, SampleSize);
        return spoilt < 1 ? Math.Clamp(Math.Log(1 - confidence) / Math.Log(spoilt), FewestSamples, MostSamples) : MostSamples;
    }

    private static double Loss(Matrix3x3 matrix, IdealMatch[] matches, double tolerancePx)
    {
        var sum = 0.0;
        foreach (var match in matches)
        {
            var distance = Sampson(matrix, match);
            sum += distance * distance < tolerancePx * tolerancePx ? distance * distance : tolerancePx * tolerancePx;
        }

        return sum;
    }

    private static IdealMatch[] Consistent(Matrix3x3 matrix, IdealMatch[] matches, double tolerancePx) =>
        Array.FindAll(matches, match => Math.Abs(Sampson(matrix, match)) <= tolerancePx);

    private static Estimate? EightPointsOf(IdealMatch[] matches)
    {
        var left = Conditioning(matches.Select(match => match.Left));
        var right = Conditioning(matches.Select(match => match.Right));

        // Nine rows at least, so that the triangular factor is square; a row of zeros asks for nothing.
        var equations = Matrix<double>.Build.Dense(Math.Max(matches.Length, 9), 9);
        for (var i = 0; i < matches.Length; i++)
        {
            var (p, q) = (left * FundamentalMatrix.Homogeneous(matches[i].Left), right * FundamentalMatrix.Homogeneous(matches[i].Right));
            equations.SetRow(i, [q.X * p.X, q.X * p.Y, q.X, q.Y * p.X, q.Y * p.Y, q.Y, p.X, p.Y, 1]);
        }

        var svd = equations.QR(MathNet.Numerics.LinearAlgebra.Factorization.QRMethod.Thin).R.Svd();
        if (!(svd.S[7] > SmallestDeterminacy * svd.S[0]))
        {
            return null;
        }

        var solution = svd.VT.Row(8);
        var full = new Matrix3x3(
            solution[0], solution[1], solution[2], solution[3], solution[4], solution[5], solution[6], solution[7], solution[8]);
        var parts = full.ToMatrix().Svd();
        var rankTwo = full.ToMatrix() - parts.S[2] * parts.U.Column(2).OuterProduct(parts.VT.Row(2));
        return parts.S[1] > 1e-12 * parts.S[0]
            ? new(right.Transpose * Matrix3x3.From(rankTwo) * left, parts.S[2] / parts.S[1])
            : null;
    }

    private static FundamentalMatrix WithEstimation(
        Estimate estimate, IdealMatch[] matches, Func<IdealMatch, bool> isConsistent, double tolerancePx, int samples, int seed)
    {
        // The sign of a distance follows the sign of the matrix, which is only settled here.
        var matrix = FundamentalMatrix.Estimated(estimate.Matrix, estimate.RankTwoDeviation, null).Matrix;
        return FundamentalMatrix.Estimated(
            estimate.Matrix,
            estimate.RankTwoDeviation,
            new(
                [.. matches],
                [.. matches.Select(isConsistent)],
                [.. matches.Select(match => Sampson(matrix, match))],
                tolerancePx,
                samples,
                seed));
    }

    private static void Check(IReadOnlyList<IdealMatch> matches)
    {
        ArgumentNullException.ThrowIfNull(matches);
        if (matches.Count < SampleSize)
        {
            throw new UserErrorException($"A fundamental matrix takes at least eight matches, but {matches.Count} are given; give more.");
        }

        for (var i = 0; i < matches.Count; i++)
        {
            if (!double.IsFinite(matches[i].Left.U + matches[i].Left.V + matches[i].Right.U + matches[i].Right.V))
            {
                throw new UserErrorException($"Match {i} has a coordinate that is not a finite number; leave it out.");
            }
        }
    }

    private readonly record struct Estimate(Matrix3x3 Matrix, double RankTwoDeviation);
}
