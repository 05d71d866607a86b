namespace Pairwright;

/// <summary>A file that a result was made from.</summary>
/// <param name="Name">The file's name as it was given.</param>
/// <param name="Sha256">The SHA-256 of its bytes, in lower-case hexadecimal digits.</param>
public sealed record ProvenanceInput(string Name, string Sha256);
