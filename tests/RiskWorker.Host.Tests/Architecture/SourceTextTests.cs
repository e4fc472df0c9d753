namespace RiskWorker.Host.Tests.Architecture;

public sealed class SourceTextTests
{
    [Theory]
    [InlineData("a; // Math.Exp\nb", "a;  \nb")]
    [InlineData("a /* Math.Exp\n */ b", "a   b")]
    [InlineData("x = \"Math.Exp \\\" Math.Log\" + y", "x =   + y")]
    [InlineData("x = @\"a\\\" + y", "x =   + y")]
    [InlineData("c = '\"' + Math.Exp(1)", "c =   + Math.Exp(1)")]
    [InlineData("/// <summary>Math.Exp</summary>\nMath.Log(2)", " \nMath.Log(2)")]
    public void CodeOf_comments_and_literals_blanks_them_alone(string source, string code) => Assert.Equal(code, SourceText.CodeOf(source));
}
