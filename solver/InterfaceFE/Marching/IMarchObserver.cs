namespace InterfaceFE.Marching;

/// <summary>An accepted point of the march.</summary>
/// <param name="Number">Number, from 0 (the start).</param>
/// <param name="Stage">Stage, from 1; 0 for the start.</param>
/// <param name="StageEnd">Whether it is the last point of its stage.</param>
/// <param name="Progress">Progress of the stage.</param>
/// <param name="Time">Time [s].</param>
/// <param name="Temperature">Temperature [K].</param>
/// <param name="Stable">Whether the equilibrium is stable under the stage's own control.</param>
/// <param name="Energy">Energy account.</param>
public sealed record MarchPoint(int Number, int Stage, bool StageEnd, double Progress, double Time, double Temperature, bool Stable, EnergyAccount Energy);

/// <summary>One iteration of the march, for the convergence log.</summary>
/// <param name="Stage">Stage.</param>
/// <param name="Point">Point that is sought.</param>
/// <param name="Retries">How often its stride was shortened.</param>
/// <param name="Control">Control.</param>
/// <param name="Stride">Stride in the control's measure.</param>
/// <param name="Guess">Share of the way that the first guess carried on; 0: the accepted point.</param>
/// <param name="Progress">Progress.</param>
/// <param name="UnstableDirections">Unstable directions at the accepted point before.</param>
/// <param name="Newton">The iteration.</param>
public readonly record struct MarchIteration(int Stage, int Point, int Retries, string Control, double Stride, double Guess, double Progress, int UnstableDirections, NewtonIteration Newton);

/// <summary>Is told what the march does. Observers may read the equilibrium at the accepted point; they change nothing.</summary>
public interface IMarchObserver
{
    /// <summary>A point was accepted.</summary>
    void PointAccepted(MarchPoint point);

    /// <summary>An iteration was made.</summary>
    void IterationMade(in MarchIteration iteration);

    /// <summary>A decision worth a line in the log.</summary>
    void Said(string line);
}
