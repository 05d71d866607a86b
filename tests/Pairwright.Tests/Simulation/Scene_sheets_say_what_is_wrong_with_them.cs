using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Simulation;

public class Scene_sheets_say_what_is_wrong_with_them
{
    [Theory]
    [InlineData("kind: pairwright-scene\nversion: 1\nlengths: mm\nregions:\n  - name: a\n    outline:\n      - [1, 2]\n      - [3, 4]\n", "at least three")]
    [InlineData("kind: pairwright-scene\nversion: 9\nlengths: mm\nregions: []\n", "newer")]
    [InlineData("kind: pairwright-scene\nversion: 1\nlengths: mm\nregions:\n  - name: a\n    outline: [[1, 2], [3, 4], [5, x]]\n", "'x'")]
    [InlineData("kind: pairwright-scene\nversion: 1\nlengths: mm\nregions:\n  - name: a\n    outline: [[1, 2], [3, 4], [5, 6]]\n    values: {cup: wide}\n", "'wide'")]
    public void A_wrong_entry_is_named_with_its_file(string content, string said)
    {
        var path = Path.Combine(Path.GetTempPath(), $"{Guid.NewGuid():N}.yaml");
        try
        {
            File.WriteAllText(path, content);
            var mistake = Assert.Throws<UserErrorException>(() => SceneSheet.Read(path));
            Assert.Contains(path, mistake.Message);
            Assert.Contains(said, mistake.Message);
        }
        finally
        {
            File.Delete(path);
        }
    }
}
