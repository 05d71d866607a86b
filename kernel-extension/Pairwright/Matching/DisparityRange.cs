namespace Pairwright.Matching;

/// <summary>The whole disparities that a search looks at, both ends included; either end may be negative.</summary>
/// <remarks>d = u_left − u_right, in pixels. Equal when both ends are equal.</remarks>
public readonly record struct DisparityRange
{
    /// <summary>Makes a range.</summary>
    /// <param name="least">The least disparity, in pixels.</param>
    /// <param name="most">The greatest disparity, in pixels, not below <paramref name="least"/>.</param>
    /// <exception cref="UserErrorException">The range is reversed, or holds more than 16,384 disparities.</exception>
    public DisparityRange(int least, int most)
    {
        if (least > most)
        {
            throw new UserErrorException(
                $"The search range {least}:{most} is reversed or empty; give the least disparity first and the greatest last, both included.");
        }

        if ((long)most - least >= LongestCount)
        {
            throw new UserErrorException(
                $"The search range {least}:{most} holds more than {LongestCount} disparities; give the range that the rig and the working distance call for.");
        }

        (Least, Most) = (least, most);
    }

    private const int LongestCount = 16_384;

    /// <summary>The least disparity, in pixels.</summary>
    public int Least { get; }

    /// <summary>The greatest disparity, in pixels.</summary>
    public int Most { get; }

    /// <summary>How many whole disparities the range holds.</summary>
    public int Count => Most - Least + 1;

    /// <summary>Whether a disparity lies in the range, both ends included.</summary>
    public bool Contains(double disparity) => disparity >= Least && disparity <= Most;

    /// <summary>Least:most.</summary>
    public override string ToString() => $"{Least}:{Most}";
}
