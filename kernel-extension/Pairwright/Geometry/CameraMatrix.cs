namespace Pairwright.Geometry;

/// <summary>The linear part of a camera: u = FocalU·x + CentreU and v = FocalV·y + CentreV for a direction (x, y, 1).</summary>
/// <param name="FocalU">Focal length in pixel widths, above zero.</param>
/// <param name="FocalV">Focal length in pixel heights, above zero.</param>
/// <param name="CentreU">Principal point's column, in pixels.</param>
/// <param name="CentreV">Principal point's row, in pixels.</param>
public readonly record struct CameraMatrix(double FocalU, double FocalV, double CentreU, double CentreV)
{
    /// <summary>The matrix K.</summary>
    public Matrix3x3 Matrix => new(FocalU, 0, CentreU, 0, FocalV, CentreV, 0, 0, 1);

    /// <summary>The inverse of K.</summary>
    public Matrix3x3 Inverse => new(1 / FocalU, 0, -CentreU / FocalU, 0, 1 / FocalV, -CentreV / FocalV, 0, 0, 1);

    /// <summary>Focal lengths and principal point.</summary>
    public override string ToString() => FormattableString.Invariant($"focal length ({FocalU:0.###}, {FocalV:0.###}) px, centre ({CentreU:0.###}, {CentreV:0.###}) px");

    /// <summary>The direction (x, y, 1) of an ideal pixel, in the camera's frame.</summary>
    public Vector3D Direction(IdealPixel pixel) => new((pixel.U - CentreU) / FocalU, (pixel.V - CentreV) / FocalV, 1);

    /// <summary>The ideal pixel of a direction (x, y, 1), in the camera's frame.</summary>
    public IdealPixel Pixel(double x, double y) => new(FocalU * x + CentreU, FocalV * y + CentreV);

    internal (double X, double Y) Normalise(IdealPixel pixel) => ((pixel.U - CentreU) / FocalU, (pixel.V - CentreV) / FocalV);
}
