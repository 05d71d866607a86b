namespace Pairwright.Matching;

/// <summary>
/// What the fused matcher does with a vector of bytes, or of 16-bit words half as many, whatever the vector's width. A lane is one disparity of one
/// pixel; lanes never depend on each other but in <see cref="Least(TBytes)"/> and <see cref="FirstEqual"/>, so every width gives the same bits.
/// </summary>
/// <typeparam name="TBytes">A vector of bytes.</typeparam>
/// <typeparam name="TWords">A vector of 16-bit words, half as many as <typeparamref name="TBytes"/> has bytes, and at least one.</typeparam>
/// <typeparam name="TTable">A table of sixteen bytes that is looked into.</typeparam>
internal unsafe interface ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    /// <summary>How many bytes a vector holds.</summary>
    static abstract int Bytes { get; }

    /// <summary>How many words a vector holds.</summary>
    static abstract int Words { get; }

    static abstract TBytes Load(byte* from);

    static abstract void Store(byte* to, TBytes value);

    /// <summary>Says that the bytes at an address will soon be read.</summary>
    static abstract void Expect(byte* at);

    /// <summary>Stores past the caches; the address is a multiple of the vector's size.</summary>
    static abstract void StorePast(byte* to, TBytes value);

    static abstract TBytes All(byte value);

    static abstract TBytes Add(TBytes a, TBytes b);

    /// <summary>The sum, 255 where it is larger.</summary>
    static abstract TBytes AddUpTo255(TBytes a, TBytes b);

    static abstract TBytes Subtract(TBytes a, TBytes b);

    static abstract TBytes AbsoluteDifference(TBytes a, TBytes b);

    static abstract TBytes Min(TBytes a, TBytes b);

    static abstract TBytes Or(TBytes a, TBytes b);

    /// <summary>Bits of <paramref name="a"/> where the mask has ones, else of <paramref name="b"/>.</summary>
    static abstract TBytes Select(TBytes mask, TBytes a, TBytes b);

    /// <summary>The least of all lanes.</summary>
    static abstract byte Least(TBytes value);

    /// <summary>A table that stands four times in a row from an address.</summary>
    static abstract TTable Table(byte* from);

    /// <summary>The table's entries at indices below sixteen.</summary>
    static abstract TBytes LookUp(TTable table, TBytes indices);

    static abstract TWords LoadWords(ushort* from);

    static abstract void StoreWords(ushort* to, TWords value);

    /// <summary>As many bytes as a vector has words, each as a word.</summary>
    static abstract TWords Widen(byte* from);

    static abstract TWords AllWords(ushort value);

    static abstract TWords AddWords(TWords a, TWords b);

    static abstract TWords ShiftLeft(TWords value, int by);

    static abstract TWords OrWords(TWords a, TWords b);

    static abstract TWords AndWords(TWords a, TWords b);

    /// <summary>The lower 16 bits of the products.</summary>
    static abstract TWords Multiply(TWords a, TWords b);

    static abstract TWords MinWords(TWords a, TWords b);

    static abstract TWords MaxWords(TWords a, TWords b);

    /// <summary><paramref name="a"/> where the mask's word is all ones, <paramref name="b"/> where it is zero.</summary>
    static abstract TWords SelectWords(TWords mask, TWords a, TWords b);

    /// <summary>Ones where two words are equal.</summary>
    static abstract TWords EqualWords(TWords a, TWords b);

    static abstract ushort LeastWord(TWords value);

    /// <summary>The first lane in which two vectors are equal; −1 where there is none.</summary>
    static abstract int FirstEqual(TWords a, TWords b);
}
