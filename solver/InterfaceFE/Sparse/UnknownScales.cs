namespace InterfaceFE.Sparse;

/// <summary>
/// Scales of each unknown, by place, brought up to date where slots were replaced. The scale is the sum of its diagonal's magnitudes in all slots, so that softening does not
/// lower it; a share of the row's largest entry stands in where the diagonal is next to nothing. The soft scale leaves out layers (slots with changeable vertices only), whose
/// stiffness may exceed that of the bodies by many powers of ten; it is the scale where nothing else is there. Both are summed anew in slot order at each change.
/// </summary>
internal sealed class UnknownScales
{
    private readonly SparsePlan _plan;
    private readonly double[] _ofEntry;
    private readonly bool[] _isLayer;
    private readonly double[] _scale;
    private readonly double[] _soft;
    private readonly bool[] _isStale;
    private readonly int[] _stale;
    private readonly bool[] _hasMoved;
    private readonly int[] _moved;
    private int _staleCount;
    private int _movedCount;

    /// <summary>Makes room; all scales are stale.</summary>
    public UnknownScales(SparsePlan plan)
    {
        _plan = plan;
        _ofEntry = new double[plan.Pattern.SlotUnknowns.Length];
        _isLayer = new bool[plan.Pattern.SlotCount];
        for (int slot = 0; slot < _isLayer.Length; slot++)
            _isLayer[slot] = IsLayer(plan.Pattern, slot);
        _scale = new double[plan.UnknownCount];
        _soft = new double[plan.UnknownCount];
        _isStale = new bool[plan.UnknownCount];
        _stale = new int[plan.UnknownCount];
        _hasMoved = new bool[plan.UnknownCount];
        _moved = new int[plan.UnknownCount];
        for (int place = 0; place < plan.UnknownCount; place++)
            MarkStale(place);
    }

    /// <summary>Scale of an unknown by place; never zero.</summary>
    public double this[int place] => _scale[place];

    /// <summary>Scale without layers; never zero.</summary>
    public double Soft(int place) => _soft[place];

    /// <summary>Whether the last update changed a scale at a place.</summary>
    public bool HasMoved(int place) => _hasMoved[place];

    /// <summary>Whether the last update changed any scale.</summary>
    public bool AnyMoved => _movedCount > 0;

    /// <summary>Takes the share of a slot's row. Returns whether it is another one than before.</summary>
    /// <param name="entry">Number of the slot's unknown in the pattern's list, in elimination order within the slot.</param>
    /// <param name="value">Magnitude of the diagonal or its substitute.</param>
    public bool Take(int entry, double value)
    {
        if (_ofEntry[entry] == value)
            return false;
        _ofEntry[entry] = value;
        MarkStale(_plan.Slots.Place[entry]);
        return true;
    }

    /// <summary>Sums the stale ones.</summary>
    public void Update()
    {
        for (int i = 0; i < _movedCount; i++)
            _hasMoved[_moved[i]] = false;
        _movedCount = 0;
        for (int i = 0; i < _staleCount; i++)
        {
            int place = _stale[i];
            _isStale[place] = false;
            double scale = 0, soft = 0;
            SlotMap map = _plan.Slots;
            for (int e = map.EntryStart[place]; e < map.EntryStart[place + 1]; e++)
            {
                double value = _ofEntry[map.Entries[e]];
                scale += value;
                if (!_isLayer[map.EntrySlot[e]])
                    soft += value;
            }
            // Magnitudes can overflow where the numbers themselves, of both signs, do not.
            scale = Math.Min(scale == 0 ? 1 : scale, double.MaxValue);
            soft = Math.Min(soft == 0 ? scale : soft, double.MaxValue);
            if (scale == _scale[place] && soft == _soft[place])
                continue;
            (_scale[place], _soft[place]) = (scale, soft);
            _hasMoved[place] = true;
            _moved[_movedCount++] = place;
        }
        _staleCount = 0;
    }

    private static bool IsLayer(SlotPattern pattern, int slot)
    {
        foreach (int unknown in pattern.Unknowns(slot))
            if (!pattern.IsChangeable[pattern.VertexOfUnknown[unknown]])
                return false;
        return true;
    }

    private void MarkStale(int place)
    {
        if (_isStale[place])
            return;
        _isStale[place] = true;
        _stale[_staleCount++] = place;
    }
}
