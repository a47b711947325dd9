namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>What is kept: names of grips, and gauges with the points that their kind needs.</summary>
internal static class KeepChecks
{
    /// <summary>Checks the block `keep`.</summary>
    public static void Run(Deck deck, ReadContext context)
    {
        if (deck.Keep?.CurvesOf is { } curves)
            for (int i = 0; i < curves.Count; i++)
                DeckChecks.NameExists(curves[i], deck.Grips, "grips", ReadContext.Join("keep.curves of", i + 1), context);
        foreach ((string name, GaugeDeck gauge) in DeckChecks.Entries(deck.Keep?.Gauges))
            CheckGauge(deck, gauge, $"keep.gauges.{name}", context);
    }

    private static void CheckGauge(Deck deck, GaugeDeck gauge, string path, ReadContext context)
    {
        DeckChecks.Edge(gauge.On, deck, path + ".on", context);
        DeckChecks.Edge(gauge.To, deck, path + ".to", context);
        if (!context.IsSound(path + ".kind"))
            return;
        if (gauge.Kind != GaugeKind.ClipGauge)
        {
            foreach (string key in (string[])["to", "to at"])
                if (context.IsGiven(ReadContext.Join(path, key)))
                    context.Fail(ReadContext.Join(path, key), "does not apply: only a clip gauge has a second point");
            return;
        }
        if (!context.IsGiven(path + ".to"))
            context.FailAt(context.Find(path, out _).Key, path + ".to", "is missing; a clip gauge has a second point, for example to: bottom of lower arm");
        else if (gauge.To is not null && gauge.To == gauge.On && (gauge.ToAt is null || gauge.ToAt.Value.Equals(gauge.At)))
            context.Fail(path + ".to", "both points of the clip gauge are the same");
    }
}
