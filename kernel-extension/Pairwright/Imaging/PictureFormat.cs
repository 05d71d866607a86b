namespace Pairwright.Imaging;

/// <summary>The picture formats that are read.</summary>
internal enum PictureFormat
{
    Png,
    Tiff,
    Jpeg,
    Bmp,
    Netpbm,
}
