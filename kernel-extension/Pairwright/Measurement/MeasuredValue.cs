using System.Collections.Immutable;

namespace Pairwright.Measurement;

/// <summary>A measured value with its standard uncertainty in two parts.</summary>
/// <remarks>
/// <para>
/// The random part comes from picture noise and matching and averages out over independent readings. The common part comes from the rig's
/// covariance: every value taken with that rig shares it, and no number of pixels averages it away. The standard uncertainty is the root of
/// the sum of the two squares (JCGM 100:2008, 5.1.2).
/// </para>
/// <para>
/// Sums, differences and multiples keep, for every shared cause, its signed effects. Two values of one rig therefore cancel or add up as
/// the law of propagation for correlated inputs asks (JCGM 100:2008, 5.2.2 and F.1.2.3), while causes that are not shared, and random parts,
/// combine in quadrature. Random parts of values whose regions overlap are not independent; for those fit both together instead.
/// </para>
/// </remarks>
public sealed class MeasuredValue
{
    /// <summary>Makes a value whose common part comes from a source of its own, shared with nothing but this value.</summary>
    /// <param name="value">The value.</param>
    /// <param name="randomSigma">The random standard uncertainty, zero or above; NaN where it is not known.</param>
    /// <param name="commonSigma">The common standard uncertainty, zero or above; NaN where it is not known.</param>
    /// <param name="unit">The unit, such as <c>mm</c>; empty for a pure number.</param>
    /// <exception cref="ArgumentOutOfRangeException">A standard uncertainty is below zero.</exception>
    public MeasuredValue(double value, double randomSigma, double commonSigma, string unit)
        : this(value, randomSigma, unit, commonSigma == 0 ? [] : [new(new object(), [NotNegative(commonSigma)])])
    {
    }

    /// <summary>Makes a value from the signed effects of every shared cause.</summary>
    /// <param name="value">The value.</param>
    /// <param name="randomSigma">The random standard uncertainty, zero or above; NaN where it is not known.</param>
    /// <param name="unit">The unit, such as <c>mm</c>; empty for a pure number.</param>
    /// <param name="commonParts">One entry for each shared cause.</param>
    /// <exception cref="ArgumentOutOfRangeException">The standard uncertainty is below zero.</exception>
    public MeasuredValue(double value, double randomSigma, string unit, ImmutableArray<CommonPart> commonParts)
    {
        ArgumentNullException.ThrowIfNull(unit);
        (Value, RandomSigma, Unit, CommonParts) = (value, NotNegative(randomSigma), unit, commonParts.IsDefault ? [] : commonParts);
        CommonSigma = Math.Sqrt(CommonParts.SelectMany(part => part.Effects).Sum(effect => effect * effect));
    }

    /// <summary>The best estimate, in <see cref="Unit"/>; NaN where nothing could be measured.</summary>
    public double Value { get; }

    /// <summary>The random part of the standard uncertainty, in <see cref="Unit"/>; NaN where it is not known.</summary>
    public double RandomSigma { get; }

    /// <summary>The common part of the standard uncertainty, in <see cref="Unit"/>; NaN where it is not known.</summary>
    public double CommonSigma { get; }

    /// <summary>The signed effects of every shared cause.</summary>
    public ImmutableArray<CommonPart> CommonParts { get; }

    /// <summary>The unit, such as <c>mm</c>; empty for a pure number.</summary>
    public string Unit { get; }

    /// <summary>The standard uncertainty, 1 σ, of both parts together; NaN where a part is not known.</summary>
    public double StandardUncertainty => Math.Sqrt(RandomSigma * RandomSigma + CommonSigma * CommonSigma);

    /// <summary>The value without its sign, with the same uncertainty.</summary>
    /// <remarks>Near zero the distribution folds over and the mean of magnitudes lies above the magnitude of the mean; a decision then errs to the strict side.</remarks>
    public MeasuredValue Magnitude => Value < 0 ? -this : this;

    /// <summary>A value without uncertainty, such as a count or a nominal size.</summary>
    public static MeasuredValue Exact(double value, string unit) => new(value, 0, unit, []);

    /// <summary>The mean of independent repeated readings with the standard uncertainty of the mean (JCGM 100:2008, 4.2.3).</summary>
    /// <param name="readings">At least four readings.</param>
    /// <param name="unit">Their unit.</param>
    /// <remarks>
    /// A small number of readings widens the uncertainty by the standard deviation of Student's t distribution, √((n − 1)/(n − 3))
    /// (JCGM 101:2008, 6.4.9.4). The common part is zero here: repeats say nothing about what all of them share.
    /// </remarks>
    /// <exception cref="UserErrorException">Fewer than four readings.</exception>
    public static MeasuredValue OfRepeats(IReadOnlyCollection<double> readings, string unit)
    {
        ArgumentNullException.ThrowIfNull(readings);
        var n = readings.Count;
        if (n < 4)
        {
            throw new UserErrorException($"{n} repeated readings give no standard uncertainty; take at least four.");
        }

        var mean = readings.Average();
        var variance = readings.Sum(reading => (reading - mean) * (reading - mean)) / (n - 1) / n;
        return new(mean, Math.Sqrt(variance * (n - 1) / (n - 3)), unit, []);
    }

