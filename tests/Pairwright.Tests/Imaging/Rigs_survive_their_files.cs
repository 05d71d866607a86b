using MathNet.Numerics.LinearAlgebra;
using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Rigs_survive_their_files
{
    [Fact]
    public void A_rig_comes_back_exact_to_the_last_bit_with_its_covariance()
    {
        using var folder = new TestFolder();
        for (var seed = 0; seed < 20; seed++)
        {
            var rig = Random(seed, withCovariance: seed % 2 == 0);
            RigFile.Write(rig, folder.Path("rig.yaml"));

            var back = RigFile.Read(folder.Path("rig.yaml"));

            Assert.Equal(rig.Left, back.Left);
            Assert.Equal(rig.Right, back.Right);
            Assert.Equal(rig.RightFromLeft, back.RightFromLeft);
            Assert.Equal(rig.Covariance?.ToRowMajorArray(), back.Covariance?.ToRowMajorArray());
            Assert.Equal(Provenance.OfFile(folder.Path("rig.yaml")), back.Provenance);
        }
    }

    [Fact]
    public void What_is_written_does_not_depend_on_the_machine()
    {
        using var folder = new TestFolder();
        RigFile.Write(RigFile.Read(folder.Write("rig.yaml", Typed())), folder.Path("one.yaml"));
        RigFile.Write(RigFile.Read(folder.Path("one.yaml")), folder.Path("two.yaml"));

        Assert.Equal(File.ReadAllText(folder.Path("one.yaml")), File.ReadAllText(folder.Path("two.yaml")));
    }

    [Theory]
    [InlineData(LengthUnit.Centimetre, 10)]
    [InlineData(LengthUnit.Metre, 1000)]
    [InlineData(LengthUnit.Inch, 25.4)]
    public void Lengths_in_another_unit_are_converted_and_their_covariance_with_them(LengthUnit unit, double millimetres)
    {
        using var folder = new TestFolder();
        var rig = Random(3, withCovariance: true);
        RigFile.Write(rig, folder.Path("rig.yaml"), unit);

        var back = RigFile.Read(folder.Path("rig.yaml"));

        Assert.Equal(rig.BaselineMm, back.BaselineMm, 1e-12 * rig.BaselineMm);
        for (var i = 0; i < RigParameters.Count; i++)
        {
            Assert.Equal(rig.StandardUncertainty(i), back.StandardUncertainty(i), 1e-12 * rig.StandardUncertainty(i));
        }

        Assert.Contains(
            (rig.RightFromLeft.Translation.X / millimetres).ToString("R", System.Globalization.CultureInfo.InvariantCulture), File.ReadAllText(folder.Path("rig.yaml")));
    }

    [Fact]
    public void A_typed_file_is_read_with_what_it_leaves_out()
    {
        using var folder = new TestFolder();

        var rig = RigFile.Read(folder.Write("typed.yaml", Typed()));

        Assert.Equal(new Camera(new(700, 701, 320, 240), new(640, 480), new(k1: -0.1, p2: 0.001)), rig.Left);
        Assert.True(rig.Right.Distortion.IsNone);
        Assert.Equal(new Vector3D(-120, 0, 0), rig.RightFromLeft.Translation);
        Assert.Equal(0.01, Rotation.ToVector(rig.RightFromLeft.Rotation).Y, 1e-15);
        Assert.Equal(2, rig.StandardUncertainty(RigParameters.TranslationStart), 1e-12); // 4e-6 m², which is 2 mm
        Assert.Equal(0, rig.StandardUncertainty(0));
    }

    // Each row: what of the typed file is replaced by what, and the words that the sentence has to hold.
    [Theory]
    [InlineData("[700, 0, 320]", "[0, 0, 320]", "left.camera-matrix", "singular")]
    [InlineData("[700, 0, 320]", "[.nan, 0, 320]", "left.camera-matrix[1][1]", "not a finite number")]
    [InlineData("[700, 0, 320]", "[700, 0, 1e999]", "left.camera-matrix[1][3]", "not a finite number")]
    [InlineData("[700, 0, 320]", "[700, 5, 320]", "left.camera-matrix", "form")]
    [InlineData("[700, 0, 320]", "[700, 320]", "left.camera-matrix[1]", "2 parts instead of 3")]
    [InlineData("rotation-vector: [0, 0.01, 0]", "rotation: [[1, 0, 0], [0, 1, 0], [0, 0, -1]]", "right-from-left.rotation", "not a rotation")]
    [InlineData("rotation-vector: [0, 0.01, 0]", "rotation: [[1, 0.1, 0], [0, 1, 0], [0, 0, 1]]", "right-from-left.rotation", "not a rotation")]
    [InlineData("rotation-vector", "rotation-vektor", "right-from-left", "rotation-vektor")]
    [InlineData("translation: [-0.12, 0, 0]", "translation: [0, 0, 0]", "right-from-left.translation", "zero")]
    [InlineData("version: 1", "version: 2", "version", "newer")]
    [InlineData("version: 1", "version: one", "version", "'one'")]
    [InlineData("kind: pairwright-rig", "kind: recipe", "kind", "recipe")]
    [InlineData("lengths: m", "lengths: furlong", "lengths", "furlong")]
    [InlineData("picture: [640, 480]", "picture: [640, -480]", "left.picture[2]", "-480")]
    [InlineData("k1: -0.1", "k9: -0.1", "left.distortion", "k9")]
    [InlineData("[translation x]", "[translation w]", "covariance.parameters[1]", "translation w")]
    [InlineData("[[4e-6]]", "[[-4e-6]]", "covariance.lower-triangle[1]", "below zero")]
    [InlineData("[[4e-6]]", "[[4e-6], [1, 2]]", "covariance.lower-triangle", "2 parts instead of 1")]
    [InlineData("right:", "wrong:", "wrong", "allowed")]
    [InlineData("kind: pairwright-rig", "kind: pairwright-rig: x", "line 1", "YAML")]
    public void A_wrong_entry_is_refused_by_file_line_and_name(string entry, string replacement, string named, string reason)
    {
        using var folder = new TestFolder();
        Assert.Contains(entry, Typed());
        var path = folder.Write("wrong.yaml", Typed().Replace(entry, replacement));

        var message = Assert.Throws<UserErrorException>(() => RigFile.Read(path)).Message;

        Assert.Contains($"'{path}'", message);
        Assert.Contains("line ", message);
        Assert.Contains(named, message);
        Assert.Contains(reason, message);
        Assert.EndsWith(".", message);
    }

    [Theory]
    [InlineData("")]
    [InlineData("- 1\n- 2\n")]
    [InlineData("kind: [pairwright-rig\n")]
    [InlineData("a: b\n---\nc: d\n")]
    [InlineData("\u0089PNG\u0001\u0002")]
    public void A_file_that_is_no_rig_is_refused_by_name(string content)
    {
        using var folder = new TestFolder();
        var path = folder.Write("none.yaml", content);

        Assert.Contains(path, Assert.Throws<UserErrorException>(() => RigFile.Read(path)).Message);
    }

    [Fact]
    public void A_missing_file_is_said_to_be_missing() =>
        Assert.Contains("absent.yaml", Assert.Throws<UserErrorException>(() => RigFile.Read("absent.yaml")).Message);

    [Fact]
    public void A_rectified_geometry_comes_back_exact_to_the_last_bit()
    {
        using var folder = new TestFolder();

        // Source: the published calibration figures of the Middlebury 2014 scene Motorcycle, typed from memory.
        var geometry = new RectifiedGeometry(3997.684, 193.001, 131.111, 1176.728, 1011.728, new(2964, 2000));
        RectifiedGeometryFile.Write(geometry, folder.Path("pair.yaml"));

        Assert.Equal(geometry, RectifiedGeometryFile.Read(folder.Path("pair.yaml")));
    }

    [Theory]
    [InlineData("baseline: -2", "baseline", "above zero")]
    [InlineData("baseline: wide", "baseline", "'wide'")]
    [InlineData("", "the file", "baseline")]
    public void A_wrong_rectified_geometry_is_refused_by_entry(string baseline, string named, string reason)
    {
        using var folder = new TestFolder();
        var path = folder.Write(
            "pair.yaml", $"kind: pairwright-rectified-geometry\nversion: 1\nlengths: inch\npicture: [10, 20]\nfocal: 100\n{baseline}\ncentre: [1, 2]\n");

        var message = Assert.Throws<UserErrorException>(() => RectifiedGeometryFile.Read(path)).Message;

        Assert.Contains(path, message);
        Assert.Contains(named, message);
        Assert.Contains(reason, message);
    }

    // Source: the intrinsics published with the boards of Debian's package opencv-doc; figures read off the file by eye.
    [SkippableFact]
    public void Published_matrices_are_read_beside_a_pose_of_our_own_in_the_same_form()
    {
        using var folder = new TestFolder();
        var pose = folder.Write("pose.yml", Storage("R", 3, 1, "0., 0.01, 0.") + Storage("T", 3, 1, "-3.3, 0., 0.").Replace("%YAML:1.0\n", ""));

        var rig = RigFile.ReadMatrices(OpenData.Find("published/intrinsics.yml"), new(640, 480), posePath: pose, lengths: LengthUnit.Inch);

        Assert.Equal(new CameraMatrix(5.3480326845051309e+02, 5.3480326845051309e+02, 3.3568643204394891e+02, 2.4066183054066337e+02), rig.Left.Matrix);
        Assert.Equal(-1.6916358306948096e-01, rig.Right.Distortion.K1);
        Assert.Equal(-3.3 * 25.4, rig.RightFromLeft.Translation.X, 1e-12);
        Assert.Equal(0.01, Rotation.ToVector(rig.RightFromLeft.Rotation).Y, 1e-15);
        Assert.Equal(2, rig.Provenance.Inputs.Length);
    }

    // Source: OpenCV's own writer, in each of its forms and with names of the caller's.
    [Theory]
    [InlineData("rig.yml")]
    [InlineData("rig.xml")]
    [InlineData("rig.json")]
    public void Matrices_that_OpenCV_wrote_are_read_exactly(string name)
    {
        using var folder = new TestFolder();
        var rotation = Rotation.FromVector(new(0.1, -0.2, 0.3));
        using (var storage = new FileStorage(folder.Path(name), FileStorage.Modes.Write))
        {
            Write(storage, "cameraLeft", 3, 3, 812.345678901234567, 0, 333.3, 0, 810.1, 222.2, 0, 0, 1);
            Write(storage, "lensLeft", 1, 8, -0.1, 0.02, 1e-4, -2e-4, 0.003, 0.4, 0.05, 0.006);
            Write(storage, "cameraRight", 3, 3, 800, 0, 300, 0, 801, 200, 0, 0, 1);
            Write(storage, "lensRight", 4, 1, -0.2, 0.01, 0, 0);
            Write(storage, "turn", 3, 3, rotation.M11, rotation.M12, rotation.M13, rotation.M21, rotation.M22, rotation.M23, rotation.M31, rotation.M32, rotation.M33);
            Write(storage, "shift", 3, 1, -99.5, 1, 2);
        }

        var rig = RigFile.ReadMatrices(
            folder.Path(name), new(640, 480), new(600, 400), names: new("cameraLeft", "lensLeft", "cameraRight", "lensRight", "turn", "shift"));

        Assert.Equal(new Camera(new(812.345678901234567, 810.1, 333.3, 222.2), new(640, 480), new(-0.1, 0.02, 1e-4, -2e-4, 0.003, 0.4, 0.05, 0.006)), rig.Left);
        Assert.Equal(new Camera(new(800, 801, 300, 200), new(600, 400), new(-0.2, 0.01)), rig.Right);
        Assert.Equal(rotation, rig.RightFromLeft.Rotation);
        Assert.Equal(new Vector3D(-99.5, 1, 2), rig.RightFromLeft.Translation);
    }

    [Theory]
    [InlineData("M1", 3, 3, "0., 0., 3., 0., 5., 2., 0., 0., 1.", "singular")]
    [InlineData("M1", 3, 3, ".Nan, 0., 3., 0., 5., 2., 0., 0., 1.", "not finite")]
    [InlineData("M2", 3, 2, "5., 0., 3., 0., 5., 2.", "3 × 2")]
    [InlineData("D1", 1, 12, "0., 0., 0., 0., 0., 0., 0., 0., 0.1, 0., 0., 0.", "eighth")]
    [InlineData("R", 3, 3, "1., 0., 0., 0., 1., 0., 0., 0., -1.", "not a rotation")]
    [InlineData("R", 3, 3, "2., 0., 0., 0., 2., 0., 0., 0., 2.", "not a rotation")]
    [InlineData("T", 2, 1, "1., 0.", "2 numbers")]
    [InlineData("T", 3, 1, "0., 0., 0.", "zero")]
    public void A_wrong_matrix_is_refused_by_file_and_name(string name, int rows, int columns, string data, string reason)
    {
        using var folder = new TestFolder();
        var matrices = new Dictionary<string, string>
        {
            ["M1"] = Storage("M1", 3, 3, "5., 0., 3., 0., 5., 2., 0., 0., 1."), ["D1"] = Storage("D1", 1, 5, "0., 0., 0., 0., 0."),
            ["M2"] = Storage("M2", 3, 3, "5., 0., 3., 0., 5., 2., 0., 0., 1."), ["D2"] = Storage("D2", 1, 5, "0., 0., 0., 0., 0."),
            ["R"] = Storage("R", 3, 3, "1., 0., 0., 0., 1., 0., 0., 0., 1."), ["T"] = Storage("T", 3, 1, "-50., 0., 0."),
        };
        string Text() => "%YAML:1.0\n" + string.Concat(matrices.Values.Select(text => text.Replace("%YAML:1.0\n", "")));
        Assert.Equal(50, RigFile.ReadMatrices(folder.Write("right.yml", Text()), new(6, 4)).BaselineMm);

        matrices[name] = Storage(name, rows, columns, data);
        var path = folder.Write("wrong.yml", Text());
        var message = Assert.Throws<UserErrorException>(() => RigFile.ReadMatrices(path, new(6, 4))).Message;

        Assert.Contains($"'{path}'", message);
        Assert.Contains($"'{name}'", message);
        Assert.Contains(reason, message);
    }

    [Theory]
    [InlineData("no storage at all")]
    [InlineData("%YAML:1.0\nM1: !!opencv-matrix\n  rows: x\n")]
    [InlineData("<?xml version=\"1.0\"?>\n<opencv_storage><M1")]
    [InlineData("")]
    public void A_broken_storage_is_refused_by_name(string content)
    {
        using var folder = new TestFolder();
        var path = folder.Write("broken.yml", content);

        Assert.Contains(path, Assert.Throws<UserErrorException>(() => RigFile.ReadMatrices(path, new(6, 4))).Message);
    }

    [Fact]
    public void Matrices_where_a_rig_is_wanted_are_told_where_to_go()
    {
        using var folder = new TestFolder();
        var path = folder.Write("matrices.yml", Storage("M1", 1, 1, "1."));

        Assert.Contains("ReadMatrices", Assert.Throws<UserErrorException>(() => RigFile.Read(path)).Message);
    }

    private static string Typed() =>
        """
        kind: pairwright-rig
        version: 1
        lengths: m
        left:
          picture: [640, 480]
          camera-matrix: [[700, 0, 320], [0, 701, 240], [0, 0, 1]]
          distortion: {k1: -0.1, p2: 0.001}
        right:
          picture: [800, 600]
          camera-matrix: [[900, 0, 400], [0, 900, 300], [0, 0, 1]]
        right-from-left:
          rotation-vector: [0, 0.01, 0]
          translation: [-0.12, 0, 0]
        covariance:
          parameters: [translation x]
          lower-triangle: [[4e-6]]
        """;

    private static string Storage(string name, int rows, int columns, string data) =>
        $"%YAML:1.0\n{name}: !!opencv-matrix\n   rows: {rows}\n   cols: {columns}\n   dt: d\n   data: [ {data} ]\n";

    private static void Write(FileStorage storage, string name, int rows, int columns, params double[] values)
    {
        using var mat = Mat.FromPixelData(rows, columns, MatType.CV_64FC1, values);
        storage.Write(name, mat);
    }

    private static Rig Random(int seed, bool withCovariance)
    {
        var random = new Random(seed);
        double Next(double scale) => (2 * random.NextDouble() - 1) * scale;
        Camera Camera() => new(
            new(800 + Next(300), 800 + Next(300), 320 + Next(50), 240 + Next(50)),
            new(640, 480),
            new(Next(0.2), Next(0.1), Next(1e-3), Next(1e-3), Next(0.01), Next(0.01), Next(0.01), Next(1e-300)));
        Matrix<double>? covariance = null;
        if (withCovariance)
        {
            // Of lower rank and with parameters held fixed, as calibrations give it.
            var free = Enumerable.Range(0, RigParameters.Count).Where(i => i % 12 < 9 || i >= 24).ToArray();
            var factors = Matrix<double>.Build.Dense(RigParameters.Count, 40, (i, _) => free.Contains(i) ? Next(1e-3) : 0);
            covariance = factors * factors.Transpose();
            covariance = (covariance + covariance.Transpose()) / 2;
        }

        return new(Camera(), Camera(), Pose.FromVectors(new(Next(0.3), Next(0.3), Next(0.3)), new(-100 + Next(50), Next(5), Next(5))), covariance);
    }
}
