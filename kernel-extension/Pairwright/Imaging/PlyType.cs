namespace Pairwright.Imaging;

/// <summary>The scalar types of PLY.</summary>
internal enum PlyType
{
    Int8,
    UInt8,
    Int16,
    UInt16,
    Int32,
    UInt32,
    Float32,
    Float64,
}
