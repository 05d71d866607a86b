using MathNet.Numerics.Distributions;
using MathNet.Numerics.Random;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>The random inputs of one trial after another. Not safe for several threads at a time.</summary>
public sealed class MonteCarloDraw
{
    private readonly MersenneTwister source;

    /// <summary>Makes a source of random inputs.</summary>
    /// <param name="seed">The same seed gives the same inputs.</param>
    public MonteCarloDraw(int seed) => source = new(seed, threadSafe: false);

    /// <summary>A normally distributed input.</summary>
    /// <param name="mean">Its mean.</param>
    /// <param name="sigma">Its standard deviation, zero or above.</param>
    public double Normal(double mean, double sigma) => mean + sigma * MathNet.Numerics.Distributions.Normal.Sample(source, 0, 1);

    /// <summary>An input that is equally likely everywhere between two bounds.</summary>
    public double Rectangular(double lower, double upper) => lower + (upper - lower) * source.NextDouble();

    /// <summary>An input with Student's t distribution, shifted and scaled.</summary>
    /// <param name="location">Its centre.</param>
    /// <param name="scale">Its scale, above zero.</param>
    /// <param name="degreesOfFreedom">Its degrees of freedom, above zero.</param>
    public double Student(double location, double scale, double degreesOfFreedom) => StudentT.Sample(source, location, scale, degreesOfFreedom);

    /// <summary>A rig drawn from a rig's covariance, about the rig; without covariance of its own.</summary>
    /// <exception cref="UserErrorException">The rig carries no covariance.</exception>
    public Rig Rig(Rig rig)
    {
        ArgumentNullException.ThrowIfNull(rig);
        if (rig.Covariance is null)
        {
            throw new UserErrorException("The rig carries no covariance to draw from; calibrate it from boards, or read a rig file that has one.");
        }

        var change = new double[RigParameters.Count];
        foreach (var axis in rig.PrincipalChanges())
        {
            var length = Normal(0, 1);
            for (var i = 0; i < change.Length; i++)
            {
                change[i] += length * axis[i];
            }
        }

        return rig.Changed(change);
    }
}
