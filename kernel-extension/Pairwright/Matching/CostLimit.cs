namespace Pairwright.Matching;

/// <summary>The greatest cost that a pixel may have, so that a few bad pixels do not outweigh a window.</summary>
internal static class CostLimit
{
    /// <summary>The limit itself.</summary>
    /// <exception cref="UserErrorException">It is not above zero or not finite.</exception>
    public static double? Checked(double? limit) =>
        limit is null or (> 0 and < double.PositiveInfinity)
            ? limit
            : throw new UserErrorException($"A limit of {limit} is not a cost; give a number above zero, or none.");
}
