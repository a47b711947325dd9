using InterfaceFE.Decks;

namespace InterfaceFE.Model;

/// <summary>Machine, load cell and fixtures between a grip and the crosshead: a spring along one axis, with an unknown of its own for the crosshead.</summary>
/// <param name="Body">Body of the grip.</param>
/// <param name="Component">Axis of the pull: x or y.</param>
/// <param name="Stiffness">Stiffness [N/mm], > 0.</param>
public sealed record LoadTrain(int Body, GripComponent Component, double Stiffness);
