using System.Globalization;

namespace Pairwright.Imaging;

/// <summary>Settles how many bits of a file's samples carry the picture, and brings the samples down to them.</summary>
internal static class PictureLevels
{
    /// <summary>The significant bits and the saturation level; <paramref name="samples"/> are changed in place where the file stores them scaled up.</summary>
    /// <exception cref="UserErrorException">The samples do not fit what the caller stated.</exception>
    public static (int Bits, int Saturation) Settle(ushort[] samples, PictureHeader header, PictureReading reading, string path, List<string> warnings)
    {
        if (reading.SignificantBits is < 8 or > 16)
        {
            throw new UserErrorException($"{reading.SignificantBits} significant bits were stated for '{path}', but a picture has 8 to 16; correct the reading.");
        }

        // A file that says how far its levels were scaled up is taken at its word, whatever the caller states.
        var stored = header.BitsPerSample <= 8 ? 8 : 16;
        if (reading.SignificantBits > stored)
        {
            throw new UserErrorException($"{reading.SignificantBits} significant bits were stated for '{path}', but it stores {stored} bits a sample; correct the reading or export it with 16 bits.");
        }

        int? said = null;
        if (header.StatedBits is { } scaled && stored == 16)
        {
            Shift(samples, 16 - Math.Max(scaled, 8));
            said = Math.Max(scaled, 8);
        }
        else if (header.LargestLevel is { } largest)
        {
            said = Math.Max(8, int.Log2(largest) + 1);
        }

        var bits = reading.SignificantBits ?? said ?? stored;
        int most = samples.Length == 0 ? 0 : samples.Max();
        var spare = SpareLowBits(samples);
        if (most > (1 << bits) - 1)
        {
            // Stated fewer bits than the levels reach: right where the spare bits are the low ones, wrong elsewhere.
            if (spare < 16 - bits)
            {
                throw new UserErrorException(
                    $"'{path}' has levels up to {most}, more than {bits} bits hold ({(1 << bits) - 1}); state the number of significant bits that the camera delivers.");
            }

            Shift(samples, 16 - bits);
            warnings.Add($"The levels of '{path}' stand in the upper {bits} of 16 bits; they were divided by {1 << (16 - bits)}.");
        }
        else if (reading.SignificantBits is null && said is null && stored == 16)
        {
            if (spare > 0 && most > 255)
            {
                warnings.Add(string.Create(
                    CultureInfo.InvariantCulture,
                    $"All levels of '{path}' are multiples of {1 << spare}, as of a {16 - spare}-bit camera in the upper bits; they are taken as 16 bits unless {16 - spare} significant bits are stated."));
            }
            else if (most is > 0 and < 1 << 15)
            {
                warnings.Add(
                    $"The levels of '{path}' reach only {most} of 65535; they are taken as 16 bits, so state the camera's significant bits if they are fewer.");
            }
        }

        var saturation = reading.SaturationLevel ?? Math.Min(header.LargestLevel ?? int.MaxValue, (1 << bits) - 1);
        return saturation > 0 && saturation < 1 << bits
            ? (bits, saturation)
            : throw new UserErrorException($"The saturation level {saturation} stated for '{path}' is not one of {bits} bits (1 to {(1 << bits) - 1}); correct the reading.");
    }

    private static void Shift(ushort[] samples, int by)
    {
        for (var i = 0; i < samples.Length; i++)
        {
            samples[i] = (ushort)(samples[i] >> by);
        }
    }

    // How many of the lowest bits are zero in every sample.
    private static int SpareLowBits(ushort[] samples)
    {
        var used = 0;
        foreach (var sample in samples)
        {
            used |= sample;
        }

        return used == 0 ? 0 : int.TrailingZeroCount(used);
    }
}
