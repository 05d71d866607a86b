using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>One camera calibrated from its own pictures alone: the first step, and a check on the joint one.</summary>
public sealed class CameraCalibration
{
    private readonly Matrix<double> covariance;

    internal CameraCalibration(View view, Camera camera, Matrix<double> covariance, double rmsPx, double residualSigmaPx) =>
        (View, Camera, this.covariance, RmsPx, ResidualSigmaPx) = (view, camera, covariance, rmsPx, residualSigmaPx);

    /// <summary>Which camera.</summary>
    public View View { get; }

    /// <summary>The camera.</summary>
    public Camera Camera { get; }

    /// <summary>The covariance of the camera's twelve parameters in the order of <see cref="RigParameters"/> (a copy), zero for what was held fixed.</summary>
    public Matrix<double> Covariance => covariance.Clone();

    /// <summary>Root of the mean squared length of the residuals, in pixels.</summary>
    public double RmsPx { get; }

    /// <summary>The standard deviation of one corner coordinate as the residuals tell it, degrees of freedom taken into account, in pixels.</summary>
    public double ResidualSigmaPx { get; }

    /// <summary>The standard uncertainty of a parameter by its place among the camera's twelve.</summary>
    public double StandardUncertainty(int parameter) => Math.Sqrt(covariance[parameter, parameter]);
}
