using System.Text;

namespace InterfaceFE.Tests.Architecture;

// Types that use another one in one way each: what the reader of assemblies must see.
internal sealed class UsesByBase : StringWriter;

internal sealed class UsesByField
{
    public StringBuilder? Field { get; init; }
}

internal static class UsesByParameter
{
    public static int Of(StringBuilder text) => 1;
}

internal static class UsesByLocal
{
    public static int Length() => new StringBuilder("ab").Length;
}

internal static class UsesByClosure
{
    public static Func<int> Length(string text) => () => new StringBuilder(text).Length;
}

internal static class UsesByTypeArgument
{
    public static object Make() => new List<StringBuilder>();
}

internal static class UsesAfterSwitch
{
    public static int Of(int number)
    {
        switch (number)
        {
            case 0: return 4;
            case 1: return 7;
            case 2: return 1;
            case 3: return 9;
            default: return new StringBuilder("abc").Length;
        }
    }
}
