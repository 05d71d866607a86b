using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Measurement;

/// <summary>From disparities to depths.</summary>
public static class DisparityDepth
{
    /// <summary>The depth of every measured pixel, with the σ of its disparity where the map states one; filled pixels were not measured and have none.</summary>
    /// <param name="map">The disparities.</param>
    /// <exception cref="UserErrorException">The pair's focal length and baseline are not known.</exception>
    public static DepthMap ToDepth(this DisparityMap map)
    {
        ArgumentNullException.ThrowIfNull(map);
        var geometry = map.Pair.Geometry ?? throw new UserErrorException(
            "The pair is rectified but its focal length and baseline are not known, so there is disparity but no depth; state the rectified geometry when reading it.");
        var measured = ScalarMap.From(map.Size, (u, v) => map.Labels[u, v] == DisparityLabel.Measured ? map.Disparity[u, v] : float.NaN);
        return new(measured, geometry, map.Pair.Rectification, map.Sigma, map.CorrelationLengthPx, map.Pair.Left, map.Provenance.Then("depth"), map.Recipe.PullSigmaPx);
    }
}
