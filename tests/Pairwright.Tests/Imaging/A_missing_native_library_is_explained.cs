using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class A_missing_native_library_is_explained
{
    // The loader's words as .NET gives them on Linux.
    [Fact]
    public void A_missing_system_library_is_named_with_the_package_to_install()
    {
        var fault = new TypeInitializationException("OpenCvSharp.Internal.NativeMethods", new DllNotFoundException(
            "Unable to load shared library 'OpenCvSharpExtern' or one of its dependencies.\n/x/libOpenCvSharpExtern.so: cannot open shared object file\nlibgtk-3.so.0: cannot open shared object file: No such file or directory"));

        var explained = OpenCvLibrary.Explain(fault)!;

        Assert.Contains("libgtk-3.so.0 is missing", explained.Message);
        Assert.Contains("libgtk-3-0", explained.Message);
        Assert.DoesNotContain("\n", explained.Message);
    }

    [Fact]
    public void Another_fault_is_not_explained_away() => Assert.Null(OpenCvLibrary.Explain(new InvalidOperationException("no")));

    [Fact]
    public void Here_the_library_is_there() => Assert.StartsWith("4.", OpenCvLibrary.Version);
}
