using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>What a rectified pair of a scene truly shows, at the centre of every pixel of the left rectified picture.</summary>
/// <remarks>
/// A pixel has a disparity when its ray meets a surface and the left camera's raw picture covers it. Stored numbers are single precision;
/// <see cref="At"/> gives double.
/// </remarks>
public sealed class SceneTruth
{
    private readonly Scene scene;
    private readonly int[] objects;

    internal SceneTruth(Scene scene, Rectification rectification, int? threads, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(rectification);
        (this.scene, Rectification) = (scene, rectification);
        var size = rectification.Geometry.Size;
        var (disparity, depth) = (new float[size.Area], new float[size.Area]);
        var (visible, occluded) = (new bool[size.Area], new bool[size.Area]);
        objects = new int[size.Area];
        var options = new ParallelOptions { MaxDegreeOfParallelism = threads ?? Environment.ProcessorCount, CancellationToken = cancellation };
        Parallel.For(0, size.Height, options, v =>
        {
            for (var u = 0; u < size.Width; u++)
            {
                var index = v * size.Width + u;
                var point = At(new(u, v));
                (disparity[index], depth[index]) = (float.NaN, float.NaN);
                objects[index] = -1;
                if (point is { } truth)
                {
                    (disparity[index], depth[index]) = ((float)truth.Disparity, (float)truth.DepthMm);
                    objects[index] = truth.Hit.ObjectIndex;
                    occluded[index] = truth.IsHiddenFromRight;
                    visible[index] = !truth.IsHiddenFromRight && truth.IsInRightPicture;
                }
            }
        });
        (Disparity, DepthMm) = (new(size, disparity), new(size, depth));
        (VisibleInBoth, Occluded) = (new(size, visible), new(size, occluded));
    }

    /// <summary>How the pair is rectified, and by which rig.</summary>
    public Rectification Rectification { get; }

    /// <summary>The true disparity, in pixels, of every surface point, whether the right camera sees it or not; NaN where there is none.</summary>
    public ScalarMap Disparity { get; }

    /// <summary>The true depth Z along the rectified left axis, in millimetres; NaN where there is none.</summary>
    public ScalarMap DepthMm { get; }

    /// <summary>Where a surface point is seen by both cameras and lies on both raw and both rectified pictures.</summary>
    public Mask VisibleInBoth { get; }

    /// <summary>Where a surface point is hidden from the right camera by something in between, or faces away from it.</summary>
    public Mask Occluded { get; }

    /// <summary>The pixels that show the objects of a name.</summary>
    /// <param name="name">An object's <see cref="SceneObject.Name"/>.</param>
    /// <exception cref="UserErrorException">No object is called so.</exception>
    public Mask Of(string name)
    {
        var named = Enumerable.Range(0, scene.Objects.Length).Where(i => scene.Objects[i].Name == name).ToHashSet();
        if (named.Count == 0)
        {
            throw new UserErrorException(
                $"The scene holds nothing called '{name}'; it holds {string.Join(", ", scene.Objects.Select(item => item.Name).Distinct())}.");
        }

        return new(Disparity.Size, Array.ConvertAll(objects, named.Contains));
    }

    /// <summary>The truth at any position of the left rectified picture, in double precision; nothing where no surface is seen.</summary>
    public SceneTruthPoint? At(RectifiedPixel pixel)
    {
        var (rig, geometry) = (Rectification.Rig, Rectification.Geometry);
        var raw = Rectification.RawFromRectified(View.Left, pixel);
        if (!rig.Left.Size.Contains(raw.U, raw.V))
        {
            return null;
        }

        // A direction whose Z along the rectified axis is one: the distance along it is the depth.
        var direction = geometry.LeftFromRectified
            * new Vector3D((pixel.U - geometry.CentreU) / geometry.FocalPixels, (pixel.V - geometry.CentreV) / geometry.FocalPixels, 1);
        if (scene.Cast(default, direction) is not { } hit)
        {
            return null;
        }

        var disparity = geometry.Disparity(hit.Distance);
        var inRight = rig.Right.Project(rig.RightFromLeft.Transform(hit.Point));
        var isInRight = rig.Right.Size.Contains(inRight.U, inRight.V) && geometry.Size.Contains(pixel.U - disparity, pixel.V);
        return new(hit, disparity, hit.Distance, scene.IsHiddenFrom(hit, rig.RightFromLeft.Inverse.Translation), isInRight);
    }
}
