using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>
/// Marks a member of a deck record with its key, its meaning and its bounds. Reader, JSON Schema, deck reference and error texts are all made from it.
/// A member is required unless its type is nullable or <see cref="Default"/> is set.
/// </summary>
/// <param name="name">The key as written in the deck: lower case, spaces allowed.</param>
/// <param name="meaning">One sentence for the deck reference: what it is and, where it helps, a typical value.</param>
[AttributeUsage(AttributeTargets.Property)]
public sealed class KeyAttribute(string name, string meaning) : Attribute
{
    /// <summary>The key as written in the deck.</summary>
    public string Name { get; } = name;

    /// <summary>What the key means.</summary>
    public string Meaning { get; } = meaning;

    /// <summary>Dimension of the number or of each number of the list.</summary>
    public Dimension Dimension { get; init; }

    /// <summary>A valid value as it would be written, shown in errors and in the reference.</summary>
    public string? Example { get; init; }

    /// <summary>The value that holds when the key is left out, as it would be written; null: see the type.</summary>
    public string? Default { get; init; }

    /// <summary>The value must be greater than this, in internal units.</summary>
    public double Above { get; init; } = double.NegativeInfinity;

    /// <summary>The value must be less than this, in internal units.</summary>
    public double Below { get; init; } = double.PositiveInfinity;

    /// <summary>The value must be at least this, in internal units.</summary>
    public double AtLeast { get; init; } = double.NegativeInfinity;

    /// <summary>The value must be at most this, in internal units.</summary>
    public double AtMost { get; init; } = double.PositiveInfinity;

    /// <summary>Least number of entries of a list or a map.</summary>
    public int LeastCount { get; init; }

    /// <summary>Largest number of entries of a list or a map.</summary>
    public int MostCount { get; init; } = int.MaxValue;

    /// <summary>Whether entries of this key may come from an included file.</summary>
    public bool MayBeIncluded { get; init; }
}

/// <summary>The word by which a deck calls a value of an enumeration.</summary>
/// <param name="text">The word or words, lower case.</param>
/// <param name="meaning">One sentence for the deck reference.</param>
[AttributeUsage(AttributeTargets.Field)]
public sealed class WordAttribute(string text, string meaning) : Attribute
{
    /// <summary>The word or words as written.</summary>
    public string Text { get; } = text;

    /// <summary>What it means.</summary>
    public string Meaning { get; } = meaning;
}

/// <summary>One sentence on a deck record as a whole, for the deck reference.</summary>
/// <param name="meaning">What the block describes.</param>
[AttributeUsage(AttributeTargets.Class)]
public sealed class BlockAttribute(string meaning) : Attribute
{
    /// <summary>What the block describes.</summary>
    public string Meaning { get; } = meaning;
}

/// <summary>Says which words, keys or values a later version will take; a deck that uses one is told so instead of being misread.</summary>
/// <param name="key">The key that is refused, or the key whose value is refused.</param>
/// <param name="value">The refused word, or null when the key itself is refused.</param>
[AttributeUsage(AttributeTargets.Class, AllowMultiple = true)]
public sealed class NotBuiltYetAttribute(string key, string? value = null) : Attribute
{
    /// <summary>The key concerned.</summary>
    public string Key { get; } = key;

    /// <summary>The refused word, or null when the key itself is refused.</summary>
    public string? Value { get; } = value;
}
