namespace InterfaceFE.Sparse;

/// <summary>
/// Scatter map from slots to fronts. A slot goes as a whole into the front of its first eliminated unknown. Its numbers are kept as a lower triangle, column after column,
/// with the unknowns in elimination order, and slot after slot in the order in which fronts need them, so that assembly reads them once from start to end. Where unknowns come
/// in pairs of one vertex, a column starts at the pair that holds its diagonal, so that pairs are added at once; the entry above the diagonal is zero and not used.
/// </summary>
internal sealed class SlotMap
{
    /// <summary>Builds the map of a plan whose fronts are laid out.</summary>
    public SlotMap(SparsePlan plan)
    {
        SlotPattern pattern = plan.Pattern;
        int slots = pattern.SlotCount;
        Sequence = new int[pattern.SlotUnknowns.Length];
        Place = new int[pattern.SlotUnknowns.Length];
        Local = new int[pattern.SlotUnknowns.Length];
        Front = new int[slots];
        for (int slot = 0; slot < slots; slot++)
            SortSlot(plan, slot);
        (FrontStart, OfFront) = SparsePlan.Group(Front, plan.FrontCount + 1);
        ValueStart = new long[slots];
        IsPaired = new bool[slots];
        var local = new int[plan.UnknownCount];
        long filled = 0;
        for (int front = 0; front <= plan.FrontCount; front++)
        {
            plan.SetLocal(front, local);
            for (int i = FrontStart[front]; i < FrontStart[front + 1]; i++)
            {
                int slot = OfFront[i], start = pattern.SlotStart[slot], end = pattern.SlotStart[slot + 1];
                for (int k = start; k < end; k++)
                    Local[k] = local[Place[k]];
                IsPaired[slot] = ComesInPairs(plan, start, end);
                ValueStart[slot] = filled;
                long size = end - start;
                LargestSlot = Math.Max(LargestSlot, (int)size);
                filled += size * (size + 1) / 2 + (IsPaired[slot] ? size / 2 : 0);
            }
        }
        ValueCount = filled;
        (EntryStart, Entries) = SparsePlan.Group(Place, plan.UnknownCount);
        EntrySlot = new int[Entries.Length];
        var slotOf = new int[Place.Length];
        for (int slot = 0; slot < slots; slot++)
            slotOf.AsSpan(pattern.SlotStart[slot], pattern.SlotStart[slot + 1] - pattern.SlotStart[slot]).Fill(slot);
        for (int i = 0; i < Entries.Length; i++)
            EntrySlot[i] = slotOf[Entries[i]];
    }

    /// <summary>Numbers of a slot's own unknowns in elimination order, slot after slot as in the pattern.</summary>
    public int[] Sequence { get; }

    /// <summary>Places (elimination order) of the slots' unknowns, rising within a slot.</summary>
    public int[] Place { get; }

    /// <summary>Local numbers within the front, in the same order.</summary>
    public int[] Local { get; }

    /// <summary>Front of each slot; -1 for a slot without unknowns.</summary>
    public int[] Front { get; }

    /// <summary>Start of each front's slots in <see cref="OfFront"/>.</summary>
    public int[] FrontStart { get; }

    /// <summary>Slots, front after front, rising.</summary>
    public int[] OfFront { get; }

    /// <summary>Start of each slot's lower triangle in the array of values.</summary>
    public long[] ValueStart { get; }

    /// <summary>Whether the unknowns of a slot come in pairs.</summary>
    public bool[] IsPaired { get; }

    /// <summary>Length of the array of values.</summary>
    public long ValueCount { get; }

    /// <summary>Start of each place's entries in <see cref="Entries"/>.</summary>
    public int[] EntryStart { get; }

    /// <summary>Numbers into <see cref="Place"/> by place, in slot order.</summary>
    public int[] Entries { get; }

    /// <summary>Slot of each of <see cref="Entries"/>.</summary>
    public int[] EntrySlot { get; }

    /// <summary>Most unknowns in a slot.</summary>
    public int LargestSlot { get; }

    /// <summary>First row of a slot's column that is kept.</summary>
    public int FirstRow(int slot, int column) => IsPaired[slot] ? column & ~1 : column;

    private bool ComesInPairs(SparsePlan plan, int start, int end)
    {
        if ((end - start) % 2 != 0)
            return false;
        for (int k = start; k < end; k += 2)
            if (Local[k + 1] != Local[k] + 1 || VertexAt(k) != VertexAt(k + 1))
                return false;
        return true;

        int VertexAt(int k) => plan.Pattern.VertexOfUnknown[plan.OldOf[Place[k]]];
    }

    private void SortSlot(SparsePlan plan, int slot)
    {
        SlotPattern pattern = plan.Pattern;
        int start = pattern.SlotStart[slot], count = pattern.SlotStart[slot + 1] - start;
        Span<int> sequence = Sequence.AsSpan(start, count), place = Place.AsSpan(start, count);
        for (int k = 0; k < count; k++)
        {
            sequence[k] = k;
            place[k] = plan.NewOf[pattern.SlotUnknowns[start + k]];
        }
        place.Sort(sequence);
        Front[slot] = count == 0 ? -1 : plan.FrontOf[place[0]];
    }
}
