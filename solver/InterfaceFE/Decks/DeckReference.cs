using System.Globalization;
using System.Text;
using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>Writes the deck reference in Markdown from the records: a worked example, how values are written, then each block with its keys.</summary>
public static class DeckReference
{
    /// <summary>The deck with which the reference starts; a complete deck.</summary>
    public static string Example { get; } = """
        # Two aluminium flats, bonded by a foam tape, are pulled open at their left ends. All data invented.
        title: Two flats and a tape, opened at one end
        model: {width: 25 mm, rotation: small}

        materials:
          aluminium: {young: 70 GPa, poisson: 0.33}

        layers:
          tape:
            thickness: 1.1 mm
            peel:  {law: trapezoid, stiffness: 2 MPa/mm, strength: 0.5 MPa, toughness: 1.6 kJ/m^2}
            shear: {law: trapezoid, stiffness: 1.5 MPa/mm, strength: 0.45 MPa, toughness: 2.0 kJ/m^2}
            mixing: independent modes

        adherends:
          upper arm: {of: aluminium, rectangle: {corner: [0 mm, 12 mm], size: [300 mm, 12 mm]}}
          lower arm: {of: aluminium, rectangle: {corner: [0 mm, 0 mm], size: [300 mm, 12 mm]}}

        joints:
          bond: {layer: tape, upper: bottom of upper arm, lower: top of lower arm, starter crack: {from: start, length: 60 mm}}

        grips:
          upper pin: {on: left end of upper arm, at: middle}
          lower pin: {on: left end of lower arm, at: middle}

        sequence:
          - fix: {lower pin: [x, y], upper pin: [x]}
          - pull: {grip: upper pin, along: +y, travel: 10 mm, speed: 2 mm/min}

        keep: {curves of: [upper pin], fields: every 10 points}
        """.ReplaceLineEndings("\n") + "\n";

    /// <summary>The reference as Markdown, lines ended by \n.</summary>
    public static string Write()
    {
        StringBuilder text = new();
        text.Append(Introduction).Append("```yaml\n").Append(Example).Append("```\n\n").Append(HowToWrite());
        IReadOnlyList<DeckShape> shapes = DeckShape.All();
        text.Append("## Overview\n\n").Append(Overview()).Append("\n## All keys\n\n");
        text.Append("**Bold** keys must be given. \"-\" under default means that the key may be left out; the text then says what happens.\n\n");
        foreach (DeckShape shape in shapes)
            AppendBlock(text, shape);
        AppendNotBuiltYet(text, shapes);
        return text.ToString().ReplaceLineEndings("\n");
    }

    private const string Introduction = """
        # Deck reference

        A deck is a text file in YAML that describes one specimen or joint: what it is made of, how it is bonded, held and loaded, and what to keep.
        This page is written by `interfacefe deck-reference` from the program's own records, so it cannot differ from what the program reads.

        A simulation is no proof of strength: laws scatter with rate, temperature, humidity, surface treatment and ageing. Verify by test; the design is the
        responsibility of a qualified engineer under the applicable codes.

        ## A first deck


        """;

