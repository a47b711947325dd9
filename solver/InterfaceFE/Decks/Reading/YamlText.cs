using System.Globalization;
using YamlDotNet.Core;
using YamlDotNet.Core.Events;

namespace InterfaceFE.Decks.Reading;

/// <summary>
/// The one place that touches the YAML library: turns text into nodes with places. Everything is kept as text; what has a hidden meaning (anchors, aliases, merge
/// keys, tags, several documents) is refused, so nothing can be expanded or converted behind the reader's back.
/// </summary>
internal sealed class YamlText
{
    private const int DeepestNesting = 24;
    private readonly string _file;
    private readonly Parser _parser;
    private readonly ProblemList _problems;
    private readonly Stack<(char Bracket, TextPlace Place)> _open = new();
    private TextPlace _last;

    private YamlText(string text, string file, ProblemList problems)
    {
        _file = file;
        _problems = problems;
        _parser = new Parser(new Scanner(new StringReader(text), skipComments: true));
        _last = new TextPlace(file, 1, 1);
    }

    /// <summary>The root of the text, or null with the reason among the problems.</summary>
    public static DeckNode? Read(string text, string file, ProblemList problems) => new YamlText(text, file, problems).Read();

    private DeckNode? Read()
    {
        try
        {
            Next<StreamStart>();
            if (Next() is not DocumentStart)
            {
                _problems.Add(_last, "", null, "the file holds no deck, only comments; a deck starts with its title");
                return null;
            }
            DeckNode? root = ReadNode(Next(), 0);
            if (root is null)
                return null;
            Next<DocumentEnd>();
            if (Next() is DocumentStart second)
            {
                _problems.Add(PlaceOf(second.Start), "", null, "a second document starts here (---); a file holds one deck");
                return null;
            }
            return root;
        }
        catch (YamlException e)
        {
            _problems.Add(PlaceOf(e.Start), "", null, "the text is not understood from here on: " + InWords(e));
        }
        catch (Exception e) when (e is InvalidOperationException or ArgumentException or IndexOutOfRangeException or FormatException or OverflowException)
        {
            // The library ends some broken texts (a list that is never closed) with these instead of its own exception.
            _problems.Add(_last, "", null, "the text is not understood after this place" + OpenBracket());
        }
        return null;
    }

    private DeckNode? ReadNode(ParsingEvent started, int depth)
    {
        TextPlace place = PlaceOf(started.Start);
        if (depth > DeepestNesting)
        {
            _problems.Add(place, "", null, string.Create(CultureInfo.InvariantCulture, $"more than {DeepestNesting} levels within each other; no deck needs so many"));
            return null;
        }
        if (started is AnchorAlias alias)
        {
            _problems.Add(place, "", "*" + alias.Value, "is a reference to another place; write the value here, or keep materials and layers in a file of their own and `include` it");
            return new TextNode("", false, place) { IsRefused = true };
        }
        if (started is NodeEvent node)
            RefuseHiddenMeaning(node, place);
        return started switch
        {
            Scalar scalar => new TextNode(scalar.Value, scalar.Style == ScalarStyle.Plain, place),
            SequenceStart sequence => ReadList(sequence.Style == SequenceStyle.Flow, place, depth),
            MappingStart mapping => ReadMap(mapping.Style == MappingStyle.Flow, place, depth),
            _ => throw new InvalidOperationException("The text has an unexpected order."),
        };
    }

    private ListNode? ReadList(bool isFlow, TextPlace place, int depth)
    {
        if (isFlow)
            _open.Push(('[', place));
        ListNode list = new([], place);
        for (ParsingEvent current = Next(); current is not SequenceEnd; current = Next())
        {
            DeckNode? item = ReadNode(current, depth + 1);
            if (item is null)
                return null;
            list.Items.Add(item);
        }
        if (isFlow)
            _open.Pop();
        return list;
    }

    private MapNode? ReadMap(bool isFlow, TextPlace place, int depth)
    {
        if (isFlow)
            _open.Push(('{', place));
        MapNode map = new([], place);
        for (ParsingEvent current = Next(); current is not MappingEnd; current = Next())
        {
            DeckNode? key = ReadNode(current, depth + 1);
            if (key is null)
                return null;
            if (key is TextNode { IsPlain: true, Text: "" })
            {
                // The library gives such a key the place of its block, or takes what follows for it: the value tells the place, and the rest cannot be trusted.
                TextPlace value = PlaceOf(Next().Start);
                _problems.Add(key.Place == place ? value : key.Place, "", null, "a key is missing before the colon; the rest of the file is read once it is there");
                return null;
            }
            DeckNode? held = ReadNode(Next(), depth + 1);
            if (held is null)
                return null;
            if (key is TextNode text)
                map.Entries.Add(new MapEntry(text, held));
            else
                _problems.Add(key!.Place, "", null, "a key is a single text, not a list or a map");
        }
        if (isFlow)
            _open.Pop();
        return map;
    }

    private void RefuseHiddenMeaning(NodeEvent node, TextPlace place)
    {
        if (!node.Anchor.IsEmpty)
            _problems.Add(place, "", "&" + node.Anchor.Value, "marks this place for references; decks do without, take it out");
        if (!node.Tag.IsEmpty)
            _problems.Add(place, "", node.Tag.IsNonSpecific ? "!" : node.Tag.Value, "gives the value a type; decks do without, take it out");
    }

    private ParsingEvent Next()
    {
        if (!_parser.MoveNext() || _parser.Current is null)
            throw new InvalidOperationException("The text ended early.");
        // Ends of lists and blocks may lie far behind the place that is wrong.
        if (_parser.Current is NodeEvent)
            _last = PlaceOf(_parser.Current.Start);
        return _parser.Current;
    }

    private void Next<TEvent>() where TEvent : ParsingEvent
    {
        if (Next() is not TEvent)
            throw new InvalidOperationException("The text has an unexpected order.");
    }

    private TextPlace PlaceOf(Mark mark) => new(_file, (int)Math.Max(1, mark.Line), (int)Math.Max(1, mark.Column));

    private string InWords(YamlException e) => e.Message switch
    {
        string m when m.Contains("found invalid mapping", StringComparison.Ordinal) => "a second \": \" in one line; put the text in quotes, or the inner key in {braces} or on a line of its own",
        string m when m.Contains("cannot start any token", StringComparison.Ordinal) => "a value cannot start with this sign; put it in quotes",
        string m when m.Contains("quoted scalar", StringComparison.Ordinal) => "a quotation mark is not closed",
        string m when m.Contains("tab", StringComparison.Ordinal) => "a tab; use spaces",
        string m when m.Contains("did not find expected key", StringComparison.Ordinal) => "a key was expected; is the line indented as its neighbours, and is each bracket closed once?",
        string m when m.Contains("did not find expected '-'", StringComparison.Ordinal) => "an entry of a list (- ) was expected; is the line indented as its neighbours?",
        string m when m.Contains("did not find expected ','", StringComparison.Ordinal) => "a comma or the closing bracket was expected" + OpenBracket(),
        string m when m.Contains("could not find expected ':'", StringComparison.Ordinal) => "a key needs a colon and a space after it",
        string m => char.ToLowerInvariant(m[0]) + ReadProblem.Shown(m[1..].TrimEnd('.')) + OpenBracket(),
    };

    private string OpenBracket() => _open.Count == 0
        ? ""
        : string.Create(CultureInfo.InvariantCulture, $"; the {_open.Peek().Bracket} of line {_open.Peek().Place.Line}, column {_open.Peek().Place.Column} is not closed");
}
