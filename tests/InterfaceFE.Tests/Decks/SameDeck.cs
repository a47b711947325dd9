using System.Collections;
using System.Reflection;
using Xunit;

namespace InterfaceFE.Tests.Decks;

/// <summary>Compares decks by their values: records of lists and maps are equal only by reference.</summary>
internal static class SameDeck
{
    public static void Check(object? expected, object? actual, string path = "deck")
    {
        if (expected is null || actual is null || expected is string || expected.GetType().IsValueType && expected is not IEnumerable)
        {
            if (expected?.GetType() is { IsGenericType: true } type && type.GetGenericTypeDefinition() == typeof(KeyValuePair<,>))
                CheckMembers(expected, actual, path);
            else
                Assert.True(Equals(expected, actual), $"{path}: expected {expected}, got {actual}");
        }
        else if (expected is IEnumerable list)
        {
            object[] first = [.. list.Cast<object>()];
            object[] second = [.. ((IEnumerable)actual).Cast<object>()];
            Assert.True(first.Length == second.Length, $"{path}: {first.Length} entries, got {second.Length}");
            for (int i = 0; i < first.Length; i++)
                Check(first[i], second[i], $"{path}.{i + 1}");
        }
        else
            CheckMembers(expected, actual, path);
    }

    private static void CheckMembers(object expected, object? actual, string path)
    {
        foreach (PropertyInfo property in expected.GetType().GetProperties(BindingFlags.Public | BindingFlags.Instance).Where(p => p.GetIndexParameters().Length == 0))
            Check(property.GetValue(expected), property.GetValue(actual), path + "." + property.Name);
    }
}
