using System.Numerics;

namespace Pairwright.Measurement;

/// <summary>Writes quantities as numbers with a unit: <c>1.5.Millimetres()</c>.</summary>
public static class QuantityUnits
{
    /// <summary>A length in micrometres.</summary>
    public static Quantity Micrometres<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount) / 1000, "mm");

    /// <summary>A length in millimetres.</summary>
    public static Quantity Millimetres<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount), "mm");

    /// <summary>A length in centimetres, kept in millimetres.</summary>
    public static Quantity Centimetres<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount) * 10, "mm");

    /// <summary>A length in metres, kept in millimetres.</summary>
    public static Quantity Metres<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount) * 1000, "mm");

    /// <summary>An angle in degrees.</summary>
    public static Quantity Degrees<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount), "°");

    /// <summary>A distance in a picture, in pixels.</summary>
    public static Quantity Pixels<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount), "px");

    /// <summary>A share in percent.</summary>
    public static Quantity Percent<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount), "%");

    /// <summary>A time in seconds.</summary>
    public static Quantity Seconds<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount), "s");

    /// <summary>A number without unit, such as a count or a ratio.</summary>
    public static Quantity Plain<T>(this T amount) where T : INumber<T> => new(double.CreateChecked(amount), "");
}
