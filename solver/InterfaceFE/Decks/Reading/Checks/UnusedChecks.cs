namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Warns about entries of the deck's own file that nothing uses: often a slip in a name. Included files may hold more than one deck needs.</summary>
internal static class UnusedChecks
{
    /// <summary>Looks through materials, layers, adherends and grips.</summary>
    public static void Run(Deck deck, ReadContext context)
    {
        HashSet<string?> materials = [.. DeckChecks.Entries(deck.Adherends).Select(a => a.Value.Of)];
        foreach ((_, AdherendDeck adherend) in DeckChecks.Entries(deck.Adherends))
            materials.UnionWith(adherend.Plies?.Select(ply => ply?.Of) ?? []);
        HashSet<string?> layers = [.. DeckChecks.Entries(deck.Joints).Select(j => j.Value.Layer)];
        Warn(deck.Materials?.Keys, materials, "materials", "no adherend is made of it", context);
        Warn(deck.Layers?.Keys, layers, "layers", "no joint uses it", context);
        Warn(deck.Grips?.Keys, GripsUsed(deck), "grips", "no stage uses it", context);
    }

    private static HashSet<string?> GripsUsed(Deck deck)
    {
        HashSet<string?> used = [];
        foreach (StageDeck stage in deck.Sequence?.Where(s => s is not null) ?? [])
        {
            used.UnionWith(stage.Fix?.Keys ?? []);
            used.UnionWith(stage.LetGo ?? []);
            used.UnionWith(stage.Turn?.Grips?.Keys ?? []);
            used.Add(stage.Pull?.Grip);
            used.Add(stage.Push?.Grip);
        }
        return used;
    }

    private static void Warn(IEnumerable<string>? names, HashSet<string?> used, string block, string why, ReadContext context)
    {
        foreach (string name in names ?? [])
        {
            string path = ReadContext.Join(block, name);
            if (!used.Contains(name) && context.Find(path, out _).Key.File == context.File)
                context.Warn(path, why);
        }
    }
}
