namespace Pairwright.Calibration;

/// <summary>A turn about one axis of a camera since its calibration.</summary>
/// <param name="Name">The turn's name: pitch, yaw or roll.</param>
/// <param name="Degrees">The turn, in degrees.</param>
/// <param name="RandomSigma">The random part of its standard uncertainty, in degrees.</param>
/// <param name="CommonSigma">The part that comes from the calibration's own uncertainty, in degrees; NaN where that is not known.</param>
public sealed record AxisTurn(string Name, double Degrees, double RandomSigma, double CommonSigma)
{
    /// <summary>The standard uncertainty, both parts together, in degrees; the random part alone where the other is not known.</summary>
    public double StandardUncertainty => double.IsNaN(CommonSigma) ? RandomSigma : Math.Sqrt(RandomSigma * RandomSigma + CommonSigma * CommonSigma);

    /// <summary>The turn with its standard uncertainty.</summary>
    public override string ToString() => FormattableString.Invariant($"{Name} {Degrees:0.0000}° ± {StandardUncertainty:0.0000}°");
}