    private static string HowToWrite() => $"""
        `interfacefe check DECK` reads a deck and lists everything that is wrong with it at once, each with file, line, column and what would be right. Nothing is guessed or
        ignored: an unknown key, a key given twice, a missing unit or a value out of range is an error.

        ## How values are written

        **Keys and words** are lower case and may hold spaces. A block can stand on lines of its own, indented with spaces, or in one line in `{"{braces}"}`; a list in `[brackets]` or
        line by line after `- `. Where a list has a single entry, the brackets may be left out.

        **Numbers with a dimension carry their unit**: `1.1 mm`, `70 GPa`, `2.0 kJ/m^2`, `23e-6 1/K`, `2 mm/min`. A bare number is only for what has no dimension, such as Poisson's ratio;
        it may be written in per cent (`5 %`). The decimal sign is a point, and there is none for thousands.

        | quantity | calculated in | example |
        | --- | --- | --- |
        {string.Join("\n", Enum.GetValues<Dimension>().Where(d => d != Dimension.None).Select(d => $"| {WithoutArticle(DimensionText.Words(d))} | {(d == Dimension.Temperature ? "K, written in °C" : DimensionText.Unit(d))} | `{DimensionText.Example(d)}` |"))}

        Units are made of {string.Join(", ", UnitTable.Names.Select(n => $"`{n}`"))} by `*` or `·`, `/`, powers (`^2`, `²`, `³`) and brackets; upper and lower case differ (`MPa`, `mm`, `kN`).
        **A temperature is in °C, a difference of temperature in K**: `°C` is never a difference and `K` never a temperature.

        **Names** of materials, layers, adherends, joints, grips and gauges are yours: letters, digits, spaces and - _ . + ( ) ', starting with a letter or digit.

        ## Edges, positions and signs

        - x runs to the right, y upwards, z out of the plane. Forces are those of the whole specimen at its full width.
        - An edge is written `EDGE of ADHEREND`. A rectangle has the edges {Listed(EdgeText.RectangleEdges)}; a sheet has {Listed(EdgeText.SheetEdges)} and the names given under
          `stretches`. The `line` of a sheet is its mid-line, drawn from its left end.
        - A joint starts at the lower x of its lower face; positions along it are lengths of the undeformed lower face from there.
        - A force counts positive along its grip's pull, an opening positive apart, a sliding positive when the upper face moves towards +x, an angle positive counter-clockwise.
        - Displacements count from the stress-free state; `counted from` affects only how far a stage goes.

        ## Files that a deck includes

        `include: [materials.yaml]` brings in the `materials` and `layers` of other files; they hold nothing else and include no further files. A file is looked for in the deck's folder, then,
        when the deck lies below a folder called `inputs`, in each folder from there up to `inputs`; nothing outside is opened. A name that is given twice is an error.


        """;

    private static string Overview()
    {
        StringBuilder text = new("| block | what it is for |\n| --- | --- |\n");
        foreach (KeyShape key in DeckShape.Of(typeof(Deck)).Keys)
            text.Append(CultureInfo.InvariantCulture, $"| {(key.IsRequired ? $"**{key.Name}**" : key.Name)} | {Cell(key.Key.Meaning)} |\n");
        return text.ToString();
    }

    private static void AppendBlock(StringBuilder text, DeckShape shape)
    {
        text.Append(CultureInfo.InvariantCulture, $"### {HeadingOf(shape)}\n\n{shape.Meaning}\n\n| key | what it is | value | default | example |\n| --- | --- | --- | --- | --- |\n");
        foreach (KeyShape key in shape.Keys)
        {
            string name = key.IsRequired ? $"**{key.Name}**" : key.Name;
            string unset = key.IsRequired ? "" : key.Key.Default is null ? "-" : $"`{key.Key.Default}`";
            string example = key.Key.Example is null ? "" : $"`{key.Name}: {key.Key.Example}`";
            text.Append(CultureInfo.InvariantCulture, $"| {name} | {Cell(key.Key.Meaning)} | {Cell(ValueInWords(key.Value, key.Key))} | {unset} | {Cell(example)} |\n");
        }
        text.Append('\n');
        foreach (KeyShape key in shape.Keys)
            AppendWords(text, key);
    }

    private static void AppendWords(StringBuilder text, KeyShape key)
    {
        ValueShape? value = key.Value;
        while (value?.Entry is not null)
            value = value.Entry;
        if (value!.Kind != ValueKind.Word)
            return;
        text.Append(CultureInfo.InvariantCulture, $"Words of `{key.Name}`:\n\n");
        foreach (WordShape word in DeckShape.WordsOf(value.Type))
            text.Append(CultureInfo.InvariantCulture, $"- `{word.Text}`: {word.Meaning}\n");
        text.Append('\n');
    }

    private static void AppendNotBuiltYet(StringBuilder text, IReadOnlyList<DeckShape> shapes)
    {
        text.Append("## Not built yet\n\nThese are meant for later versions. A deck that uses one is told so instead of being calculated without it.\n\n");
        foreach (DeckShape shape in shapes)
            foreach (NotBuiltYetAttribute later in shape.NotBuiltYet)
                text.Append(CultureInfo.InvariantCulture, $"- `{later.Key}{(later.Value is null ? "" : $": {later.Value}")}` ({HeadingOf(shape)})\n");
    }

