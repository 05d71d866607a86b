using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Pictures_of_real_boards_are_read
{
    // Source: Debian's package opencv-doc, 13 left/right board captures of 640 × 480 px.
    [SkippableFact]
    public void A_folder_of_thirteen_board_captures_gives_thirteen_pairs_in_order()
    {
        var pairs = StereoPair.ReadFolder(OpenData.Boards);

        Assert.Equal(["01", "02", "03", "04", "05", "06", "07", "08", "09", "11", "12", "13", "14"], pairs.Select(pair => pair.Name));
        Assert.All(pairs, pair => Assert.Equal("640 × 480", pair.Left.Size.ToString()));
    }
}
