using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>How much light each point of a surface gives back. A texture is fixed to its object, so that both cameras see the same surface.</summary>
/// <remarks>Derive from this class to make another; <see cref="Albedo"/> must depend on nothing but the point.</remarks>
public abstract class Texture
{
    /// <summary>The albedo, 0 to 1, at a surface point of the object's own frame, in millimetres. Called from several threads.</summary>
    public abstract double Albedo(Vector3D point);

    /// <summary>The same albedo everywhere: a surface that a matcher finds nothing on.</summary>
    public static Texture Plain(double albedo) => new PlainTexture(albedo);

    /// <summary>Random blotches of two sizes, as a sprayed speckle pattern has.</summary>
    /// <param name="sizeMm">The size of the large blotches, in millimetres; the small ones are 0.4 of it.</param>
    /// <param name="seed">Another seed gives another pattern.</param>
    /// <param name="dark">Albedo of the paint.</param>
    /// <param name="light">Albedo of the ground.</param>
    public static Texture Speckle(double sizeMm, int seed = 1, double dark = 0.12, double light = 0.8) => new SpeckleTexture(sizeMm, seed, dark, light);

    /// <summary>
    /// A checkerboard in the plane z = 0 of the object's frame, centred on the origin, with a light margin around it. Inner corner (i, j)
    /// lies at x = (i − (across − 1)/2)·square, y = (j − (down − 1)/2)·square.
    /// </summary>
    /// <param name="innerCornersAcross">Inner corners along x.</param>
    /// <param name="innerCornersDown">Inner corners along y.</param>
    /// <param name="squareMm">The side of a square, in millimetres.</param>
    /// <param name="dark">Albedo of the dark squares.</param>
    /// <param name="light">Albedo of the light squares and the margin.</param>
    public static Texture Checker(int innerCornersAcross, int innerCornersDown, double squareMm, double dark = 0.06, double light = 0.82) =>
        new CheckerTexture(innerCornersAcross, innerCornersDown, squareMm, dark, light);

    /// <summary>Sawn softwood with the grain along x: growth rings around a pith below the plank, fibres, knots and saw marks.</summary>
    /// <param name="seed">Another seed gives another plank.</param>
    /// <param name="brightness">A factor on the albedo; 1 is fresh-sawn spruce.</param>
    public static Texture Wood(int seed = 1, double brightness = 1) => new WoodTexture(seed, brightness);

    /// <summary>Floated concrete: clouds, grains of sand and pinholes.</summary>
    public static Texture Concrete(int seed = 1) => new ConcreteTexture(seed);

    /// <summary>A worn dark rubber belt that runs along y, with a fine pebbled surface, streaks of wear and sawdust.</summary>
    /// <param name="seed">Another seed gives another belt.</param>
    /// <param name="sawdust">How much sawdust lies on it, 0 (none) to 1.</param>
    public static Texture Rubber(int seed = 1, double sawdust = 0.5) => new RubberTexture(seed, sawdust);

    /// <summary>Any function of the point (object's own frame, millimetres) with values 0 to 1.</summary>
    public static Texture From(Func<Vector3D, double> albedo)
    {
        ArgumentNullException.ThrowIfNull(albedo);
        return new FunctionTexture(albedo);
    }

    private sealed class PlainTexture(double albedo) : Texture
    {
        public override double Albedo(Vector3D point) => albedo;
    }

    private sealed class FunctionTexture(Func<Vector3D, double> albedo) : Texture
    {
        public override double Albedo(Vector3D point) => albedo(point);
    }
}
