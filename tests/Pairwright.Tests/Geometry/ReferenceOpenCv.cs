using OpenCvSharp;
using Pairwright.Geometry;

namespace Pairwright.Tests.Geometry;

/// <summary>The outside reference: OpenCV 4.13 through OpenCvSharp, in double precision where it offers that.</summary>
internal static class ReferenceOpenCv
{
    public static RawPixel[] Project(Camera camera, Vector3D[] points)
    {
        using var objects = Points3(points);
        using var none = new Mat(3, 1, MatType.CV_64FC1, Scalar.All(0));
        using var matrix = Matrix(camera.Matrix.Matrix);
        using var lens = Lens(camera);
        using var result = new Mat();
        Cv2.ProjectPoints(objects, none, none, matrix, lens, result);
        return [.. Pairs(result).Select(pair => new RawPixel(pair.X, pair.Y))];
    }

    public static IdealPixel[] Undistort(Camera camera, RawPixel[] pixels)
    {
        using var raw = Points2([.. pixels.Select(pixel => (pixel.U, pixel.V))]);
        using var matrix = Matrix(camera.Matrix.Matrix);
        using var lens = Lens(camera);
        using var none = new Mat();
        using var result = new Mat();

        // Its fixed-point iteration stops after five rounds unless told otherwise.
        Cv2.UndistortPointsIter(raw, result, matrix, lens, none, matrix, new TermCriteria(CriteriaTypes.Count | CriteriaTypes.Eps, 500, 1e-13));
        return [.. Pairs(result).Select(pair => new IdealPixel(pair.X, pair.Y))];
    }

    public static Vector3D[] Triangulate(Rig rig, IdealMatch[] matches)
    {
        var (left, right) = (rig.Left.Matrix.Matrix, rig.Right.Matrix.Matrix);
        var (rotation, t) = (right * rig.RightFromLeft.Rotation, right * rig.RightFromLeft.Translation);
        using var projectionLeft = Rows(3, 4, [left.M11, left.M12, left.M13, 0, left.M21, left.M22, left.M23, 0, left.M31, left.M32, left.M33, 0]);
        using var projectionRight = Rows(
            3,
            4,
            [
                rotation.M11, rotation.M12, rotation.M13, t.X, rotation.M21, rotation.M22, rotation.M23, t.Y,
                rotation.M31, rotation.M32, rotation.M33, t.Z,
            ]);
        using var leftPixels = Rows(2, matches.Length, [.. matches.Select(m => m.Left.U), .. matches.Select(m => m.Left.V)]);
        using var rightPixels = Rows(2, matches.Length, [.. matches.Select(m => m.Right.U), .. matches.Select(m => m.Right.V)]);
        using var result = new Mat();
        Cv2.TriangulatePoints(projectionLeft, projectionRight, leftPixels, rightPixels, result);
        return
        [
            .. Enumerable.Range(0, matches.Length).Select(i =>
                new Vector3D(result.At<double>(0, i), result.At<double>(1, i), result.At<double>(2, i)) / result.At<double>(3, i)),
        ];
    }

    /// <summary>Lines of points, (a, b, c) with a² + b² = 1; it works in the precision of its input, and stores single precision for single input.</summary>
    public static Vector3D[] Lines(Matrix3x3 fundamental, IdealPixel[] pixels, View of)
    {
        using var points = Points2([.. pixels.Select(pixel => (pixel.U, pixel.V))]);
        using var matrix = Matrix(fundamental);
        using var result = new Mat();
        Cv2.ComputeCorrespondEpilines(points, of == View.Left ? 1 : 2, matrix, result);
        using var wide = new Mat();
        result.ConvertTo(wide, MatType.CV_64FC3);
        return
        [
            .. Enumerable.Range(0, pixels.Length).Select(i =>
            {
                var line = wide.At<Vec3d>(i);
                return new Vector3D(line.Item0, line.Item1, line.Item2);
            }),
        ];
    }

    public static Matrix3x3 Fundamental(IReadOnlyList<IdealMatch> matches, FundamentalMatMethods method, double tolerancePx, out bool[] used)
    {
        using var left = Points2([.. matches.Select(m => (m.Left.U, m.Left.V))]);
        using var right = Points2([.. matches.Select(m => (m.Right.U, m.Right.V))]);
        using var mask = new Mat();
        using var result = Cv2.FindFundamentalMat(left, right, method, tolerancePx, 0.999, mask);
        used = [.. Enumerable.Range(0, matches.Count).Select(i => mask.Empty() || mask.At<byte>(i) != 0)];
        return new(
            result.At<double>(0, 0), result.At<double>(0, 1), result.At<double>(0, 2),
            result.At<double>(1, 0), result.At<double>(1, 1), result.At<double>(1, 2),
            result.At<double>(2, 0), result.At<double>(2, 1), result.At<double>(2, 2));
    }

    private static Mat Matrix(Matrix3x3 m) => Rows(3, 3, [m.M11, m.M12, m.M13, m.M21, m.M22, m.M23, m.M31, m.M32, m.M33]);

    private static Mat Lens(Camera camera)
    {
        var d = camera.Distortion;
        return Rows(8, 1, [d.K1, d.K2, d.P1, d.P2, d.K3, d.K4, d.K5, d.K6]);
    }

    private static Mat Rows(int rows, int columns, double[] values)
    {
        var matrix = new Mat(rows, columns, MatType.CV_64FC1);
        for (var i = 0; i < values.Length; i++)
        {
            matrix.Set(i / columns, i % columns, values[i]);
        }

        return matrix;
    }

    private static Mat Points2((double X, double Y)[] points)
    {
        var matrix = new Mat(points.Length, 1, MatType.CV_64FC2);
        for (var i = 0; i < points.Length; i++)
        {
            matrix.Set(i, new Vec2d(points[i].X, points[i].Y));
        }

        return matrix;
    }

    private static Mat Points3(Vector3D[] points)
    {
        var matrix = new Mat(points.Length, 1, MatType.CV_64FC3);
        for (var i = 0; i < points.Length; i++)
        {
            matrix.Set(i, new Vec3d(points[i].X, points[i].Y, points[i].Z));
        }

        return matrix;
    }

    private static IEnumerable<(double X, double Y)> Pairs(Mat points) =>
        Enumerable.Range(0, (int)points.Total()).Select(i =>
        {
            var pair = points.At<Vec2d>(i);
            return (pair.Item0, pair.Item1);
        });
}
