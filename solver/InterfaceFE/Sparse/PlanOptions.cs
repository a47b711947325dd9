namespace InterfaceFE.Sparse;

/// <summary>Choices of the symbolic analysis. They change cost, never the answer beyond round-off.</summary>
/// <param name="LeafVertices">Parts with at most this many vertices are no longer dissected but ordered by minimum degree; at least 1.</param>
/// <param name="SmallFront">Fronts up to this many pivot unknowns are merged with their parent even if half of the merged pivot block's entries are explicit zeros; at least 1.</param>
/// <param name="ZeroShare">Share of explicit zeros that is accepted when larger fronts are merged; 0 to 1.</param>
public sealed record PlanOptions(int LeafVertices = 64, int SmallFront = 16, double ZeroShare = 0.06);
