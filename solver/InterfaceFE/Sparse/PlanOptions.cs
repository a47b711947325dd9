namespace InterfaceFE.Sparse;

/// <summary>
/// Choices of the symbolic analysis. They change cost, never the answer beyond round-off. The defaults were measured on strips of 28 to 400 thousand unknowns and a stiffened
/// panel of 170 thousand.
/// </summary>
/// <param name="LeafVertices">Parts with at most this many vertices are no longer dissected but ordered by minimum degree; at least 1.</param>
/// <param name="FrontCost">What a front costs whatever its size, as a number of multiply-adds; fronts are merged where that saves more than explicit zeros cost.</param>
/// <param name="EntryCost">What an entry of a front costs to clear and to move, as a number of multiply-adds.</param>
public sealed record PlanOptions(int LeafVertices = 8, double FrontCost = 8000, double EntryCost = 8);
