namespace Pairwright.Calibration;

/// <summary>Which distortion terms a calibration estimates; the others stay zero.</summary>
[Flags]
public enum LensTerms
{
    /// <summary>A lens without distortion.</summary>
    None = 0,

    /// <summary>Radial term of r².</summary>
    K1 = 1,

    /// <summary>Radial term of r⁴.</summary>
    K2 = 2,

    /// <summary>Radial term of r⁶.</summary>
    K3 = 4,

    /// <summary>Both tangential terms, p1 and p2.</summary>
    Tangential = 8,

    /// <summary>Denominator's term of r².</summary>
    K4 = 16,

    /// <summary>Denominator's term of r⁴.</summary>
    K5 = 32,

    /// <summary>Denominator's term of r⁶.</summary>
    K6 = 64,

    /// <summary>k1, k2, p1, p2, k3: the usual five.</summary>
    FiveTerms = K1 | K2 | K3 | Tangential,

    /// <summary>The five and the rational denominator, eight in all.</summary>
    EightTerms = FiveTerms | K4 | K5 | K6,
}
