namespace Pairwright.Matching;

/// <summary>One byte or one word at a time: what the wider vectors must equal.</summary>
internal readonly unsafe struct Lanes8 : ILanes<byte, ushort, nint>
{
    public static int Bytes => 1;

    public static int Words => 1;

    public static byte Load(byte* from) => *from;

    public static void Store(byte* to, byte value) => *to = value;

    public static void Expect(byte* at)
    {
    }

    public static void StorePast(byte* to, byte value) => *to = value;

    public static byte All(byte value) => value;

    public static byte Add(byte a, byte b) => (byte)(a + b);

    public static byte AddUpTo255(byte a, byte b) => (byte)Math.Min(a + b, 255);

    public static byte Subtract(byte a, byte b) => (byte)(a - b);

    public static byte AbsoluteDifference(byte a, byte b) => (byte)Math.Abs(a - b);

    public static byte Min(byte a, byte b) => Math.Min(a, b);

    public static byte Or(byte a, byte b) => (byte)(a | b);

    public static byte Select(byte mask, byte a, byte b) => (byte)((mask & a) | (~mask & b));

    public static byte Least(byte value) => value;

    public static nint Table(byte* from) => (nint)from;

    public static byte LookUp(nint table, byte index) => ((byte*)table)[index];

    public static ushort LoadWords(ushort* from) => *from;

    public static void StoreWords(ushort* to, ushort value) => *to = value;

    public static ushort Widen(byte* from) => *from;

    public static ushort AllWords(ushort value) => value;

    public static ushort AddWords(ushort a, ushort b) => (ushort)(a + b);

    public static ushort ShiftLeft(ushort value, int by) => (ushort)(value << by);

    public static ushort OrWords(ushort a, ushort b) => (ushort)(a | b);

    public static ushort AndWords(ushort a, ushort b) => (ushort)(a & b);

    public static ushort MaxWords(ushort a, ushort b) => Math.Max(a, b);

    public static ushort Multiply(ushort a, ushort b) => (ushort)(a * b);

    public static ushort MinWords(ushort a, ushort b) => Math.Min(a, b);

    public static ushort SelectWords(ushort mask, ushort a, ushort b) => (ushort)((mask & a) | (~mask & b));

    public static ushort EqualWords(ushort a, ushort b) => a == b ? ushort.MaxValue : (ushort)0;

    public static ushort LeastWord(ushort value) => value;

    public static int FirstEqual(ushort a, ushort b) => a == b ? 0 : -1;
}
