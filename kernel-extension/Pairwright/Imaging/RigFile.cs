using System.Globalization;
using System.Text;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Writes and reads rigs: YAML with units and covariance, every number exact to the last bit.</summary>
/// <remarks>
/// <para>
/// Entries: <c>kind: pairwright-rig</c>, <c>version: 1</c>, <c>lengths</c> (mm, cm, m or inch); <c>left</c> and <c>right</c> with
/// <c>picture</c> (width and height in pixels), <c>camera-matrix</c> (three rows, pixels) and <c>distortion</c> (named terms, zero where left
/// out); <c>right-from-left</c> with <c>rotation</c> (three rows) or <c>rotation-vector</c> (radians), and <c>translation</c>; optionally
/// <c>covariance</c> with <c>parameters</c> (names of <see cref="RigParameters"/>, those held fixed left out) and <c>lower-triangle</c>
/// (row after row; angles in radians, lengths in the file's unit).
/// </para>
/// <para>Matrices that OpenCV's file storage wrote are read by <see cref="ReadMatrices"/>.</para>
/// </remarks>
public static class RigFile
{
    private const string Kind = "pairwright-rig";
    private const int Version = 1;
    private static readonly string[] Terms = ["k1", "k2", "p1", "p2", "k3", "k4", "k5", "k6"];

    /// <summary>Writes a rig.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <param name="lengths">The unit of lengths in the file; only millimetres come back exact to the last bit.</param>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public static void Write(Rig rig, string path, LengthUnit lengths = LengthUnit.Millimetre)
    {
        ArgumentNullException.ThrowIfNull(rig);
        var unit = YamlHeader.MillimetresPer(lengths);
        var text = new StringBuilder(YamlHeader.Write(
            Kind, Version, lengths, "A stereo rig: x_right = rotation * x_left + translation; pixels count from the centre of the top-left one."));
        foreach (var view in Enum.GetValues<View>())
        {
            var camera = rig[view];
            text.Append(CultureInfo.InvariantCulture, $"{view.ToString().ToLowerInvariant()}:\n");
            text.Append(CultureInfo.InvariantCulture, $"  picture: [{camera.Size.Width}, {camera.Size.Height}]  # px\n");
            text.Append("  camera-matrix:  # px\n").Append(Rows(camera.Matrix.Matrix));
            text.Append(CultureInfo.InvariantCulture, $"  distortion: {{{string.Join(", ", TermsOf(camera.Distortion).Select((term, i) => $"{Terms[i]}: {Exact(term)}"))}}}\n");
        }

        var shift = rig.RightFromLeft.Translation / unit;
        text.Append("right-from-left:\n  rotation:\n").Append(Rows(rig.RightFromLeft.Rotation));
        text.Append(CultureInfo.InvariantCulture, $"  translation: [{Exact(shift.X)}, {Exact(shift.Y)}, {Exact(shift.Z)}]\n");
        if (rig.Covariance is { } covariance)
        {
            var free = Enumerable.Range(0, RigParameters.Count).Where(i => covariance[i, i] > 0).ToArray();
            text.Append(CultureInfo.InvariantCulture, $"covariance:\n  parameters: [{string.Join(", ", free.Select(i => RigParameters.Names[i]))}]\n");
            text.Append(free.Length == 0 ? "  lower-triangle: []\n" : "  lower-triangle:\n");
            for (var row = 0; row < free.Length; row++)
            {
                var entries = free.Take(row + 1).Select(column => Exact(covariance[free[row], column] / (Scale(free[row], unit) * Scale(column, unit))));
                text.Append(CultureInfo.InvariantCulture, $"    - [{string.Join(", ", entries)}]\n");
            }
        }

        AtomicFile.WriteText(path, text.ToString());
    }

    /// <summary>Reads a rig that <see cref="Write"/> wrote or a person typed.</summary>
    /// <param name="path">The file.</param>
    /// <exception cref="UserErrorException">The file is missing, of another kind or newer, or an entry is wrong; the sentence names file, line and entry.</exception>
    public static Rig Read(string path)
    {
        var content = PictureFile.ReadAll(path);
        if (MatrixStorage.IsOne(content))
        {
            throw new UserErrorException($"'{path}' holds matrices in OpenCV's file storage, which says nothing of picture sizes; read it with RigFile.ReadMatrices and state them.");
        }

        var file = YamlEntry.Parse(content, path).WithOnly("kind", "version", "lengths", "left", "right", "right-from-left", "covariance");
        var unit = YamlHeader.Read(file, Kind, Version);
        var left = ReadCamera(file.Required("left"));
        var right = ReadCamera(file.Required("right"));
        var pose = ReadPose(file.Required("right-from-left"), unit);
        var entry = file.Optional("covariance");
        var covariance = entry is null ? null : ReadCovariance(entry, unit);
        try
        {
            return new(left, right, pose, covariance, Provenance.OfContent(path, content));
        }
        catch (UserErrorException fault)
        {
            throw (entry ?? file).Wrong($"is refused: {fault.Message.TrimEnd('.')}");
        }
    }