    /// <summary>The mean of values; common parts of one source add up, random parts combine in quadrature.</summary>
    /// <exception cref="UserErrorException">There are no values, or their units differ.</exception>
    public static MeasuredValue Mean(IReadOnlyCollection<MeasuredValue> values)
    {
        ArgumentNullException.ThrowIfNull(values);
        return values.Count == 0
            ? throw new UserErrorException("There is no mean of no values; select at least one measured value.")
            : values.Aggregate((sum, value) => sum + value) / values.Count;
    }

    /// <summary>The mean of one quantity measured on repeated captures of a scene in which nothing moved.</summary>
    /// <param name="repeats">At least four values, one from each capture.</param>
    /// <remarks>
    /// Such captures share their texture and where it falls on the pixels, and with them a part of each value's random error that no repeat averages out. Only what
    /// changes between repeats does: of the stated variance u² of one value, the scatter s² between repeats, at most u², falls to s²/n, and u² − s² stays.
    /// For captures in which the scene lies elsewhere each time use <see cref="Mean"/>.
    /// </remarks>
    /// <exception cref="UserErrorException">There are fewer than four values, or their units differ.</exception>
    public static MeasuredValue MeanOfRepeats(IReadOnlyCollection<MeasuredValue> repeats)
    {
        ArgumentNullException.ThrowIfNull(repeats);
        var n = repeats.Count;
        if (n < 4)
        {
            throw new UserErrorException($"{n} repeated measurements do not tell how they scatter; take at least four.");
        }

        var mean = Mean(repeats);
        var stated = repeats.Average(value => value.RandomSigma * value.RandomSigma);
        var scatter = repeats.Sum(value => (value.Value - mean.Value) * (value.Value - mean.Value)) / (n - 1);
        return new(mean.Value, Math.Sqrt(stated - (1 - 1.0 / n) * Math.Min(scatter, stated)), mean.Unit, mean.CommonParts);
    }

    /// <summary>The expanded uncertainty, k times the standard uncertainty (JCGM 100:2008, 6.2).</summary>
    /// <param name="coverageFactor">k, above zero; 2 covers about 95 % of a normal distribution.</param>
    public double Expanded(double coverageFactor = 2) => coverageFactor * StandardUncertainty;

    /// <summary>The same value with a stated common part in place of the one it has, for a rig whose covariance is not known.</summary>
    /// <param name="sigma">The common standard uncertainty, in <see cref="Unit"/>, zero or above.</param>
    public MeasuredValue WithCommonSigma(double sigma) => new(Value, RandomSigma, sigma, Unit);

    /// <summary>The value itself.</summary>
    public static MeasuredValue operator +(MeasuredValue value) => value;

    /// <summary>The opposite.</summary>
    public static MeasuredValue operator -(MeasuredValue value) => -1 * value;

    /// <summary>The sum.</summary>
    /// <exception cref="UserErrorException">The units differ.</exception>
    public static MeasuredValue operator +(MeasuredValue left, MeasuredValue right) => Combine(left, right, 1);

    /// <summary>The difference.</summary>
    /// <exception cref="UserErrorException">The units differ.</exception>
    public static MeasuredValue operator -(MeasuredValue left, MeasuredValue right) => Combine(left, right, -1);

    /// <summary>The multiple by a number without unit.</summary>
    public static MeasuredValue operator *(double factor, MeasuredValue value)
    {
        ArgumentNullException.ThrowIfNull(value);
        return new(
            factor * value.Value,
            Math.Abs(factor) * value.RandomSigma,
            value.Unit,
            [.. value.CommonParts.Select(part => part with { Effects = [.. part.Effects.Select(effect => factor * effect)] })]);
    }

    /// <summary>The multiple by a number without unit.</summary>
    public static MeasuredValue operator *(MeasuredValue value, double factor) => factor * value;

    /// <summary>The fraction by a number without unit.</summary>
    public static MeasuredValue operator /(MeasuredValue value, double divisor) => 1 / divisor * value;

    /// <summary>The value with its standard uncertainty to two significant digits and the value to match (JCGM 100:2008, 7.2.6).</summary>
    public override string ToString() => MeasuredText.Standard(this);

    // NaN is let through: it stands for what is not known.
    private static double NotNegative(double sigma) =>
        sigma < 0 ? throw new ArgumentOutOfRangeException(nameof(sigma), sigma, "A standard uncertainty is not below zero.") : sigma;

    private static MeasuredValue Combine(MeasuredValue left, MeasuredValue right, double sign)
    {
        ArgumentNullException.ThrowIfNull(left);
        ArgumentNullException.ThrowIfNull(right);
        if (left.Unit != right.Unit)
        {
            throw new UserErrorException($"A value in '{left.Unit}' and one in '{right.Unit}' do not add; bring both to one unit.");
        }

        var signed = (sign * right).CommonParts;
        var merged = left.CommonParts.Select(part =>
            signed.FirstOrDefault(other => RigVariation.SameSource(part.Source, other.Source)) is { } shared
                ? part with { Effects = [.. part.Effects.Zip(shared.Effects, (a, b) => a + b)] }
                : part);
        var alone = signed.Where(part => !left.CommonParts.Any(other => RigVariation.SameSource(part.Source, other.Source)));
        return new(
            left.Value + sign * right.Value,
            Math.Sqrt(left.RandomSigma * left.RandomSigma + right.RandomSigma * right.RandomSigma),
            left.Unit,
            [.. merged, .. alone]);
    }
}
