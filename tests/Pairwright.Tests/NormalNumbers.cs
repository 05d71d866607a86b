namespace Pairwright.Tests;

/// <summary>Standard normal numbers of a seed (Box and Muller 1958).</summary>
internal sealed class NormalNumbers(int seed)
{
    private readonly Random random = new(seed);

    public double Next() => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
