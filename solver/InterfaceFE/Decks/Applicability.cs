namespace InterfaceFE.Decks;

/// <summary>Keys whose default stands in a record although they mean nothing there; a deck may not give them, and the writer leaves them out.</summary>
internal static class Applicability
{
    /// <summary>Whether the key of the record means something with the record's other values.</summary>
    public static bool Applies(object record, string key) => (record, key) switch
    {
        (LayerDeck { Mixing: not Mixing.IndependentModes }, "counted by" or "release length") => false,
        (PullDeck { Travel: null }, "counted from") => false,
        (GripDeck { At: not null }, "hold") => false,
        _ => true,
    };
}