    private static string ValueInWords(ValueShape shape, KeyAttribute key) => shape.Kind switch
    {
        ValueKind.Text => "text",
        ValueKind.Number => WithoutArticle(DimensionText.Words(key.Dimension)) + Bounds(key),
        ValueKind.WholeNumber => "whole number" + Bounds(key),
        ValueKind.Word => "a word, see below",
        ValueKind.Block => Link(DeckShape.Of(shape.Type)),
        ValueKind.List when shape.IsListOfPoints => "list of points [x, y], each a " + WithoutArticle(DimensionText.Words(key.Dimension)),
        ValueKind.List when shape.Entry!.Kind == ValueKind.Text => "a text, or a list of texts",
        ValueKind.List when shape.Entry!.Kind == ValueKind.Word => "a word, or a list of words, see below",
        ValueKind.List => (key.MostCount == key.LeastCount ? $"list of {key.LeastCount.ToString(CultureInfo.InvariantCulture)}: " : "list: ") + ValueInWords(shape.Entry!, key),
        ValueKind.Map => "by name: " + ValueInWords(shape.Entry!, key),
        ValueKind.Directional => WithoutArticle(DimensionText.Words(key.Dimension)) + ", or {x, y, z}" + Bounds(key),
        ValueKind.PoissonRatios => "bare number, or {xy, xz, zy}",
        ValueKind.EdgePoint => "`start`, `middle`, `end`, or a length",
        _ => "`every N points` or `none`",
    };

    private static string Bounds(KeyAttribute key)
    {
        List<string> bounds = [];
        string Limit(double value) => QuantityText.Write(value, key.Dimension);
        if (double.IsFinite(key.Above))
            bounds.Add("greater than " + Limit(key.Above));
        if (double.IsFinite(key.AtLeast))
            bounds.Add("at least " + Limit(key.AtLeast));
        if (double.IsFinite(key.Below))
            bounds.Add("less than " + Limit(key.Below));
        if (double.IsFinite(key.AtMost))
            bounds.Add("at most " + Limit(key.AtMost));
        return bounds.Count == 0 ? "" : ", " + string.Join(", ", bounds);
    }

    /// <summary>Where a block stands: <c>layers.NAME.peel, layers.NAME.shear</c>.</summary>
    private static string HeadingOf(DeckShape shape)
    {
        if (shape.Type == typeof(Deck))
            return "The deck";
        List<string> paths = [];
        CollectPaths(DeckShape.Of(typeof(Deck)), "", shape, paths);
        return string.Join(", ", paths);
    }

    private static void CollectPaths(DeckShape from, string path, DeckShape wanted, List<string> paths)
    {
        foreach (KeyShape key in from.Keys)
        {
            string at = path.Length == 0 ? key.Name : path + " > " + key.Name;
            for (ValueShape? value = key.Value; value is not null; value = value.Entry)
            {
                if (value.Kind == ValueKind.Map)
                    at += " > NAME";
                if (value.Kind != ValueKind.Block)
                    continue;
                if (value.Type == wanted.Type)
                    paths.Add(at);
                else
                    CollectPaths(DeckShape.Of(value.Type), at, wanted, paths);
            }
        }
    }

    private static string Link(DeckShape shape)
    {
        string heading = HeadingOf(shape);
        string anchor = string.Concat(heading.ToLowerInvariant().Where(c => char.IsLetterOrDigit(c) || c is ' ' or '-').Select(c => c == ' ' ? '-' : c));
        return $"a block, see [{heading.Split(", ")[0]}](#{anchor})";
    }

    private static string Listed(IReadOnlyList<string> words) => string.Join(", ", words.Select(w => $"`{w}`"));

    private static string WithoutArticle(string words) => words[(words.IndexOf(' ', StringComparison.Ordinal) + 1)..];

    private static string Cell(string text) => text.Replace("|", "\\|", StringComparison.Ordinal);
}
