using System.Collections.Concurrent;
using System.Reflection;
using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>How the value of a key is written.</summary>
internal enum ValueKind
{
    /// <summary>Free text or a name.</summary>
    Text,

    /// <summary>A number, with its unit where it has a dimension.</summary>
    Number,

    /// <summary>A whole number.</summary>
    WholeNumber,

    /// <summary>One of a few words.</summary>
    Word,

    /// <summary>A block with keys of its own.</summary>
    Block,

    /// <summary>A list.</summary>
    List,

    /// <summary>Entries by name.</summary>
    Map,

    /// <summary>A number, or numbers by direction {x, y, z}.</summary>
    Directional,

    /// <summary>A number, or numbers {xy, xz, zy}.</summary>
    PoissonRatios,

    /// <summary>start, middle, end, or a length.</summary>
    EdgePoint,

    /// <summary>"every N points" or "none".</summary>
    FieldInterval,
}

/// <summary>Type of a value: its kind, and the type of its entries or of its block.</summary>
/// <param name="Kind">How it is written.</param>
/// <param name="Type">The type in the record, nullability taken off.</param>
/// <param name="Entry">Type of an entry of a list or a map, else null.</param>
internal sealed record ValueShape(ValueKind Kind, Type Type, ValueShape? Entry)
{
    /// <summary>Whether one entry alone may be written without the brackets of a list.</summary>
    public bool MayBeSingle => Kind == ValueKind.List && Entry!.Kind is ValueKind.Text or ValueKind.Word;

    /// <summary>Whether this is a point [x, y]: a list of numbers within a list.</summary>
    public bool IsListOfPoints => Kind == ValueKind.List && Entry!.Kind == ValueKind.List && Entry.Entry!.Kind == ValueKind.Number;
}

/// <summary>A key of a deck record.</summary>
/// <param name="Property">Where the value is kept.</param>
/// <param name="Key">Name, meaning, bounds.</param>
/// <param name="Value">Type of the value.</param>
/// <param name="IsRequired">Whether it must be given.</param>
internal sealed record KeyShape(PropertyInfo Property, KeyAttribute Key, ValueShape Value, bool IsRequired)
{
    /// <summary>The key as written.</summary>
    public string Name => Key.Name;
}

/// <summary>A word of an enumeration.</summary>
/// <param name="Value">The value.</param>
/// <param name="Text">The word.</param>
/// <param name="Meaning">What it means.</param>
internal sealed record WordShape(object Value, string Text, string Meaning);

/// <summary>
/// The keys of a deck record, found by reflection over its attributes. Reader, writer, schema and reference all use this and know no key by themselves.
/// Immutable, safe to share between threads.
/// </summary>
internal sealed class DeckShape
{
    private static readonly ConcurrentDictionary<Type, DeckShape> Shapes = new();
    private static readonly ConcurrentDictionary<Type, IReadOnlyList<WordShape>> WordLists = new();

    private DeckShape(Type type)
    {
        Type = type;
        Meaning = type.GetCustomAttribute<BlockAttribute>()?.Meaning ?? throw new ArgumentException($"{type} is no deck record: it has no BlockAttribute.", nameof(type));
        NotBuiltYet = [.. type.GetCustomAttributes<NotBuiltYetAttribute>()];
        NullabilityInfoContext nullability = new();
        foreach (PropertyInfo property in type.GetProperties(BindingFlags.Public | BindingFlags.Instance))
        {
            if (property.GetCustomAttribute<KeyAttribute>() is not { } key)
                continue;
            bool isNullable = Nullable.GetUnderlyingType(property.PropertyType) is not null || nullability.Create(property).ReadState == NullabilityState.Nullable;
            Keys.Add(new KeyShape(property, key, ValueOf(property.PropertyType), !isNullable && key.Default is null));
        }
    }

    /// <summary>The record.</summary>
    public Type Type { get; }

    /// <summary>What the block describes.</summary>
    public string Meaning { get; }

    /// <summary>Keys in the order of the record.</summary>
    public List<KeyShape> Keys { get; } = [];

    /// <summary>What a later version will take.</summary>
    public IReadOnlyList<NotBuiltYetAttribute> NotBuiltYet { get; }

    /// <summary>The shape of a deck record.</summary>
    public static DeckShape Of(Type type) => Shapes.GetOrAdd(type, static t => new DeckShape(t));

    /// <summary>The key of a name, or null.</summary>
    public KeyShape? Find(string name) => Keys.Find(k => k.Name == name);

    /// <summary>Words of an enumeration, in order.</summary>
    public static IReadOnlyList<WordShape> WordsOf(Type type) => WordLists.GetOrAdd(type, static t =>
    [
        .. t.GetFields(BindingFlags.Public | BindingFlags.Static).Select(f =>
        {
            WordAttribute word = f.GetCustomAttribute<WordAttribute>() ?? throw new ArgumentException($"{t}.{f.Name} has no WordAttribute.");
            return new WordShape(f.GetValue(null)!, word.Text, word.Meaning);
        }),
    ]);

    /// <summary>All deck records from the deck down, each once, in the order of reading.</summary>
    public static IReadOnlyList<DeckShape> All()
    {
        List<DeckShape> found = [];
        Collect(Of(typeof(Deck)), found);
        return found;
    }

    private static void Collect(DeckShape shape, List<DeckShape> found)
    {
        if (found.Contains(shape))
            return;
        found.Add(shape);
        foreach (KeyShape key in shape.Keys)
            for (ValueShape? value = key.Value; value is not null; value = value.Entry)
                if (value.Kind == ValueKind.Block)
                    Collect(Of(value.Type), found);
    }

    private static ValueShape ValueOf(Type declared)
    {
        Type type = Nullable.GetUnderlyingType(declared) ?? declared;
        if (type.IsGenericType)
        {
            Type form = type.GetGenericTypeDefinition();
            Type[] of = type.GetGenericArguments();
            if (form == typeof(IReadOnlyList<>))
                return new ValueShape(ValueKind.List, type, ValueOf(of[0]));
            if (form == typeof(IReadOnlyDictionary<,>) && of[0] == typeof(string))
                return new ValueShape(ValueKind.Map, type, ValueOf(of[1]));
        }
        ValueKind kind = true switch
        {
            _ when type == typeof(string) => ValueKind.Text,
            _ when type == typeof(double) => ValueKind.Number,
            _ when type == typeof(int) => ValueKind.WholeNumber,
            _ when type.IsEnum => ValueKind.Word,
            _ when type == typeof(Directional) => ValueKind.Directional,
            _ when type == typeof(PoissonRatios) => ValueKind.PoissonRatios,
            _ when type == typeof(EdgePoint) => ValueKind.EdgePoint,
            _ when type == typeof(FieldInterval) => ValueKind.FieldInterval,
            _ when type.GetCustomAttribute<BlockAttribute>() is not null => ValueKind.Block,
            _ => throw new ArgumentException($"Deck records hold no {declared}.", nameof(declared)),
        };
        return new ValueShape(kind, type, null);
    }
}
