using BitMiracle.LibTiff.Classic;

namespace Pairwright.Imaging;

/// <summary>Unpacks every part of a TIFF once, because OpenCV gives a damaged or unknown part of an 8-bit TIFF as black without a word.</summary>
internal static class TiffParts
{
    static TiffParts() => Tiff.SetErrorHandler(new Silence());

    /// <summary>Whether every strip or tile of the first picture unpacks to the bytes that it should hold.</summary>
    public static bool AreWhole(byte[] content)
    {
        try
        {
            return Unpack(content);
        }
        catch (Exception fault) when (fault is not OutOfMemoryException)
        {
            // On entries of a wrong type or length the library throws whatever it stumbles over; all of it means a damaged file.
            return false;
        }
    }

    private static bool Unpack(byte[] content)
    {
        using var stream = new MemoryStream(content, writable: false);
        using var tiff = Tiff.ClientOpen("memory", "r", stream, new TiffStream());
        if (tiff is null)
        {
            return false;
        }

        var tiled = tiff.IsTiled();
        var parts = tiled ? tiff.NumberOfTiles() : tiff.NumberOfStrips();
        var buffer = new byte[tiled ? tiff.TileSize() : tiff.StripSize()];
        var height = tiff.GetField(TiffTag.IMAGELENGTH)[0].ToInt();
        var rowsPerStrip = tiled ? 0 : Math.Min(height, tiff.GetFieldDefaulted(TiffTag.ROWSPERSTRIP)[0].ToInt() is > 0 and var rows ? rows : height);
        var stripsPerPlane = tiled ? 1 : (height + rowsPerStrip - 1) / rowsPerStrip;
        for (var part = 0; part < parts; part++)
        {
            // The last strip of a plane may be shorter than the others; a tile is always whole.
            var wanted = tiled ? buffer.Length : tiff.VStripSize(Math.Min(rowsPerStrip, height - part % stripsPerPlane * rowsPerStrip));
            var read = tiled ? tiff.ReadEncodedTile(part, buffer, 0, wanted) : tiff.ReadEncodedStrip(part, buffer, 0, wanted);
            if (read != wanted)
            {
                return false;
            }
        }

        return true;
    }

    // Errors come back as return values; the library would print them, too.
    private sealed class Silence : TiffErrorHandler
    {
        public override void ErrorHandler(Tiff tif, string method, string format, params object[] args)
        {
        }

        public override void ErrorHandlerExt(Tiff tif, object clientData, string method, string format, params object[] args)
        {
        }

        public override void WarningHandler(Tiff tif, string method, string format, params object[] args)
        {
        }

        public override void WarningHandlerExt(Tiff tif, object clientData, string method, string format, params object[] args)
        {
        }
    }
}
