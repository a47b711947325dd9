using System.Reflection;

namespace InterfaceFE.Validation.Framework;

/// <summary>Finds the cases of an assembly.</summary>
public static class CaseFinder
{
    /// <summary>All cases of an assembly, by group, then by name.</summary>
    /// <exception cref="InvalidOperationException">Two cases share a name.</exception>
    public static IReadOnlyList<ICase> In(Assembly assembly)
    {
        ArgumentNullException.ThrowIfNull(assembly);
        ICase[] cases =
        [
            .. assembly.GetTypes().Where(t => t is { IsAbstract: false, IsInterface: false } && t.IsAssignableTo(typeof(ICase)) && t.GetConstructor(Type.EmptyTypes) is not null)
                .Select(t => (ICase)Activator.CreateInstance(t)!).OrderBy(c => c.Group, StringComparer.Ordinal).ThenBy(c => c.Name, StringComparer.Ordinal),
        ];
        if (cases.GroupBy(c => c.Name).FirstOrDefault(g => g.Count() > 1) is { } twice)
            throw new InvalidOperationException($"two cases are called {twice.Key}");
        return cases;
    }
}
