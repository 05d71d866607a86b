using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>How a simulated capture is taken.</summary>
public sealed record ShootingConditions
{
    /// <summary>Rays a pixel is made of along each axis: 2 means four rays. At least 1.</summary>
    public int RaysAcrossPixel { get; init; } = 2;

    /// <summary>Standard deviation of the lens's Gaussian point spread, in pixels, beside the pixel's own square aperture; 0 for none.</summary>
    public double BlurSigmaPx { get; init; } = 0.5;

    /// <summary>Exposure of the left camera: at 1 a radiance of 1 just saturates.</summary>
    public double LeftExposure { get; init; } = 0.9;

    /// <summary>Exposure of the right camera.</summary>
    public double RightExposure { get; init; } = 0.9;

    /// <summary>Whether pictures darken towards the corners with the fourth power of the cosine of the field angle.</summary>
    public bool HasNaturalVignetting { get; init; }

    /// <summary>The sensor of both cameras; nothing for pictures without noise, rounded to 8 bits.</summary>
    public Sensor? Sensor { get; init; } = new();

    /// <summary>The most threads that work at once; all processors when left out. The result does not depend on it.</summary>
    public int? Threads { get; init; }

    /// <summary>The exposure of a view.</summary>
    public double Exposure(View view) => view == View.Left ? LeftExposure : RightExposure;

    internal void Check()
    {
        if (RaysAcrossPixel is < 1 or > 16 || !(BlurSigmaPx is >= 0 and < 50) || !(LeftExposure > 0) || !(RightExposure > 0) || Threads < 1)
        {
            throw new UserErrorException(
                "Shooting conditions need 1 to 16 rays across a pixel, a blur of 0 to 50 px, exposures above zero and at least one thread; correct them.");
        }
    }
}
