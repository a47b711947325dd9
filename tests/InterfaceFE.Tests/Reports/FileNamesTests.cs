using InterfaceFE.Reports;
using Xunit;

namespace InterfaceFE.Tests.Reports;

public class FileNamesTests
{
    [Theory]
    [InlineData("crown", "crown")]
    [InlineData("upper block", "upper-block")]
    [InlineData("a/b\\c:d*e?", "a-b-c-d-e")]
    [InlineData("../../etc", "etc")]
    [InlineData("Öse groß", "Ose-gross")]
    [InlineData("К1", "u41a1")]
    [InlineData("...", "x")]
    [InlineData("", "x")]
    public void Names_become_safe(string name, string safe) => Assert.Equal(safe, FileNames.Safe(name));

    [Fact]
    public void Names_that_fall_together_are_told_apart_even_without_case() =>
        Assert.Equal(["a-b", "a-b-2", "A-B-3"], FileNames.Safe(["a b", "a/b", "A B"]));

    [Fact]
    public void Very_long_names_are_cut() => Assert.True(FileNames.Safe(new string('a', 500)).Length < 100);
}
