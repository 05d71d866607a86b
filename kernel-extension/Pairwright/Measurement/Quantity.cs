namespace Pairwright.Measurement;

/// <summary>A number with its unit, as a person states it: a limit, a nominal size, a tolerance.</summary>
/// <remarks>Lengths are kept in millimetres, angles in degrees, positions in pictures in pixels, so that equal quantities are equal values.</remarks>
/// <param name="Amount">The number, in <paramref name="Unit"/>.</param>
/// <param name="Unit"><c>mm</c>, <c>°</c>, <c>px</c>, <c>%</c>, <c>s</c>; empty for a pure number.</param>
public readonly record struct Quantity(double Amount, string Unit)
{
    /// <summary>A quantity as a measured value without uncertainty, so that it can be subtracted from one or judged like one.</summary>
    public static implicit operator MeasuredValue(Quantity quantity) => MeasuredValue.Exact(quantity.Amount, quantity.Unit);

    /// <summary>The opposite.</summary>
    public static Quantity operator -(Quantity quantity) => quantity with { Amount = -quantity.Amount };

    /// <summary>The number and its unit.</summary>
    public override string ToString() => MeasuredText.WithUnit(MeasuredText.Plain(Amount), Unit);
}
