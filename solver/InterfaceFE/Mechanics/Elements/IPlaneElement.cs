using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Mechanics.Elements;

/// <summary>
/// A plane solid element for small rotations: kernels over spans, pure functions of their arguments, no allocation, safe to call from any thread.
/// <para>
/// Nodes: corners counter-clockwise, then (eight nodes) the middle of each side beginning with side 0-1. Coordinates, displacements and forces run x, y of
/// node 0, x, y of node 1, ... [mm, mm, N], length <see cref="Unknowns"/>. Natural coordinates xi, eta in [-1, 1]; corner 0 is at (-1, -1), corner 1 at (1,
/// -1). Gauss points: <see cref="GaussPoints.Count"/>, point i nearest to corner i. Four-component stresses run xx, yy, zz, xy.
/// </para>
/// <para>
/// Nothing throws on a badly shaped element: results are then wrong or not finite, so <see cref="Shape"/> is asked once when the model is built. Spans that
/// are too short throw <see cref="ArgumentException"/> or <see cref="IndexOutOfRangeException"/>. Outputs must not alias inputs and are overwritten.
/// </para>
/// </summary>
public interface IPlaneElement
{
    /// <summary>Number of nodes.</summary>
    static abstract int Nodes { get; }

    /// <summary>Number of unknowns, two per node.</summary>
    static abstract int Unknowns { get; }

    /// <summary>Shape functions at a point.</summary>
    /// <param name="xi">First natural coordinate.</param>
    /// <param name="eta">Second natural coordinate.</param>
    /// <param name="values">One per node.</param>
    static abstract void ShapeFunctions(double xi, double eta, Span<double> values);

    /// <summary>Derivatives of the shape functions by the natural coordinates.</summary>
    /// <param name="xi">First natural coordinate.</param>
    /// <param name="eta">Second natural coordinate.</param>
    /// <param name="byXi">One per node.</param>
    /// <param name="byEta">One per node.</param>
    static abstract void ShapeDerivatives(double xi, double eta, Span<double> byXi, Span<double> byEta);

    /// <summary>Area and quality of the map.</summary>
    static abstract ElementShape Shape(ReadOnlySpan<double> coordinates);

    /// <summary>Derivatives of the shape functions by x and y at the Gauss points [1/mm] and the area that each point stands for [mm²].</summary>
    /// <param name="coordinates">Node coordinates.</param>
    /// <param name="byX">Point after point, one per node; length 4·<see cref="Nodes"/>.</param>
    /// <param name="byY">As <paramref name="byX"/>.</param>
    /// <param name="areas">Length 4; their sum is the area.</param>
    static abstract void ShapeGradients(ReadOnlySpan<double> coordinates, Span<double> byX, Span<double> byY, Span<double> areas);

    /// <summary>Stiffness [N/mm].</summary>
    /// <param name="coordinates">Node coordinates.</param>
    /// <param name="material">Material.</param>
    /// <param name="width">Width out of plane [mm].</param>
    /// <param name="stiffness">Row-major <see cref="Unknowns"/>×<see cref="Unknowns"/>, symmetric to the last bit.</param>
    static abstract void Stiffness(ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, Span<double> stiffness);

    /// <summary>
    /// Internal force per kelvin of temperature change at fixed displacements [N/K]: the derivative of <see cref="InternalForce"/> by the temperature
    /// change, -(integral of Bᵀ·D·expansion). On the side of the loads it counts with the opposite sign.
    /// </summary>
    static abstract void ThermalForce(ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, Span<double> force);

    /// <summary>Internal force [N]: stiffness·displacements + thermal force·temperature change.</summary>
    static abstract void InternalForce(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, ReadOnlySpan<double> displacements, double temperatureChange, Span<double> force);

    /// <summary>Stress at the Gauss points [MPa].</summary>
    /// <param name="coordinates">Node coordinates.</param>
    /// <param name="material">Material.</param>
    /// <param name="displacements">Node displacements.</param>
    /// <param name="temperatureChange">Temperature change [K].</param>
    /// <param name="stresses">Point after point xx, yy, zz, xy; length 16.</param>
    static abstract void Stresses(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, ReadOnlySpan<double> displacements, double temperatureChange, Span<double> stresses);

    /// <summary>
    /// Displacement gradient at the Gauss points, the one whose strain gives <see cref="Stresses"/> (inner modes of an element included; they depend on the
    /// material's stiffness, not on temperature).
    /// </summary>
    /// <param name="coordinates">Node coordinates.</param>
    /// <param name="material">Material.</param>
    /// <param name="displacements">Node displacements.</param>
    /// <param name="gradients">Point after point du/dx, du/dy, dv/dx, dv/dy; length 16.</param>
    static abstract void DisplacementGradients(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, ReadOnlySpan<double> displacements, Span<double> gradients);

    /// <summary>Elastic energy of the element [mJ], out-of-plane stress included (<see cref="PlaneElasticity.EnergyDensity"/>).</summary>
    static abstract double StrainEnergy(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, ReadOnlySpan<double> displacements, double temperatureChange);

    /// <summary>Positions of the Gauss points [mm].</summary>
    /// <param name="coordinates">Node coordinates.</param>
    /// <param name="positions">Point after point x, y; length 8.</param>
    static abstract void GaussPositions(ReadOnlySpan<double> coordinates, Span<double> positions);

    /// <summary>
    /// Values at the nodes from values at the Gauss points, by the bilinear function through the four points; exact for fields linear in xi and eta.
    /// </summary>
    /// <param name="components">Number of values a point.</param>
    /// <param name="gaussValues">Point after point; length 4·components.</param>
    /// <param name="nodeValues">Node after node; length <see cref="Nodes"/>·components.</param>
    static abstract void ExtrapolateToNodes(int components, ReadOnlySpan<double> gaussValues, Span<double> nodeValues);
}
