using System.Collections.Immutable;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>h = c₀ + c₁·u + c₂·v + c₃·u² + c₄·u·v + c₅·v² over a plane, u and v in the plane.</summary>
internal sealed record Surface
{
    private readonly double scaleU;
    private readonly double scaleV;

    private Surface(Plane plane, Vector3D u, double scaleU, double scaleV) =>
        (Plane, U, V, this.scaleU, this.scaleV) = (plane, u, plane.Normal.Cross(u), scaleU, scaleV);

    /// <summary>The plane that heights are counted from.</summary>
    public Plane Plane { get; }

    /// <summary>The direction across, of length one.</summary>
    public Vector3D U { get; }

    /// <summary>The direction along, of length one.</summary>
    public Vector3D V { get; }

    /// <summary>c₀ to c₅ for lengths in millimetres.</summary>
    public ImmutableArray<double> Coefficients { get; private init; }

    /// <summary>How much wider the points come out than with the rig as calibrated.</summary>
    public double AcrossScale { get; private init; } = 1;

    /// <summary>How much longer the points come out than with the rig as calibrated.</summary>
    public double AlongScale { get; private init; } = 1;

    /// <summary>A frame for points, without coefficients yet.</summary>
    public static Surface Frame(Plane plane, Vector3D across, IReadOnlyList<Vector3D> points)
    {
        var frame = new Surface(plane, plane.InPlane(across)!.Value, 1, 1);
        var (spreadU, spreadV) = frame.SpreadOf(points);
        return spreadU > 0 && spreadV > 0
            ? new(plane, frame.U, spreadU, spreadV)
            : throw new UserErrorException("The points lie on a line, so no surface goes through them; select a wider region.");
    }

    /// <summary>Turns the covariance of the scaled coefficients into that of c₀ to c₅.</summary>
    public static Matrix<double> Unscaled(Matrix<double> covariance, Surface surface)
    {
        var scales = surface.TermScales();
        return Matrix<double>.Build.Dense(scales.Length, scales.Length, (i, j) => covariance[i, j] / (scales[i] * scales[j]));
    }

    /// <summary>The surface with coefficients of the scaled terms of <see cref="Rows"/>.</summary>
    public Surface With(double[] scaledCoefficients) => this with { Coefficients = [.. scaledCoefficients.Zip(TermScales(), (c, scale) => c / scale)] };

    /// <summary>The surface with one coefficient moved.</summary>
    public Surface Moved(int term, double by) => this with { Coefficients = Coefficients.SetItem(term, Coefficients[term] + by) };

    /// <summary>The coefficients of the same surface for u and v that are turned in the plane, from u towards v, by an angle in radians.</summary>
    public Surface Turned(double angle)
    {
        var ((s, c), k) = (Math.SinCos(angle), Coefficients);
        return this with
        {
            Coefficients =
            [
                k[0], k[1] * c + k[2] * s, k[2] * c - k[1] * s,
                k[3] * c * c + k[4] * c * s + k[5] * s * s,
                2 * (k[5] - k[3]) * c * s + k[4] * (c * c - s * s),
                k[3] * s * s - k[4] * c * s + k[5] * c * c,
            ],
        };
    }

    /// <summary>The surface with its scales against the spread of the same points with the rig as calibrated.</summary>
    public Surface RelativeTo((double U, double V) reference, IReadOnlyList<Vector3D> points)
    {
        var (u, v) = SpreadOf(points);
        return this with { AcrossScale = u / reference.U, AlongScale = v / reference.V };
    }

    /// <summary>The height at a place in the plane.</summary>
    public double Height(double u, double v)
    {
        var c = Coefficients;
        return c[0] + c[1] * u + c[2] * v + c[3] * u * u + c[4] * u * v + c[5] * v * v;
    }

    /// <summary>Where a point lies in the plane.</summary>
    public (double U, double V) Place(Vector3D point) => (U.Dot(point - Plane.Point), V.Dot(point - Plane.Point));

    /// <summary>The terms at each point, in units of the points' spread so that the equations are well conditioned.</summary>
    public double[] Rows(IReadOnlyList<Vector3D> points)
    {
        var rows = new double[6 * points.Count];
        for (var i = 0; i < points.Count; i++)
        {
            var (u, v) = Place(points[i]);
            (u, v) = (u / scaleU, v / scaleV);
            new double[] { 1, u, v, u * u, u * v, v * v }.CopyTo(rows, 6 * i);
        }

        return rows;
    }

    /// <summary>The standard deviations of the points in the plane.</summary>
    public (double U, double V) SpreadOf(IReadOnlyList<Vector3D> points)
    {
        var (u, v, uu, vv) = (0.0, 0.0, 0.0, 0.0);
        foreach (var point in points)
        {
            var place = Place(point);
            (u, v, uu, vv) = (u + place.U, v + place.V, uu + place.U * place.U, vv + place.V * place.V);
        }

        var n = points.Count;
        return (Math.Sqrt(Math.Max(0, uu / n - u * u / n / n)), Math.Sqrt(Math.Max(0, vv / n - v * v / n / n)));
    }

    private double[] TermScales() => [1, scaleU, scaleV, scaleU * scaleU, scaleU * scaleV, scaleV * scaleV];
}
