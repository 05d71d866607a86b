namespace Pairwright.Matching;

/// <summary>The sums of levels and of their squares over the windows around the pixels of one row.</summary>
internal sealed class WindowSums(int padded, int half)
{
    private readonly double[] columnLevels = new double[padded];
    private readonly double[] columnSquares = new double[padded];

    /// <summary>The sum of each pixel's window, once closed.</summary>
    public double[] Levels { get; } = new double[padded - 2 * half];

    /// <summary>The sum of the squares of each pixel's window, once closed.</summary>
    public double[] Squares { get; } = new double[padded - 2 * half];

    /// <summary>Adds one row of the windows, with the columns beyond the borders.</summary>
    public void Add(ReadOnlySpan<float> levels)
    {
        for (var x = 0; x < padded; x++)
        {
            columnLevels[x] += levels[x];
            columnSquares[x] += (double)levels[x] * levels[x];
        }
    }

    /// <summary>Sums the columns of each window.</summary>
    public void Close()
    {
        var (levels, squares) = (0.0, 0.0);
        for (var x = 0; x < padded; x++)
        {
            levels += columnLevels[x];
            squares += columnSquares[x];
            var u = x - 2 * half;
            if (u >= 0)
            {
                (Levels[u], Squares[u]) = (levels, squares);
                levels -= columnLevels[u];
                squares -= columnSquares[u];
            }
        }
    }
}
