using System.Globalization;

namespace Pairwright.Measurement;

/// <summary>Writes values and uncertainties with sensible digits.</summary>
internal static class MeasuredText
{
    private const string Unknown = "unknown";

    /// <summary>Value ± standard uncertainty with both parts.</summary>
    public static string Standard(MeasuredValue measured)
    {
        var u = measured.StandardUncertainty;
        if (u == 0)
        {
            return WithUnit(Plain(measured.Value), measured.Unit);
        }

        // A part that is known is shown even where the whole is not.
        var known = double.IsNaN(u) ? new[] { measured.RandomSigma, measured.CommonSigma }.FirstOrDefault(part => part > 0, double.NaN) : u;
        var decimals = Decimals(known);
        var total = double.IsNaN(u) ? Unknown : WithUnit(Fixed(u, decimals), measured.Unit);
        return $"{WithUnit(Fixed(measured.Value, decimals), measured.Unit)} ± {total} (1 σ; random {Fixed(measured.RandomSigma, decimals)}, common {Fixed(measured.CommonSigma, decimals)})";
    }

    /// <summary>Value ± expanded uncertainty with its k.</summary>
    public static string Expanded(MeasuredValue measured, double coverageFactor)
    {
        var expanded = measured.Expanded(coverageFactor);
        if (expanded == 0)
        {
            return WithUnit(Plain(measured.Value), measured.Unit);
        }

        var decimals = Decimals(expanded);
        var total = double.IsNaN(expanded) ? Unknown : WithUnit(Fixed(expanded, decimals), measured.Unit);
        return $"{WithUnit(Fixed(measured.Value, decimals), measured.Unit)} ± {total} (k = {Plain(coverageFactor)})";
    }

    /// <summary>A number and its unit; a pure number stands alone.</summary>
    public static string WithUnit(string number, string unit) =>
        unit switch { _ when number == Unknown => number, "" => number, "°" => number + unit, _ => $"{number} {unit}" };

    /// <summary>A number without uncertainty, six significant digits at most.</summary>
    public static string Plain(double value) => double.IsNaN(value) ? "none" : value.ToString("G6", CultureInfo.InvariantCulture);

    /// <summary>A number to match an uncertainty of two significant digits.</summary>
    public static string Matching(double value, double uncertainty) => Fixed(value, Decimals(uncertainty));

    // Decimal places at which the uncertainty has two significant digits; below zero for tens and more.
    private static int? Decimals(double uncertainty)
    {
        if (!(uncertainty > 0) || double.IsInfinity(uncertainty))
        {
            return null;
        }

        var decimals = 1 - (int)Math.Floor(Math.Log10(uncertainty));

        // 0.0996 rounds to 0.100: one digit fewer.
        return Math.Round(uncertainty * Math.Pow(10, decimals)) >= 100 ? decimals - 1 : decimals;
    }

    private static string Fixed(double value, int? decimals)
    {
        if (double.IsNaN(value))
        {
            return Unknown;
        }

        if (decimals is not { } places || !double.IsFinite(value))
        {
            return Plain(value);
        }

        var step = Math.Pow(10, -places);
        return places > 0 ? value.ToString($"F{Math.Min(places, 15)}", CultureInfo.InvariantCulture) : (Math.Round(value / step) * step).ToString("F0", CultureInfo.InvariantCulture);
    }
}
