using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>A plane through a point, with a unit normal towards the camera.</summary>
internal readonly record struct Plane(Vector3D Point, Vector3D Normal)
{
    /// <summary>The weighted orthogonal least-squares plane: through the weighted mean, normal to the direction of least scatter.</summary>
    /// <remarks>The eigenvectors of the scatter matrix are the right singular vectors of the centred points (Golub and Van Loan, total least squares).</remarks>
    public static Plane To(IReadOnlyList<Vector3D> points, Func<int, double> weight)
    {
        var (mean, total) = (default(Vector3D), 0.0);
        for (var i = 0; i < points.Count; i++)
        {
            mean += weight(i) * points[i];
            total += weight(i);
        }

        mean /= total;
        var (axes, _) = Scatter(points, weight, mean, total);
        var normal = new Vector3D(axes[0, 0], axes[1, 0], axes[2, 0]);
        return new(mean, normal.Dot(mean) > 0 ? -normal : normal);
    }

    /// <summary>Demands points that fix a plane.</summary>
    /// <exception cref="UserErrorException">They lie on a line or at one place.</exception>
    public static void RequireSpread(IReadOnlyList<Vector3D> points)
    {
        var mean = points.Aggregate(default(Vector3D), (sum, point) => sum + point) / points.Count;
        var (_, spread) = Scatter(points, _ => 1, mean, points.Count);
        if (!(spread[1] > 1e-12 * spread[2]))
        {
            throw new UserErrorException("The points lie on a line or at one place, so no plane goes through them; select a wider region.");
        }
    }

    /// <summary>Signed height of a point towards the camera.</summary>
    public double Height(Vector3D point) => Normal.Dot(point - Point);

    /// <summary>A direction laid into the plane, of length one; nothing where it stands within 6° of upright on it.</summary>
    public Vector3D? InPlane(Vector3D direction)
    {
        var along = direction.Normalized;
        var laid = along - along.Dot(Normal) * Normal;
        return laid.Norm > 0.1 ? laid.Normalized : null;
    }

    /// <summary>The principal directions of points in ascending order of scatter, as columns, and their variances.</summary>
    public static (Matrix<double> Axes, double[] Spread) Scatter(IReadOnlyList<Vector3D> points, Func<int, double> weight, Vector3D mean, double total)
    {
        var (xx, xy, xz, yy, yz, zz) = (0.0, 0.0, 0.0, 0.0, 0.0, 0.0);
        for (var i = 0; i < points.Count; i++)
        {
            var (p, w) = (points[i] - mean, weight(i));
            (xx, xy, xz) = (xx + w * p.X * p.X, xy + w * p.X * p.Y, xz + w * p.X * p.Z);
            (yy, yz, zz) = (yy + w * p.Y * p.Y, yz + w * p.Y * p.Z, zz + w * p.Z * p.Z);
        }

        var scatter = Matrix<double>.Build.DenseOfRowMajor(3, 3, [xx, xy, xz, xy, yy, yz, xz, yz, zz]) / total;
        var evd = scatter.Evd(Symmetricity.Symmetric);
        return (evd.EigenVectors, [.. evd.EigenValues.Select(value => value.Real)]);
    }
}
