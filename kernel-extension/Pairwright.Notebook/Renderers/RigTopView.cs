using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A rig seen from above: both fields of view in the plane of the left camera's X and Z axes, what both see, and what is too near.</summary>
internal sealed class RigTopView
{
    private readonly (double X, double Z) leftCentre = (0, 0);
    private readonly (double X, double Z) rightCentre;
    private readonly (double X, double Z)[] leftEdges;
    private readonly (double X, double Z)[] rightEdges;

    public RigTopView(Rig rig)
    {
        var toLeft = rig.RightFromLeft.Inverse;
        rightCentre = (toLeft.Translation.X, toLeft.Translation.Z);
        leftEdges = Edges(rig.Left, Matrix3x3.Identity);
        rightEdges = Edges(rig.Right, toLeft.Rotation);
        var first = Shared(1e7).Select(p => p.Z).DefaultIfEmpty(double.NaN).Min();
        NearestSharedMm = first;
        ReachMm = Round(Math.Max(double.IsNaN(first) ? 0 : 5 * first, 12 * rig.BaselineMm));
    }

    /// <summary>The depth Z of the nearest point in this plane that both cameras see; NaN where they share no view.</summary>
    public double NearestSharedMm { get; }

    /// <summary>How far the drawing reaches, in millimetres.</summary>
    public double ReachMm { get; }

    /// <summary>The width of the shared view at a depth, in millimetres; NaN where there is none.</summary>
    public double SharedWidthMm(double depth)
    {
        var (left, right) = (Interval(leftCentre, leftEdges, depth), Interval(rightCentre, rightEdges, depth));
        var width = Math.Min(left.To, right.To) - Math.Max(left.From, right.From);
        return width > 0 ? width : double.NaN;
    }

    public Svg ToSvg()
    {
        var left = Wedge(leftCentre, leftEdges, ReachMm);
        var right = Wedge(rightCentre, rightEdges, ReachMm);
        var shared = Shared(ReachMm);
        var xs = left.Concat(right).Select(p => p.X).ToArray();
        var chart = Chart.Isometric(
            "Seen from above",
            new("X, mm (left camera's frame)", xs.Min(), xs.Max()),
            new("Z, mm", -0.06 * ReachMm, ReachMm),
            460,
            400);
        chart.Polygon(left, Ink.Left, 0.10, new(Ink.Left, 1, "4 3")).Polygon(right, Ink.Right, 0.10, new(Ink.Right, 1, "4 3"));
        if (shared.Count > 2)
        {
            chart.Polygon(shared, "#2b7a4b", 0.28, new("#2b7a4b", 1.5), "seen by both");
            chart.MarkY(NearestSharedMm, new(Ink.NotMet, 1, "2 3"), "nearest point seen by both");
        }

        chart.Dots([leftCentre], Ink.Left, 5, 1, "left camera").Dots([rightCentre], Ink.Right, 5, 1, "right camera");
        return chart.ToSvg();
    }

    private static double Round(double reach)
    {
        var step = Ticks.Step(reach, 4);
        return Math.Ceiling(reach / step) * step;
    }

    // The left and the right edge of the picture at the row of the principal point, as directions in the left camera's frame.
    private static (double X, double Z)[] Edges(Camera camera, Matrix3x3 toLeft) =>
    [
        .. new[] { -0.5, camera.Size.Width - 0.5 }.Select(u =>
        {
            var ideal = camera.TryUndistort(new(u, camera.Matrix.CentreV)) ?? new IdealPixel(u, camera.Matrix.CentreV);
            var direction = toLeft * camera.Ray(ideal);
            return (direction.X, direction.Z);
        }),
    ];

    private static (double From, double To) Interval((double X, double Z) centre, (double X, double Z)[] edges, double depth)
    {
        double At((double X, double Z) edge) => centre.X + edge.X / edge.Z * (depth - centre.Z);
        return (At(edges[0]), At(edges[1]));
    }

    private static IReadOnlyList<(double X, double Z)> Wedge((double X, double Z) centre, (double X, double Z)[] edges, double reach)
    {
        var (from, to) = Interval(centre, edges, reach);
        return [centre, (from, reach), (to, reach)];
    }

    // The left wedge cut by both edges of the right one (Sutherland and Hodgman 1974).
    private IReadOnlyList<(double X, double Z)> Shared(double reach)
    {
        var area = Wedge(leftCentre, leftEdges, reach);
        area = Cut(area, p => Side(p, rightEdges[0]));
        return Cut(area, p => -Side(p, rightEdges[1]));

        // Positive to the right of an edge of the right camera.
        double Side((double X, double Z) p, (double X, double Z) edge) => (p.X - rightCentre.X) * edge.Z - (p.Z - rightCentre.Z) * edge.X;
    }

    private static IReadOnlyList<(double X, double Z)> Cut(IReadOnlyList<(double X, double Z)> area, Func<(double X, double Z), double> inside)
    {
        var cut = new List<(double X, double Z)>();
        for (var i = 0; i < area.Count; i++)
        {
            var (a, b) = (area[i], area[(i + 1) % area.Count]);
            var (atA, atB) = (inside(a), inside(b));
            if (atA >= 0)
            {
                cut.Add(a);
            }

            if (atA * atB < 0)
            {
                var share = atA / (atA - atB);
                cut.Add((a.X + share * (b.X - a.X), a.Z + share * (b.Z - a.Z)));
            }
        }

        return cut;
    }
}
