using Pairwright.Tests.Imaging;
using Xunit;

namespace Pairwright.Tests;

public class Files_appear_whole_or_not_at_all
{
    [Fact]
    public void A_writer_that_fails_half_way_leaves_the_old_file_and_nothing_beside_it()
    {
        using var folder = new TestFolder();
        var path = folder.Write("old.txt", "old");

        Assert.Throws<InvalidOperationException>(() => AtomicFile.Write(path, stream =>
        {
            stream.Write(new byte[100_000]);
            throw new InvalidOperationException("half way");
        }));

        Assert.Equal("old", File.ReadAllText(path));
        Assert.Single(Directory.GetFiles(folder.Root));
    }

    [Fact]
    public async Task A_reader_never_meets_half_a_file()
    {
        using var folder = new TestFolder();
        var path = folder.Path("changing.bin");
        AtomicFile.Write(path, stream => stream.Write(new byte[200_000]));
        using var stop = new CancellationTokenSource();
        var writing = Task.Run(() =>
        {
            while (!stop.IsCancellationRequested)
            {
                AtomicFile.Write(path, stream => stream.Write(new byte[200_000]));
            }
        });

        for (var i = 0; i < 300; i++)
        {
            Assert.Equal(200_000, File.ReadAllBytes(path).Length);
        }

        await stop.CancelAsync();
        await writing;
    }

    [Fact]
    public void A_missing_folder_is_made()
    {
        using var folder = new TestFolder();
        AtomicFile.WriteText(folder.Path("a", "b", "c.txt"), "c");
        Assert.Equal("c", File.ReadAllText(folder.Path("a", "b", "c.txt")));
    }

    [Fact]
    public void A_place_that_cannot_be_written_is_named()
    {
        using var folder = new TestFolder();
        folder.Write("file", "");

        var message = Assert.Throws<UserErrorException>(() => AtomicFile.WriteText(folder.Path("file", "below.txt"), "")).Message;

        Assert.Contains("below.txt", message);
    }
}
