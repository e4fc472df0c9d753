using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>
/// The suite runs once for each setting under which no bit may move; RISKWORKER_EXPECT names the setting, and these tests say
/// whether it took effect. Without it only the arithmetic is tested.
/// </summary>
public sealed class HardwareSettingTests
{
    private const string Variable = "RISKWORKER_EXPECT";

    private static string? Expected => Environment.GetEnvironmentVariable(Variable);

    private static bool HasAvx512 => Has("avx512f", "avx512bw", "avx512cd", "avx512dq", "avx512vl");

    [Fact]
    public void Setting_named_by_the_environment_took_effect()
    {
        switch (Expected)
        {
            case null:
                break;
            case "default":
                AssertHardware(HasAvx512, Has("avx2"), Has("fma"), any: true);
                Assert.Equal(!Has("fma"), CLibraryGoesWithoutFma());
                break;
            case "avx512-off":
                AssertHardware(avx512: false, Has("avx2"), Has("fma"), any: true);
                break;
            case "avx2-off":
                AssertHardware(avx512: false, avx2: false, fma: false, any: true);
                break;
            case "intrinsics-off":
                AssertHardware(avx512: false, avx2: false, fma: false, any: false);
                break;
            case "no-fma-libc":
                AssertHardware(HasAvx512, Has("avx2"), Has("fma"), any: true);
                Assert.True(CLibraryGoesWithoutFma(), "The C library still uses its FMA variants, or its exp has changed.");
                break;
            default:
                Assert.Fail($"{Variable} is '{Expected}'; it must be default, avx512-off, avx2-off, intrinsics-off or no-fma-libc.");
                break;
        }
    }

    // (1 + 2^-52)(1 - 2^-52) - 1 = -2^-104: 0 if the product were rounded first. Also where no instruction does it.
    [Fact]
    public void FusedMultiplyAdd_rounds_once_in_every_form()
    {
        double a = 1 + Math.ScaleB(1, -52), b = 1 - Math.ScaleB(1, -52), expected = -Math.ScaleB(1, -104);
        Assert.Equal(expected, Math.FusedMultiplyAdd(a, b, -1));
        Assert.Equal(
            Vector512.Create(expected),
            Vector512.FusedMultiplyAdd(Vector512.Create(a), Vector512.Create(b), Vector512.Create(-1.0)));
    }

    // What the processor has of its own; a machine that has less than AVX-512 proves less, and passes.
    private static bool Has(params string[] flags) => flags.All(
        File.ReadLines("/proc/cpuinfo").First(line => line.StartsWith("flags", StringComparison.Ordinal)).Split(' ').Contains);

    private static void AssertHardware(bool avx512, bool avx2, bool fma, bool any)
    {
        Assert.Equal(avx512, Avx512F.IsSupported);
        // Some processors have AVX-512 and are the slower for it: there the runtime does not count it as acceleration.
        Assert.True(avx512 || !Vector512.IsHardwareAccelerated);
        Assert.Equal(avx2, Avx2.IsSupported);
        Assert.Equal(fma, Fma.IsSupported);
        Assert.Equal(any, Vector128.IsHardwareAccelerated);
    }

    // Three arguments at which the exp of the GNU C library 2.28 and later rounds the other way without FMA.
    private static bool CLibraryGoesWithoutFma() =>
        Math.Exp(7.8345289004743925) == BitConverter.UInt64BitsToDouble(0x40A3BCB0ACE2C25A)
        && Math.Exp(5.2438255394967435) == BitConverter.UInt64BitsToDouble(0x4067AC9580532076)
        && Math.Exp(6.923559594792724) == BitConverter.UInt64BitsToDouble(0x408FBF705CD22050);
}
