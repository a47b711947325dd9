namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>Meshes of published element tests, each as its source draws it.</summary>
internal static class BenchmarkMeshes
{
    /// <summary>
    /// Distorted patch 0.24 × 0.12 with four inner nodes (MacNeal and Harder, Finite Elem. Anal. Des. 1 (1985) 3-20). Corner nodes 0 to 3 are those of the
    /// outline.
    /// </summary>
    public static PlaneMesh DistortedPatch(int nodesPerElement) => PlaneMesh.FromCorners(
        nodesPerElement,
        [(0, 0), (0.24, 0), (0.24, 0.12), (0, 0.12), (0.04, 0.02), (0.18, 0.03), (0.16, 0.08), (0.08, 0.08)],
        [[0, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7], [4, 5, 6, 7]]);

    /// <summary>
    /// Straight beam 6 × 0.2 of 6 × 1 elements, upright lines leaning by the given amount at the top and the opposite at the bottom (same source).
    /// </summary>
    /// <param name="nodesPerElement">4 or 8.</param>
    /// <param name="lean">Shift of the top end of an inner upright line; the bottom end shifts by the opposite.</param>
    /// <param name="alternate">Whether neighbouring lines lean to opposite sides (trapezoids) or to one side (parallelograms).</param>
    public static PlaneMesh Beam(int nodesPerElement, double lean, bool alternate) => PlaneMesh.Grid(
        nodesPerElement,
        6,
        1,
        (i, j) =>
        {
            bool inner = i is > 0 and < 6;
            double sign = alternate && (int)i % 2 == 0 ? -1 : 1;
            return (i + (inner ? sign * lean * (2 * j - 1) : 0), 0.2 * j);
        },
        straightSides: true);

    /// <summary>Quarter ring of radii a to b from the x axis to the y axis: along i the angle, along j the radius.</summary>
    public static PlaneMesh QuarterRing(int nodesPerElement, int around, int through, double a, double b) => PlaneMesh.Grid(
        nodesPerElement,
        around,
        through,
        (i, j) =>
        {
            // Counter-clockwise elements need the angle to fall with i while the radius grows with j.
            double angle = Math.PI / 2 * (1 - i / around), radius = a + (b - a) * j / through;
            return (radius * Math.Cos(angle), radius * Math.Sin(angle));
        });

    /// <summary>
    /// Tapered panel 48 wide, 44 high at the left, 16 at the right from 44 to 60 (Cook 1974); graded: finer towards both clamped corners, of which the one
    /// of 108° is singular.
    /// </summary>
    public static PlaneMesh TaperedPanel(int nodesPerElement, int divisions, bool graded = false) => PlaneMesh.Grid(
        nodesPerElement,
        divisions,
        divisions,
        (i, j) =>
        {
            double s = i / divisions, t = j / divisions;
            if (graded)
                (s, t) = (s * s, t < 0.5 ? 2 * t * t : 1 - 2 * (1 - t) * (1 - t));
            double bottom = 44 * s, height = 44 - 28 * s;
            return (48 * s, bottom + height * t);
        },
        straightSides: true);

    /// <summary>
    /// Quarter of an elliptic membrane, inner ellipse 2 × 1, outer 3.25 × 2.75 (NAFEMS LE1): along i from the y axis to the x axis, along j outwards; finer
    /// towards (2, 0), where the stress is steep.
    /// </summary>
    public static PlaneMesh EllipticMembrane(int nodesPerElement, int around, int through) => PlaneMesh.Grid(
        nodesPerElement,
        around,
        through,
        (i, j) =>
        {
            double angle = Math.PI / 2 * Graded(around - i, around), t = Graded(j, through);
            return ((2 + 1.25 * t) * Math.Cos(angle), (1 + 1.75 * t) * Math.Sin(angle));
        });

    // Stations (k/count)^1.5, linear between them: a middle node off the middle of its side would spoil the element next to the fine end at any refinement.
    private static double Graded(double position, int count)
    {
        double below = Math.Floor(position);
        double start = Math.Pow(below / count, 1.5), end = Math.Pow((below + 1) / count, 1.5);
        return start + (end - start) * (position - below);
    }
}
