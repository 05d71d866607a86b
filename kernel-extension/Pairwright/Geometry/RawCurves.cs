using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>Makes raw curves: walks along the straight line in ideal pixels and lets the lens bend it.</summary>
internal static class RawCurves
{
    public static RawCurve OfLine(Rig rig, EpipolarLine line, double stepPx)
    {
        ArgumentNullException.ThrowIfNull(line);
        return new(line.View, Walk(rig[line.View], line, double.NegativeInfinity, double.PositiveInfinity, stepPx, _ => double.NaN));
    }

    public static RawCurve OfPixel(Rig rig, RawPixel pixel, double nearestMm, double farthestMm, double stepPx, View of)
    {
        if (!(nearestMm >= 0 && farthestMm > nearestMm))
        {
            throw new UserErrorException(
                $"Depths from {nearestMm} mm to {farthestMm} mm are no range; give a nearest depth of at least zero and a farthest one beyond it.");
        }

        var ideal = rig[of].Undistort(pixel);
        var other = of.Other();
        var camera = rig[other];
        var line = rig.FundamentalMatrix.LineOf(of, ideal);
        var pose = of == View.Left ? rig.RightFromLeft : rig.RightFromLeft.Inverse;

        // At inverse depth q the ray passes through a + q·t in the other camera's frame, up to scale.
        var a = pose.Rotation * rig[of].Matrix.Direction(ideal);
        var t = pose.Translation;
        var (along, across) = (line.Direction.U, line.Direction.V);
        var origin = line.Nearest(new(camera.Matrix.CentreU, camera.Matrix.CentreV));

        // The place along the line moves one way only as q grows, as long as the point stays in front of the camera.
        var way = Math.Sign(along * camera.Matrix.FocalU * (t.X * a.Z - a.X * t.Z) + across * camera.Matrix.FocalV * (t.Y * a.Z - a.Y * t.Z));
        var far = Place(a + (1 / farthestMm) * t);
        var near = nearestMm > 0 ? Place(a + (1 / nearestMm) * t) : Place(t);
        if (way == 0 || (far is null && near is null))
        {
            return new(other, []);
        }

        // Where an end lies behind the other camera, the curve comes from, or goes to, infinity on its side.
        var start = far ?? -way * double.PositiveInfinity;
        var end = near ?? way * double.PositiveInfinity;
        return new(other, Walk(camera, line, start, end, stepPx, InverseDepth));

        double? Place(Vector3D point)
        {
            if (!(point.Z > 0))
            {
                return null;
            }

            var projected = camera.Matrix.Pixel(point.X / point.Z, point.Y / point.Z);
            return (projected.U - origin.U) * along + (projected.V - origin.V) * across;
        }

        double InverseDepth(IdealPixel at)
        {
            var direction = camera.Matrix.Direction(at);
            var (nu, nv) = (direction.X * a.Z - a.X, direction.Y * a.Z - a.Y);
            var (mu, mv) = (t.X - direction.X * t.Z, t.Y - direction.Y * t.Z);
            return (nu * mu + nv * mv) / (mu * mu + mv * mv);
        }
    }

    // Places are distances along the line, in ideal pixels, from its point nearest to the principal point; the walk goes from start to end.
    private static ImmutableArray<RawCurvePoint> Walk(
        Camera camera, EpipolarLine line, double start, double end, double stepPx, Func<IdealPixel, double> inverseDepth)
    {
        if (!(stepPx > 0) || !double.IsFinite(stepPx))
        {
            throw new UserErrorException($"A step of {stepPx} px along a curve is not above zero; give a step such as 1 px.");
        }

        var border = camera.Border;
        var onPicture = line.ClippedTo(border.Min(p => p.U), border.Min(p => p.V), border.Max(p => p.U), border.Max(p => p.V));
        if (onPicture is not var (first, last))
        {
            return [];
        }

        var (along, across) = (line.Direction.U, line.Direction.V);
        var origin = line.Nearest(new(camera.Matrix.CentreU, camera.Matrix.CentreV));
        var (low, high) = (PlaceOf(first), PlaceOf(last));
        (start, end) = (Math.Clamp(start, low, high), Math.Clamp(end, low, high));
        if (start == end)
        {
            return [];
        }

        var way = Math.Sign(end - start);
        var pieces = new List<ImmutableArray<RawCurvePoint>.Builder>();
        var inside = false;
        for (var place = start; ;)
        {
            var (ideal, raw) = At(place);
            if (camera.Size.Contains(raw.U, raw.V))
            {
                if (!inside)
                {
                    pieces.Add(ImmutableArray.CreateBuilder<RawCurvePoint>());
                }

                pieces[^1].Add(new(raw, ideal, inverseDepth(ideal)));
                inside = true;
            }
            else
            {
                inside = false;
            }

            if (place == end)
            {
                break;
            }

            var next = place + way * IdealStep(place, raw);
            place = (end - next) * way > 0 ? next : end;
        }

        // A strongly bent line may leave the picture and come back for a corner: the longest piece is the curve.
        return pieces.Count == 0 ? [] : pieces.MaxBy(piece => piece.Count)!.ToImmutable();

        double PlaceOf(IdealPixel p) => (p.U - origin.U) * along + (p.V - origin.V) * across;

        (IdealPixel, RawPixel) At(double place)
        {
            var ideal = new IdealPixel(origin.U + place * along, origin.V + place * across);
            return (ideal, camera.Distort(ideal));
        }

        // How far to go in ideal pixels so that the raw pixel moves by one step.
        double IdealStep(double place, RawPixel from)
        {
            var probe = 0.25 * stepPx;
            var (_, to) = At(place + way * probe);
            var moved = Math.Sqrt((to.U - from.U) * (to.U - from.U) + (to.V - from.V) * (to.V - from.V));
            return moved > 0 ? Math.Clamp(probe * stepPx / moved, 0.1 * stepPx, 100 * stepPx) : stepPx;
        }
    }
}
