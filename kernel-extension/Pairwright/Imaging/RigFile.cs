using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Writes and reads rigs as YAML with units and covariance.</summary>
public static class RigFile
{
    /// <summary>Writes a rig.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="path">The file.</param>
    /// <param name="lengths">The unit of the translation in the file.</param>
    public static void Write(Rig rig, string path, LengthUnit lengths = LengthUnit.Millimetre) => throw new NotImplementedException();

    /// <summary>Reads a rig.</summary>
    /// <param name="path">The file.</param>
    public static Rig Read(string path) => throw new NotImplementedException();
}
