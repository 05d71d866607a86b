using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>Something derived from a rig, as it comes out with the rig as calibrated and with the rig changed along each principal axis.</summary>
/// <remarks>
/// Whatever is computed from it is computed once for every rig, so that the common part needs no derivatives. The changed values may rest on
/// a sample of the points; only their differences are used.
/// </remarks>
internal sealed class RigVariants<T>
{
    private readonly Rig? rig;
    private readonly bool isKnown;

    private RigVariants(Rig? rig, bool isKnown, T nominal, ImmutableArray<(T Plus, T Minus)> changed) =>
        (this.rig, this.isKnown, Nominal, Changed) = (rig, isKnown, nominal, changed);

    /// <summary>With the rig as calibrated.</summary>
    public T Nominal { get; }

    /// <summary>With the rig changed by plus and minus one standard deviation along each axis; empty where the rig is exact or its covariance not known.</summary>
    public ImmutableArray<(T Plus, T Minus)> Changed { get; }

    /// <summary>Evaluates something under every rig.</summary>
    public static RigVariants<T> Of(Rig? rig, T nominal, Func<Rig, T> underRig)
    {
        if (rig is null)
        {
            return new(null, false, nominal, []);
        }

        var variation = RigVariation.Of(rig);
        var changed = new (T, T)[variation.Changed.Count];
        Parallel.For(0, changed.Length, axis => changed[axis] = (underRig(variation.Changed[axis].Plus), underRig(variation.Changed[axis].Minus)));
        return new(rig, variation.IsKnown, nominal, [.. changed]);
    }

    /// <summary>Derives another thing under every rig.</summary>
    public RigVariants<TOut> Select<TOut>(Func<T, TOut> derive) =>
        new(rig, isKnown, derive(Nominal), [.. Changed.Select(pair => (derive(pair.Plus), derive(pair.Minus)))]);

    /// <summary>As <see cref="Select{TOut}(Func{T,TOut})"/> with a nominal value that is known already.</summary>
    public RigVariants<TOut> Select<TOut>(TOut nominal, Func<T, TOut> derive) =>
        new(rig, isKnown, nominal, [.. Changed.Select(pair => (derive(pair.Plus), derive(pair.Minus)))]);

    /// <summary>Derives something from two things under every rig.</summary>
    /// <exception cref="UserErrorException">The two were measured with different rigs.</exception>
    public RigVariants<TOut> With<TOther, TOut>(RigVariants<TOther> other, Func<T, TOther, TOut> derive)
    {
        if (!RigVariation.SameSource(rig, other.rig))
        {
            throw new UserErrorException(
                "The two were measured with different rigs, so they share no frame of coordinates; measure both with one rig and combine the resulting values instead.");
        }

        return new(
            rig,
            isKnown,
            derive(Nominal, other.Nominal),
            [.. Changed.Zip(other.Changed, (a, b) => (derive(a.Plus, b.Plus), derive(a.Minus, b.Minus)))]);
    }

    /// <summary>A number as a measured value: half the difference along each axis is its signed effect.</summary>
    public MeasuredValue ToMeasured(Func<T, double> number, double randomSigma, string unit)
    {
        var value = number(Nominal);
        return isKnown
            ? new(value, randomSigma, unit, Changed.Length == 0 ? [] : [new(rig!, [.. Changed.Select(pair => (number(pair.Plus) - number(pair.Minus)) / 2)])])
            : new(value, randomSigma, double.NaN, unit);
    }
}
