using System.Globalization;

namespace Pairwright.Notebook.Drawing;

/// <summary>Numbers as a report prints them: a true minus sign, digits that the uncertainty carries, always the unit.</summary>
internal static class Numbers
{
    public const string NoValue = "no value";

    /// <summary>A value with a fixed number of decimals and its unit.</summary>
    public static string Text(double value, int decimals, string unit = "") =>
        double.IsNaN(value) ? NoValue : WithUnit(Fixed(value, decimals), unit);

    /// <summary>A value with about as many significant digits as asked.</summary>
    public static string Significant(double value, int digits, string unit = "") =>
        double.IsNaN(value) ? NoValue : WithUnit(Shortest(value, digits), unit);

    /// <summary>A value with its standard uncertainty, both rounded to the uncertainty's second digit (JCGM 100:2008, 7.2.6).</summary>
    public static string WithSigma(double value, double sigma, string unit = "")
    {
        if (double.IsNaN(value))
        {
            return NoValue;
        }

        if (double.IsNaN(sigma))
        {
            return Significant(value, 6, unit) + " (uncertainty unknown)";
        }

        if (sigma <= 0 || double.IsInfinity(sigma))
        {
            return Significant(value, 6, unit) + (sigma == 0 ? " (held fixed)" : " (uncertainty unbounded)");
        }

        var decimals = Decimals(sigma);
        if (decimals > 9)
        {
            return $"({Scientific(value)} ± {Scientific(sigma, 2)}){(unit.Length == 0 ? "" : " " + unit)}";
        }

        return WithUnit($"{Fixed(value, Math.Max(decimals, 0))} ± {Fixed(sigma, Math.Max(decimals, 0))}", unit);
    }

    /// <summary>A value with its expanded uncertainty, rounded in the same way.</summary>
    public static string WithExpanded(double value, double expanded, string unit = "") => WithSigma(value, expanded, unit);

    /// <summary>A value with as many decimals as an uncertainty of two significant digits has.</summary>
    public static string Like(double value, double sigma, string unit = "") =>
        sigma > 0 && double.IsFinite(sigma) ? Text(value, Math.Clamp(Decimals(sigma), 0, 9), unit) : Significant(value, 4, unit);

    /// <summary>A share from 0 to 1 in per cent.</summary>
    public static string Percent(double share) => double.IsNaN(share) ? NoValue : Fixed(100 * share, share is > 0 and < 0.0995 ? 2 : 1) + " %";

    /// <summary>A number in powers of ten, such as 1.25·10⁻⁷.</summary>
    public static string Scientific(double value, int digits = 4)
    {
        if (double.IsNaN(value))
        {
            return NoValue;
        }

        if (value == 0 || !double.IsFinite(value))
        {
            return Fixed(value, 0);
        }

        var power = (int)Math.Floor(Math.Log10(Math.Abs(value)));
        if (Math.Round(Math.Abs(value) / Math.Pow(10, power), Math.Clamp(digits - 1, 0, 15)) >= 10)
        {
            power++; // 9.9996 rounds to 10.00, which is 1.000 of the next power
        }

        return $"{Fixed(value / Math.Pow(10, power), digits - 1)}·10{Raised(power)}";
    }

    public static string Fixed(double value, int decimals)
    {
        if (double.IsInfinity(value))
        {
            return value > 0 ? "∞" : "−∞";
        }

        var rounded = Math.Round(value, Math.Clamp(decimals, 0, 15)) + 0.0; // adding zero turns −0 into 0
        return rounded.ToString("F" + Math.Max(decimals, 0), CultureInfo.InvariantCulture).Replace('-', '−');
    }

    // Where the second significant digit stands; 0.0996 rounds to 0.10, one digit fewer.
    private static int Decimals(double sigma)
    {
        var decimals = 1 - (int)Math.Floor(Math.Log10(sigma));
        return Math.Round(sigma * Math.Pow(10, decimals)) >= 100 ? decimals - 1 : decimals;
    }

    private static string Shortest(double value, int digits)
    {
        if (value == 0 || !double.IsFinite(value))
        {
            return Fixed(value, 0);
        }

        var power = (int)Math.Floor(Math.Log10(Math.Abs(value)));
        return power < -4 || power > 7 ? Scientific(value, digits) : Fixed(value, Math.Max(digits - 1 - power, 0));
    }

    // The degree sign alone stands against its number (SI brochure, 5.4.3).
    private static string WithUnit(string number, string unit) => unit switch
    {
        "" => number,
        "°" => number.Contains('±') ? $"({number})°" : number + "°",
        _ => $"{number} {unit}",
    };

    private static string Raised(int power) =>
        string.Concat(power.ToString(CultureInfo.InvariantCulture).Select(c => c == '-' ? '⁻' : "⁰¹²³⁴⁵⁶⁷⁸⁹"[c - '0']));
}
