using System.Globalization;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Numerics.Tests.Random;

public sealed class PhiloxTests
{
    public static TheoryData<string, string, string, string> KnownAnswers()
    {
        var data = new TheoryData<string, string, string, string>();
        foreach (string[] row in Table.Rows("philox-vectors.csv"))
            data.Add(row[0], row[3], row[4], row[5]);
        return data;
    }

    // Source: Random123 tests/kat_vectors and an independent implementation that reproduces them (Data/README.md).
    [Theory]
    [MemberData(nameof(KnownAnswers))]
    public void Block_known_answer_is_reproduced(string id, string counter, string key, string expected)
    {
        uint[] c = Words(counter), k = Words(key), e = Words(expected);
        Assert.Equal((e[0], e[1], e[2], e[3]), Philox4x32.Block((c[0], c[1], c[2], c[3]), (k[0], k[1])));
        Assert.NotEmpty(id);
    }

    [Fact]
    public void Known_answers_are_all_there() => Assert.Equal(31, KnownAnswers().Count);

    private static uint[] Words(string text) =>
        [.. text.Split(' ').Select(word => uint.Parse(word, NumberStyles.HexNumber, CultureInfo.InvariantCulture))];
}
