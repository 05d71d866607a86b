using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>The light that falls on each pixel of a camera, before exposure and noise.</summary>
internal sealed class RadianceImage
{
    private readonly PictureSize size;
    private readonly float[] radiance;

    private RadianceImage(PictureSize size, float[] radiance) => (this.size, this.radiance) = (size, radiance);

    public static RadianceImage Render(Scene scene, Camera camera, Pose cameraFromScene, ShootingConditions how, CancellationToken cancellation)
    {
        var threads = new ParallelOptions { MaxDegreeOfParallelism = how.Threads ?? Environment.ProcessorCount, CancellationToken = cancellation };
        var rays = RayField.Of(camera, how.RaysAcrossPixel, threads);
        var sceneFromCamera = cameraFromScene.Inverse;
        var fine = new float[rays.Width * rays.Height];
        Parallel.For(0, rays.Height, threads, row =>
        {
            for (var column = 0; column < rays.Width; column++)
            {
                var inCamera = rays[column, row];
                if (float.IsNaN((float)inCamera.X))
                {
                    continue;
                }

                var hit = scene.Cast(sceneFromCamera.Translation, sceneFromCamera.Rotation * inCamera);
                var value = hit is { } met ? scene.Radiance(met) : scene.Background;
                if (how.HasNaturalVignetting)
                {
                    var squaredCosine = 1 / inCamera.Dot(inCamera);
                    value *= squaredCosine * squaredCosine;
                }

                fine[row * rays.Width + column] = (float)value;
            }
        });
        return new(camera.Size, Gather(fine, rays.Width, rays.Height, how, threads));
    }

    public Picture Expose(View view, ShootingConditions how, int seed)
    {
        var threads = new ParallelOptions { MaxDegreeOfParallelism = how.Threads ?? Environment.ProcessorCount };
        var exposure = how.Exposure(view);
        var pixelSeeds = IntegerHash.Part(seed, view == View.Left ? 1 : 2);
        var grey = new ushort[radiance.Length];
        Parallel.For(0, size.Height, threads, v =>
        {
            for (var u = 0; u < size.Width; u++)
            {
                var index = v * size.Width + u;
                var level = exposure * radiance[index];
                grey[index] = how.Sensor is { } sensor
                    ? sensor.Expose(level * sensor.SaturationPhotons, IntegerHash.At(u, v, pixelSeeds))
                    : (ushort)Math.Clamp(Math.Floor(255 * level + 0.5), 0, 255);
            }
        });
        return new(size, grey, how.Sensor?.Bits ?? 8, provenance: Provenance.None.Then("simulate", $"{view.ToString().ToLowerInvariant()} view, seed {seed}"));
    }

    // Pixel aperture (a square) and lens (a Gaussian) in one separable kernel over the sub-pixels; borders repeat the outermost ones.
    private static float[] Gather(float[] fine, int fineWidth, int fineHeight, ShootingConditions how, ParallelOptions threads)
    {
        var across = how.RaysAcrossPixel;
        var kernel = Kernel(across, how.BlurSigmaPx);
        var reach = (kernel.Length - across) / 2;
        var (width, height) = (fineWidth / across, fineHeight / across);
        var rows = new float[width * fineHeight];
        Parallel.For(0, fineHeight, threads, row =>
        {
            for (var u = 0; u < width; u++)
            {
                var sum = 0.0;
                for (var i = 0; i < kernel.Length; i++)
                {
                    sum += kernel[i] * fine[row * fineWidth + Math.Clamp(u * across + i - reach, 0, fineWidth - 1)];
                }

                rows[row * width + u] = (float)sum;
            }
        });
        var pixels = new float[width * height];
        Parallel.For(0, height, threads, v =>
        {
            for (var u = 0; u < width; u++)
            {
                var sum = 0.0;
                for (var i = 0; i < kernel.Length; i++)
                {
                    sum += kernel[i] * rows[Math.Clamp(v * across + i - reach, 0, fineHeight - 1) * width + u];
                }

                pixels[v * width + u] = (float)sum;
            }
        });
        return pixels;
    }

    private static double[] Kernel(int across, double blurSigmaPx)
    {
        var sigma = blurSigmaPx * across;
        var reach = (int)Math.Ceiling(3.5 * sigma);
        var kernel = new double[across + 2 * reach];
        for (var shift = -reach; shift <= reach; shift++)
        {
            var weight = sigma == 0 ? 1 : Math.Exp(-0.5 * shift * shift / (sigma * sigma));
            for (var i = 0; i < across; i++)
            {
                kernel[shift + reach + i] += weight;
            }
        }

        var sum = kernel.Sum();
        return [.. kernel.Select(weight => weight / sum)];
    }
}
