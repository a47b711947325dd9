using System.Diagnostics;

namespace InterfaceFE.Marching;

/// <summary>What a run spends its time on.</summary>
public enum Phase
{
    /// <summary>Steering of the march, and whatever else has no phase of its own.</summary>
    March,

    /// <summary>Reading the deck.</summary>
    Reading,

    /// <summary>Mesh and model.</summary>
    Meshing,

    /// <summary>Plan of the factorisation: ordering and symbolic analysis.</summary>
    Plan,

    /// <summary>Elements: residual and tangents.</summary>
    Elements,

    /// <summary>Factorisation.</summary>
    Factorisation,

    /// <summary>Solves with the factor, refinement included.</summary>
    Solves,

    /// <summary>Making the records of a point: fields, fronts, energy release rates.</summary>
    Recording,

    /// <summary>Writing tables, fields and log.</summary>
    Writing,

    /// <summary>Figures.</summary>
    Figures,
}

/// <summary>
/// Wall-clock time by phase. A phase begun within another one takes over until it ends, so that the phases add up to the whole. For summary and log alone: no decision may read it.
/// Allocates nothing while it runs. Not safe for several threads.
/// </summary>
public sealed class PhaseClock
{
    private readonly long[] _ticks = new long[Enum.GetValues<Phase>().Length];
    private Phase _current = Phase.March;
    private long _since = Stopwatch.GetTimestamp();

    /// <summary>Begins a phase; disposing of what is returned ends it and goes back to the phase before.</summary>
    public Stretch In(Phase phase)
    {
        Phase before = _current;
        Switch(phase);
        return new Stretch(this, before);
    }

    /// <summary>Time spent in a phase so far [s].</summary>
    public double Seconds(Phase phase)
    {
        Switch(_current);
        return _ticks[(int)phase] / (double)Stopwatch.Frequency;
    }

    private void Switch(Phase to)
    {
        long now = Stopwatch.GetTimestamp();
        _ticks[(int)_current] += now - _since;
        (_since, _current) = (now, to);
    }

    /// <summary>A stretch of time in a phase, from its making to its disposal.</summary>
    public readonly ref struct Stretch
    {
        private readonly PhaseClock _clock;
        private readonly Phase _before;

        internal Stretch(PhaseClock clock, Phase before)
        {
            _clock = clock;
            _before = before;
        }

        /// <summary>Ends the phase.</summary>
        public void Dispose() => _clock.Switch(_before);
    }
}
