namespace InterfaceFE.Sparse;

/// <summary>Choices of the symbolic analysis. They change cost, never the answer beyond round-off. The defaults were measured on strips of 28 to 104 thousand unknowns.</summary>
/// <param name="LeafVertices">Parts with at most this many vertices are no longer dissected but ordered by minimum degree; at least 1.</param>
/// <param name="SmallFront">
/// Pivot unknowns of a front that counts as small: half as many are always merged with the parent, as many with up to 60 % of explicit zeros, three times as many with up to
/// 2.5 times <paramref name="ZeroShare"/>; at least 1.
/// </param>
/// <param name="ZeroShare">Share of explicit zeros that is accepted when larger fronts are merged; 0 to 1.</param>
public sealed record PlanOptions(int LeafVertices = 16, int SmallFront = 16, double ZeroShare = 0.06);
