using System.Globalization;
using System.Text;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// The mixed book under a model of every kind, from a history to figures and fitted parameters, to the last bit: the same on any hardware and any number
/// of threads. Host.Tests runs this class under every hardware setting.
/// </summary>
public sealed class ModelBitsTests
{
    // A hash may change only together with the numerics epoch.
    public static TheoryData<string, string> Pinned => new()
    {
        { "lognormal", "cd4604cbad91d89bc35bac52d3eeb7267eb948c654c7e9377686dd0d1dfeca95" },
        { "shrunk", "b4f865db102575ccb280684070fd5cccf2142ac128b6a0a93876fcfc3bdba14b" },
        { "pairwise", "326b1fd53c062d138495f9fb1fe6937244b80456a7f620b97ed44014ddefaec4" },
        { "student-given", "04ca2bba3b950afdbb0c117dad6e756e9b942d5e91a23baaab844c8660838ec2" },
        { "student-fitted", "e5854a323657d016cb88fbaeec4d69b51d920c926085432e21937824d2ec8201" },
        { "student-own", "0806bfcd8fe632842f9205808ae2fd42e2a1685630c5f9e9b5f03c2783c34366" },
        { "historical", "2e934d4125055b77705b42bd6545913b84806c3f242740073ab3183e2ac18ba3" },
        { "historical-aged", "29fa61b2b564fb98bdc05827f94ba6bceb487769ca1187a88c20f67deb280a19" },
        { "filtered", "0375eb8869679f84f63e1c886b81489af8aebf3ad9f71f48d4fb90a39cf40a45" },
        { "filtered-garch", "87b5b81f3c9bec5b792cbe31917ab1bff27ec50f98c576f1bb9a15e83ebcd705" },
        { "jumps-found", "0e4a7682890ecdc4c6e995582321fa310559744d223397679dc214d04e6ac03a" },
        { "jumps-given", "60c236eb032bf8ad28db700070ef96318610dd2b38c762fa598681060337746f" },
        { "stressed", "17cc5209e898f4ecf30c30a88f4b206cbbb4a2774980f9a4039dc385d789821a" },
    };

    [Theory]
    [MemberData(nameof(Pinned))]
    public void Figures_and_parameters_are_pinned_on_one_thread_and_on_seven(string model, string pinned)
    {
        var (one, seven) = (Calculated(model, 1), Calculated(model, 7));
        Assert.Equal(Hash(one), Hash(seven));
        Assert.True(pinned == Hash(one), $"{{ \"{model}\", \"{Hash(one)}\" }},");
    }

    [Fact]
    public void Every_model_is_pinned_and_no_two_are_alike()
    {
        Assert.Equal(MixedHistory.Models.Keys.Order(), Pinned.Select(p => p.Data.Item1).Order());
        Assert.Equal(Pinned.Count, Pinned.Select(p => p.Data.Item2).Distinct().Count());
    }

    private static RunResults Calculated(string model, int threads)
    {
        var results = new RunCalculator(MixedHistory.Of(model), threads, null, CancellationToken.None).Calculate();
        Assert.DoesNotContain(results.Findings, f => f.Severity == FindingSeverity.Blocking);
        Assert.Equal(4, results.Nodes.Count);
        return results;
    }

    private static string Hash(RunResults results)
    {
        var text = new StringBuilder(FiguresHash.Of(results)).Append('\n');
        foreach (var parameter in results.Calibration!.Parameters)
            text.Append(CultureInfo.InvariantCulture, $"{parameter.Name} {Bits(parameter.Value)} {Bits(parameter.Low)} {Bits(parameter.High)}\n");
        return SnapshotHash.OfText(text.ToString());
    }

    private static string Bits(double? value) => value is { } number ? BitConverter.DoubleToUInt64Bits(number).ToString("x16", CultureInfo.InvariantCulture) : "-";
}
