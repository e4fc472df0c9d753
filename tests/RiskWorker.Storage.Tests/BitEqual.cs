using System.Collections;
using System.Reflection;

namespace RiskWorker.Storage.Tests;

/// <summary>Compares two object graphs property by property, doubles by their bits.</summary>
internal static class BitEqual
{
    public static void Assert(object? expected, object? actual, string path = "")
    {
        if (expected is null || actual is null)
        {
            Xunit.Assert.True(expected is null && actual is null, $"{path}: {expected ?? "null"} against {actual ?? "null"}");
            return;
        }
        switch (expected)
        {
            case double number:
                Xunit.Assert.True(BitConverter.DoubleToInt64Bits(number) == BitConverter.DoubleToInt64Bits((double)actual), $"{path}: {number:R} against {actual:R}");
                break;
            case string or DateOnly or DateTimeOffset or decimal or Enum:
            case var plain when plain.GetType().IsPrimitive:
                Xunit.Assert.True(expected.Equals(actual), $"{path}: {expected} against {actual}");
                break;
            case IEnumerable list:
                var (left, right) = (list.Cast<object?>().ToArray(), ((IEnumerable)actual).Cast<object?>().ToArray());
                Xunit.Assert.True(left.Length == right.Length, $"{path}: {left.Length} items against {right.Length}");
                for (var i = 0; i < left.Length; i++) Assert(left[i], right[i], $"{path}[{i}]");
                break;
            default:
                Xunit.Assert.Equal(expected.GetType(), actual.GetType());
                foreach (var property in expected.GetType().GetProperties(BindingFlags.Public | BindingFlags.Instance))
                    Assert(property.GetValue(expected), property.GetValue(actual), $"{path}.{property.Name}");
                break;
        }
    }
}
