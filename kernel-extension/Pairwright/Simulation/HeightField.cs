using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A block whose top is a smooth height z(x, y) over a rectangle centred on the origin, with walls down to z = 0 and a flat bottom there.</summary>
public sealed class HeightField : Shape
{
    private readonly Func<double, double, double> height;
    private readonly double halfX;
    private readonly double halfY;
    private readonly double least;
    private readonly double most;
    private readonly double featureMm;

    /// <summary>Makes a height field.</summary>
    /// <param name="lengthMm">Its extent along x, in millimetres.</param>
    /// <param name="widthMm">Its extent along y, in millimetres.</param>
    /// <param name="height">The height over (x, y), in millimetres, smooth; called from several threads.</param>
    /// <param name="leastMm">A height that the top never goes below, above zero.</param>
    /// <param name="mostMm">A height that the top never exceeds.</param>
    /// <param name="featureMm">The smallest extent along the ground of a rise or dip that must not be stepped over.</param>
    /// <exception cref="ArgumentOutOfRangeException">An extent is not above zero, or the bounds are the wrong way round.</exception>
    public HeightField(
        double lengthMm, double widthMm, Func<double, double, double> height, double leastMm, double mostMm, double featureMm = 20)
    {
        ArgumentNullException.ThrowIfNull(height);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(lengthMm);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(widthMm);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(leastMm);
        ArgumentOutOfRangeException.ThrowIfLessThan(mostMm, leastMm);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(featureMm);
        (halfX, halfY, this.height, least, most, this.featureMm) = (lengthMm / 2, widthMm / 2, height, leastMm, mostMm, featureMm);
    }

    /// <inheritdoc/>
    public override Vector3D BoundCentre => new(0, 0, most / 2);

    /// <inheritdoc/>
    public override double BoundRadiusMm => new Vector3D(halfX, halfY, most / 2).Norm;

    /// <inheritdoc/>
    public override double Distance(Vector3D origin, Vector3D direction, double beyond)
    {
        var (enter, leave) = Slabs.Clip(origin.X, direction.X, -halfX, halfX, double.NegativeInfinity, double.PositiveInfinity);
        (enter, leave) = Slabs.Clip(origin.Y, direction.Y, -halfY, halfY, enter, leave);
        (enter, leave) = Slabs.Clip(origin.Z, direction.Z, 0, most, enter, leave);
        var start = Math.Max(enter, beyond);
        if (!(start < leave))
        {
            return double.PositiveInfinity;
        }

        var from = Above(origin, direction, start);
        if (from <= 0 && enter > beyond)
        {
            return enter;
        }

        // Where the ray is in the layer between the least and the greatest height, the sign of what is above the surface is watched
        // in steps shorter than half a feature; below the layer only the walls and the bottom are left, which end the interval.
        var along = Math.Sqrt(direction.X * direction.X + direction.Y * direction.Y);
        var (layerStart, layerEnd) = Slabs.Clip(origin.Z, direction.Z, least - 1e-9, most, start, leave);
        if (layerStart < layerEnd)
        {
            var steps = Math.Max(1, (int)Math.Ceiling((layerEnd - layerStart) * along / (0.5 * featureMm)));
            var (t, value) = (layerStart, Above(origin, direction, layerStart));
            for (var step = 1; step <= steps; step++)
            {
                var next = layerStart + (layerEnd - layerStart) * step / steps;
                var nextValue = Above(origin, direction, next);
                if (value > 0 != nextValue > 0)
                {
                    return Root(origin, direction, t, value, next, nextValue);
                }

                (t, value) = (next, nextValue);
            }
        }

        // Inside the block all along: it is left through a wall or the bottom.
        return from <= 0 ? leave : double.PositiveInfinity;
    }

    /// <inheritdoc/>
    public override Vector3D Normal(Vector3D point)
    {
        const double step = 1e-3;
        const double skin = 1e-6;
        var top = Math.Abs(point.Z - height(point.X, point.Y));
        if (halfX - Math.Abs(point.X) < skin && halfX - Math.Abs(point.X) < top)
        {
            return new(Math.Sign(point.X), 0, 0);
        }

        if (halfY - Math.Abs(point.Y) < skin && halfY - Math.Abs(point.Y) < top)
        {
            return new(0, Math.Sign(point.Y), 0);
        }

        if (point.Z < skin)
        {
            return new(0, 0, -1);
        }

        var slopeX = (height(point.X + step, point.Y) - height(point.X - step, point.Y)) / (2 * step);
        var slopeY = (height(point.X, point.Y + step) - height(point.X, point.Y - step)) / (2 * step);
        return new Vector3D(-slopeX, -slopeY, 1).Normalized;
    }

    private double Above(Vector3D origin, Vector3D direction, double t) =>
        origin.Z + t * direction.Z - height(origin.X + t * direction.X, origin.Y + t * direction.Y);

    // Secant steps kept inside a shrinking bracket (the "Illinois" rule of Dowell and Jarratt 1971).
    private double Root(Vector3D origin, Vector3D direction, double a, double valueA, double b, double valueB)
    {
        for (var iteration = 0; iteration < 100; iteration++)
        {
            var c = (a * valueB - b * valueA) / (valueB - valueA);
            var valueC = Above(origin, direction, c);
            if (Math.Abs(valueC) < 1e-11 || Math.Abs(b - a) < 1e-14 * Math.Abs(c))
            {
                return c;
            }

            if (valueC > 0 != valueB > 0)
            {
                (a, valueA) = (b, valueB);
            }
            else
            {
                valueA /= 2;
            }

            (b, valueB) = (c, valueC);
        }

        return b;
    }
}
