using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Tests.Basis;

public class RootFindingTests
{
    [Theory]
    [InlineData(1e-5)]
    [InlineData(0.3)]
    [InlineData(7)]
    public void ARootIsExactWhateverTheSizeOfTheFunction(double root)
    {
        foreach (var size in new[] { 1e-25, 1, 1e25 })
        {
            Assert.Equal(root, RootFinding.Bracketed(x => size * ((x * x * x) - (root * root * root)), 1e-9, 10), root * 1e-9);
            Assert.Equal(root, RootFinding.Bracketed(x => size * (root - x), 1e-9, 10), root * 1e-9);
        }
    }

    [Fact]
    public void NoChangeOfSignIsAnError() => Assert.Throws<InvalidOperationException>(() => RootFinding.Bracketed(x => x + 1, 0, 1));
}
