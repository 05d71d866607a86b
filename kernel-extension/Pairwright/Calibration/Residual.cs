namespace Pairwright.Calibration;

/// <summary>How far a measured corner lies from where the model puts it: measured minus modelled, in pixels.</summary>
/// <param name="U">To the right.</param>
/// <param name="V">Down.</param>
public readonly record struct Residual(double U, double V)
{
    /// <summary>The squared length, in square pixels.</summary>
    public double Square => U * U + V * V;
}