    /// <summary>Reads a rig from matrices that OpenCV's file storage wrote as YAML, XML or JSON.</summary>
    /// <param name="path">The file with the camera matrices, and with the pose unless <paramref name="posePath"/> is given.</param>
    /// <param name="leftSize">The size of the left camera's pictures, which such files do not state.</param>
    /// <param name="rightSize">The size of the right camera's pictures; that of the left when left out.</param>
    /// <param name="posePath">The file with rotation and translation where it is another one.</param>
    /// <param name="names">The names of the matrices.</param>
    /// <param name="lengths">The unit of the translation: that of the board's squares in the calibration.</param>
    /// <exception cref="UserErrorException">A file or a matrix is missing or wrong; the sentence names both.</exception>
    public static Rig ReadMatrices(
        string path, PictureSize leftSize, PictureSize? rightSize = null, string? posePath = null, RigMatrixNames? names = null, LengthUnit lengths = LengthUnit.Millimetre)
    {
        names ??= new();
        var cameras = MatrixStorage.Read(path, [names.LeftCameraMatrix, names.LeftDistortion, names.RightCameraMatrix, names.RightDistortion]);
        var pose = MatrixStorage.Read(posePath ?? path, [names.Rotation, names.Translation]);
        var unit = YamlHeader.MillimetresPer(lengths);
        var left = cameras.Camera(names.LeftCameraMatrix, names.LeftDistortion, leftSize);
        var right = cameras.Camera(names.RightCameraMatrix, names.RightDistortion, rightSize ?? leftSize);
        var provenance = posePath is null ? cameras.Provenance : cameras.Provenance.With(pose.Provenance);
        return new(left, right, new(pose.Rotation(names.Rotation), unit * pose.Translation(names.Translation)), provenance: provenance);
    }

    private static Camera ReadCamera(YamlEntry entry)
    {
        entry.WithOnly("picture", "camera-matrix", "distortion");
        var size = entry.Required("picture").Parts(2);
        var matrixEntry = entry.Required("camera-matrix");
        var k = ReadMatrix(matrixEntry);
        if (!(Math.Abs(k.Determinant) > 0))
        {
            throw matrixEntry.Wrong("is singular (its determinant is zero); correct it or calibrate again");
        }

        if (k is not { M11: > 0, M22: > 0, M12: 0, M21: 0, M31: 0, M32: 0, M33: 1 })
        {
            throw matrixEntry.Wrong("is not of the form [f, 0, c], [0, f, c], [0, 0, 1] with focal lengths above zero; correct it");
        }

        var terms = entry.Optional("distortion")?.WithOnly(Terms);
        var d = Terms.Select(term => terms?.Optional(term)?.Number() ?? 0).ToArray();
        return new(new(k.M11, k.M22, k.M13, k.M23), new(size[0].Count(), size[1].Count()), new(d[0], d[1], d[2], d[3], d[4], d[5], d[6], d[7]));
    }

    private static Pose ReadPose(YamlEntry entry, double unit)
    {
        entry.WithOnly("rotation", "rotation-vector", "translation");
        Matrix3x3 rotation;
        if (entry.Optional("rotation-vector") is { } vectorEntry)
        {
            if (entry.Optional("rotation") is not null)
            {
                throw entry.Wrong("has both 'rotation' and 'rotation-vector'; keep one");
            }

            var vector = vectorEntry.Numbers(3);
            rotation = Rotation.FromVector(new(vector[0], vector[1], vector[2]));
        }
        else
        {
            var matrixEntry = entry.Required("rotation");
            rotation = ReadMatrix(matrixEntry);
            if (!Rotation.IsRotation(rotation))
            {
                throw matrixEntry.Wrong("is not a rotation (its transpose is not its inverse, or it mirrors); correct it or calibrate again");
            }
        }

        var translationEntry = entry.Required("translation");
        var t = translationEntry.Numbers(3);
        var translation = new Vector3D(unit * t[0], unit * t[1], unit * t[2]);
        return translation.Norm > 0
            ? new(rotation, translation)
            : throw translationEntry.Wrong("is zero, but two cameras at one place see no depth; correct it");
    }

    private static Matrix<double> ReadCovariance(YamlEntry entry, double unit)
    {
        entry.WithOnly("parameters", "lower-triangle");
        var parameters = entry.Required("parameters").Parts();
        var places = new int[parameters.Count];
        for (var i = 0; i < places.Length; i++)
        {
            places[i] = RigParameters.Names.IndexOf(parameters[i].Text());
            if (places[i] < 0 || Array.IndexOf(places, places[i]) < i)
            {
                throw parameters[i].Wrong($"is '{parameters[i].Text()}', which names no parameter of a rig or one that was named before; correct it");
            }
        }

        var covariance = Matrix<double>.Build.Dense(RigParameters.Count, RigParameters.Count);
        var rows = entry.Required("lower-triangle").Parts(places.Length);
        for (var row = 0; row < places.Length; row++)
        {
            var numbers = rows[row].Numbers(row + 1);
            if (numbers[row] < 0)
            {
                throw rows[row].Wrong($"ends with the variance {Exact(numbers[row])}, which is below zero; correct it or calibrate again");
            }

            for (var column = 0; column <= row; column++)
            {
                var value = numbers[column] * (Scale(places[row], unit) * Scale(places[column], unit));
                covariance[places[row], places[column]] = value;
                covariance[places[column], places[row]] = value;
            }
        }

        return covariance;
    }

    private static Matrix3x3 ReadMatrix(YamlEntry entry)
    {
        var rows = entry.Parts(3).Select(row => row.Numbers(3)).Select(row => new Vector3D(row[0], row[1], row[2])).ToArray();
        return Matrix3x3.FromRows(rows[0], rows[1], rows[2]);
    }

    private static double[] TermsOf(Distortion d) => [d.K1, d.K2, d.P1, d.P2, d.K3, d.K4, d.K5, d.K6];

    private static double Scale(int parameter, double unit) => parameter >= RigParameters.TranslationStart ? unit : 1;

    private static string Rows(Matrix3x3 m) =>
        string.Concat(new[] { m.Row1, m.Row2, m.Row3 }.Select(row => $"    - [{Exact(row.X)}, {Exact(row.Y)}, {Exact(row.Z)}]\n"));

    // The shortest text that reads back as the same number.
    private static string Exact(double number) => number.ToString("R", CultureInfo.InvariantCulture);
}
