using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class PrintableTests
{
    [Theory]
    [InlineData("plain [red] æøå 日本", "plain [red] æøå 日本")]
    [InlineData("a\u001b[2Jb\r\nc\u0085\u2028\u202ed", "a?[2Jb??c???d")]
    public void Of_text_replaces_what_could_steer_a_terminal(string text, string safe) => Assert.Equal(safe, Printable.Of(text));

    [Fact]
    public void Of_long_text_is_cut_with_a_mark() => Assert.Equal("abc…", Printable.Of("abcdef", 3));

    [Theory]
    [InlineData("a b", "'a b'")]
    [InlineData("it's", "'it'\\''s'")]
    [InlineData("", "''")]
    [InlineData("--out=/tmp/x_1.db", "--out=/tmp/x_1.db")]
    [InlineData("$HOME", "'$HOME'")]
    public void Shell_text_quotes_what_a_shell_would_change(string word, string typed) => Assert.Equal(typed, ShellText.Of([word]));
}
