using System.Text;
using OpenCvSharp;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Named matrices from OpenCV's file storage, on reading only.</summary>
internal sealed class MatrixStorage
{
    private readonly string path;
    private readonly Dictionary<string, (int Rows, int Columns, double[] Values)> matrices;

    private MatrixStorage(string path, Dictionary<string, (int Rows, int Columns, double[] Values)> matrices, Provenance provenance) =>
        (this.path, this.matrices, Provenance) = (path, matrices, provenance);

    /// <summary>Where the matrices came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>Whether a file's content looks like such a storage.</summary>
    public static bool IsOne(ReadOnlySpan<byte> content)
    {
        var start = Encoding.UTF8.GetString(content[..Math.Min(content.Length, 4096)]);
        return start.StartsWith("%YAML", StringComparison.Ordinal) || start.Contains("opencv-matrix", StringComparison.Ordinal) || start.Contains("<opencv_storage>", StringComparison.Ordinal);
    }

    /// <summary>Reads the matrices of the names given.</summary>
    /// <exception cref="UserErrorException">The file is missing or no such storage, or a matrix is missing or holds something that is not a finite number.</exception>
    public static MatrixStorage Read(string path, IReadOnlyList<string> names)
    {
        var content = PictureFile.ReadAll(path);
        OpenCvLibrary.Require();
        try
        {
            using var storage = new FileStorage(Encoding.UTF8.GetString(content), FileStorage.Modes.Read | FileStorage.Modes.Memory);
            return new(path, names.ToDictionary(name => name, name => Matrix(storage, name, path)), Provenance.OfContent(path, content));
        }
        catch (Exception fault) when (fault is OpenCVException or OpenCvSharpException or ArgumentException)
        {
            throw new UserErrorException($"'{path}' cannot be read as YAML, XML or JSON of OpenCV's file storage; correct the file or name another.", fault);
        }
    }

    /// <summary>The camera of a matrix and its lens's terms.</summary>
    public Camera Camera(string matrixName, string distortionName, PictureSize size)
    {
        var k = Matrix3x3(matrixName);
        if (!(Math.Abs(k.Determinant) > 0))
        {
            throw Wrong(matrixName, "is singular (its determinant is zero)");
        }

        if (k is not { M11: > 0, M22: > 0, M12: 0, M21: 0, M31: 0, M32: 0, M33: 1 })
        {
            throw Wrong(matrixName, "is not of the form [f, 0, c; 0, f, c; 0, 0, 1] with focal lengths above zero");
        }

        var d = matrices[distortionName].Values;
        if (d.Skip(8).Any(term => term != 0))
        {
            throw Wrong(distortionName, $"has {d.Length} terms, of which those after the eighth (thin prism and tilt) are not supported");
        }

        double Term(int index) => index < d.Length ? d[index] : 0;
        return new(new(k.M11, k.M22, k.M13, k.M23), size, new(Term(0), Term(1), Term(2), Term(3), Term(4), Term(5), Term(6), Term(7)));
    }

    /// <summary>A rotation from a matrix or a vector.</summary>
    public Matrix3x3 Rotation(string name)
    {
        if (matrices[name].Values.Length == 3)
        {
            return Geometry.Rotation.FromVector(Vector(name));
        }

        var rotation = Matrix3x3(name);
        return Geometry.Rotation.IsRotation(rotation) ? rotation : throw Wrong(name, "is not a rotation (its transpose is not its inverse, or it mirrors)");
    }

    /// <summary>A translation, not zero.</summary>
    public Vector3D Translation(string name) =>
        Vector(name) is var vector && vector.Norm > 0 ? vector : throw Wrong(name, "is zero, but two cameras at one place see no depth");

    private Vector3D Vector(string name)
    {
        var v = matrices[name].Values;
        return v.Length == 3 ? new(v[0], v[1], v[2]) : throw Wrong(name, $"has {v.Length} numbers instead of 3");
    }

    private Matrix3x3 Matrix3x3(string name)
    {
        var (rows, columns, m) = matrices[name];
        return rows == 3 && columns == 3
            ? new(m[0], m[1], m[2], m[3], m[4], m[5], m[6], m[7], m[8])
            : throw Wrong(name, $"is {rows} × {columns} instead of 3 × 3");
    }

    private UserErrorException Wrong(string name, string reason) => new($"In '{path}' the matrix '{name}' {reason}; correct it or calibrate again.");

    private static (int Rows, int Columns, double[] Values) Matrix(FileStorage storage, string name, string path)
    {
        using var node = storage[name];
        using var stored = node is null || node.Empty ? null : node.ReadMat();
        if (stored is null || stored.Empty())
        {
            throw new UserErrorException($"'{path}' holds no matrix '{name}'; state the names that the file uses (RigMatrixNames).");
        }

        using var numbers = new Mat();
        stored.ConvertTo(numbers, MatType.CV_64F);
        var values = numbers.AsSpan<double>().ToArray();
        return values.All(double.IsFinite)
            ? (numbers.Rows, numbers.Cols, values)
            : throw new UserErrorException($"In '{path}' the matrix '{name}' holds a number that is not finite; correct it or calibrate again.");
    }
}
