namespace Pairwright.Imaging;

/// <summary>The unit of lengths in a file. In memory lengths are millimetres.</summary>
public enum LengthUnit
{
    /// <summary>Millimetres.</summary>
    Millimetre,

    /// <summary>Centimetres: 10 mm.</summary>
    Centimetre,

    /// <summary>Metres: 1000 mm.</summary>
    Metre,

    /// <summary>International inches: 25.4 mm.</summary>
    Inch,
}
