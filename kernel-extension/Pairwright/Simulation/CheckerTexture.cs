using Pairwright.Geometry;

namespace Pairwright.Simulation;

internal sealed class CheckerTexture(int innerCornersAcross, int innerCornersDown, double squareMm, double dark, double light) : Texture
{
    public override double Albedo(Vector3D point)
    {
        var column = (long)Math.Floor(point.X / squareMm + (innerCornersAcross + 1) / 2.0);
        var row = (long)Math.Floor(point.Y / squareMm + (innerCornersDown + 1) / 2.0);
        var isOnBoard = column >= 0 && row >= 0 && column <= innerCornersAcross && row <= innerCornersDown;
        return isOnBoard && ((column + row) & 1) == 0 ? dark : light;
    }
}
