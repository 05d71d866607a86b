using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>The matrix, its rank and conditioning, both epipoles, and a pencil of corresponding lines in both views.</summary>
internal sealed class FundamentalMatrixRenderer : Renderer<FundamentalMatrix>
{
    private const int LineCount = 9;

    public override string Plain(FundamentalMatrix f) => Lines(
    [
        "Fundamental matrix, right line = F · left pixel (ideal pixels), Frobenius norm 1",
        .. Rows(f.Matrix).Select(row => "  " + string.Join("  ", row.Select(entry => Numbers.Scientific(entry, 5)))),
        $"rank {f.Rank}, left epipole {Where(f.EpipoleInLeft, f.LeftSize)}, right epipole {Where(f.EpipoleInRight, f.RightSize)}",
        f.Estimation is { } e ? $"estimated from {e.ConsistentCount} of {e.Matches.Length} matches, Sampson distance {Numbers.Text(e.SampsonRmsPx, 3, "px")} RMS" : null,
    ]);

    public override Card Draw(FundamentalMatrix f)
    {
        var card = new Card("Fundamental matrix", "x_rightᵀ · F · x_left = 0 in ideal pixels; Frobenius norm 1, entry of largest magnitude positive");
        card.Raw(MatrixDrawing.Of(f.Matrix));
        card.Facts(
            ("rank", $"{f.Rank} (singular values {string.Join(", ", f.SingularValues.Select(s => Numbers.Scientific(s, 3)))})"),
            ("conditioning: first over second singular value", Numbers.Significant(f.SingularValues[0] / f.SingularValues[1], 3)),
            ("left epipole", Where(f.EpipoleInLeft, f.LeftSize)),
            ("right epipole", Where(f.EpipoleInRight, f.RightSize)));
        if (f.RankTwoDeviation > 0)
        {
            card.Facts(("third over second singular value before rank two was enforced", Numbers.Scientific(f.RankTwoDeviation, 3)));
        }

        if (f.Estimation is { } estimation)
        {
            Estimated(card, estimation);
        }

        if (Frames(f) is var (left, right))
        {
            card.Row(Pencil(f, left, right));
            card.Caption("Lines of one colour belong to one plane through both camera centres. All lines of a view meet in its epipole.");
        }

        return card;
    }

    private static string Where(Epipole epipole, PictureSize? size) => epipole.Pixel is { } pixel
        ? $"({Numbers.Text(pixel.U, 1)}, {Numbers.Text(pixel.V, 1)}) px{(size is not { } s ? "" : s.Contains(pixel.U, pixel.V) ? ", inside the picture" : ", outside the picture")}"
        : $"at infinity, direction ({Numbers.Text(epipole.Direction.U, 4)}, {Numbers.Text(epipole.Direction.V, 4)})";

    private static IEnumerable<double[]> Rows(Matrix3x3 m) => [[m.M11, m.M12, m.M13], [m.M21, m.M22, m.M23], [m.M31, m.M32, m.M33]];

    private static void Estimated(Card card, FundamentalEstimation estimation)
    {
        card.Facts(
            ("matches used", $"{estimation.ConsistentCount} of {estimation.Matches.Length} ({Numbers.Percent(estimation.ConsistentShare)})"),
            ("Sampson distance of the used, RMS", Numbers.Text(estimation.SampsonRmsPx, 3, "px")),
            ("standard deviation of a coordinate", Numbers.Text(estimation.SigmaPx, 3, "px")),
            ("random samples, seed", $"{estimation.Samples}, {estimation.Seed}"));
        var reach = double.IsFinite(estimation.TolerancePx)
            ? 1.5 * estimation.TolerancePx
            : Math.Max(0.01, 1.1 * estimation.SampsonDistancesPx.Max(Math.Abs));
        card.Row(Histograms.Of("Sampson distance of each match", "px", "matches", [.. estimation.SampsonDistancesPx], -reach, reach));
    }

    // The pictures' sizes where the matrix knows them, else what the matches span.
    private static (PictureSize Left, PictureSize Right)? Frames(FundamentalMatrix f)
    {
        if (f.LeftSize is { } left && f.RightSize is { } right)
        {
            return (left, right);
        }

        return f.Estimation is { } estimation
            ? (Span(estimation.Matches.Select(match => match.Left)), Span(estimation.Matches.Select(match => match.Right)))
            : null;

        static PictureSize Span(IEnumerable<IdealPixel> pixels) =>
            new((int)Math.Ceiling(pixels.Max(p => p.U)) + 1, (int)Math.Ceiling(pixels.Max(p => p.V)) + 1);
    }

    private static IEnumerable<Svg> Pencil(FundamentalMatrix f, PictureSize leftSize, PictureSize rightSize)
    {
        var left = new PictureCanvas("Left view", leftSize, null, 400);
        var right = new PictureCanvas("Right view", rightSize, null, 400);
        foreach (var (i, point) in Across(f, leftSize).Index())
        {
            var colour = Ink.Series[i % Ink.Series.Count];
            var inRight = f.LineInRight(point);
            Line(right, inRight, rightSize, colour);
            Line(left, f.LineInLeft(inRight.Nearest(new(rightSize.Width / 2.0, rightSize.Height / 2.0))), leftSize, colour);
            left.Dot(point.U, point.V, colour, 3.5);
        }

        foreach (var (canvas, epipole, size) in new[] { (left, f.EpipoleInLeft, leftSize), (right, f.EpipoleInRight, rightSize) })
        {
            if (epipole.Pixel is { } pixel && size.Contains(pixel.U, pixel.V))
            {
                canvas.Cross(pixel.U, pixel.V, Ink.Overlay, 9).Label(pixel.U, pixel.V, "epipole", dx: 10, dy: 4);
            }
        }

        return [left.ToSvg(), right.ToSvg()];
    }

    // Points along a line across the pencil, so that the lines spread over the picture.
    private static IEnumerable<IdealPixel> Across(FundamentalMatrix f, PictureSize size)
    {
        var middle = new IdealPixel((size.Width - 1) / 2.0, (size.Height - 1) / 2.0);
        if (f.EpipoleInLeft.Pixel is { } inside && size.Contains(inside.U, inside.V))
        {
            var radius = Math.Min(size.Width, size.Height) / 4.0;
            return Enumerable.Range(0, LineCount).Select(i => i * Math.PI / LineCount + 0.1).Select(a => new IdealPixel(inside.U + radius * Math.Cos(a), inside.V + radius * Math.Sin(a)));
        }

        var along = f.LineInLeft(f.LineInRight(middle).Nearest(middle));
        var reach = Math.Abs(along.A) * size.Width + Math.Abs(along.B) * size.Height;
        return Enumerable.Range(0, LineCount)
            .Select(i => ((i + 0.5) / LineCount - 0.5) * reach)
            .Select(shift => new IdealPixel(middle.U + shift * along.A, middle.V + shift * along.B))
            .Where(point => size.Contains(point.U, point.V));
    }

    private static void Line(PictureCanvas canvas, EpipolarLine line, PictureSize size, string colour)
    {
        if (line.ClippedTo(size) is var (from, to))
        {
            canvas.Line(from.U, from.V, to.U, to.V, new(colour, 1.4));
        }
    }
}
