namespace GeoCulvert.Report.Tests;

public sealed class HtmlTextTests
{
    [Theory]
    [InlineData("<script>alert(1)</script>", "&lt;script&gt;alert(1)&lt;/script&gt;")]
    [InlineData("\" onload='x' &amp;", "&quot; onload=&#39;x&#39; &amp;amp;")]
    [InlineData("a\u202Egnp.exe\u2066b", "a\uFFFDgnp.exe\uFFFDb")]
    [InlineData("nul\0 esc\u001b bell\u0007 c1\u0085", "nul\uFFFD esc\uFFFD bell\uFFFD c1\uFFFD")]
    [InlineData("tab\tline\r\n", "tab line  ")]
    [InlineData("\uD83C\uDF0A \u05e9\u05dc\u05d5\u05dd", "\uD83C\uDF0A \u05e9\u05dc\u05d5\u05dd")]
    [InlineData(null, "")]
    public void TextStaysText(string? text, string expected) => Assert.Equal(expected, HtmlText.Escape(text));

    [Fact]
    public void LoneSurrogatesAreReplaced() => Assert.Equal("\uFFFDx\uFFFD", HtmlText.Escape("\uD800x\uDC00"));

    [Fact]
    public void CssStringsCannotBeLeft() => Assert.Equal("\"a\\22 \\3b \\7d \\3c \\2f style\\3e \\fffd 1\"", HtmlText.CssString("a\";}</style>\n1"));

    [Fact]
    public void ShorteningKeepsSurrogatePairsWhole()
    {
        Assert.Equal("ab\u2026", HtmlText.Shorten("abcd", 3));
        Assert.Equal("a\u2026", HtmlText.Shorten("a\uD83C\uDF0Abc", 3));
        Assert.Equal("abc", HtmlText.Shorten("abc", 3));
    }
}
