namespace Pairwright.Simulation;

/// <summary>Clips rays to the space between two parallel planes (Kay and Kajiya 1986).</summary>
internal static class Slabs
{
    /// <summary>The part of the interval [enter, leave] of a ray in which one coordinate lies in [low, high]; enter above leave where there is none.</summary>
    public static (double Enter, double Leave) Clip(double origin, double direction, double low, double high, double enter, double leave)
    {
        if (direction == 0)
        {
            return origin >= low && origin <= high ? (enter, leave) : (double.PositiveInfinity, double.NegativeInfinity);
        }

        var (a, b) = ((low - origin) / direction, (high - origin) / direction);
        return (Math.Max(enter, Math.Min(a, b)), Math.Min(leave, Math.Max(a, b)));
    }
}
