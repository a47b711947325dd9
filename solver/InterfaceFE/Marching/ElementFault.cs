using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>Finds the element whose answer is not finite, and says in words where it lies and what is wrong.</summary>
internal static class ElementFault
{
    /// <summary>Displacement over the size of the specimen above which an answer may well overflow: a search that has lost its way, or a load beyond all measure.</summary>
    private const double Moderate = 1e3;

    private const Wanted Everything = Wanted.Force | Wanted.Tangent | Wanted.Energy | Wanted.LoadRate | Wanted.Dissipation;

    /// <summary>Whether displacements are finite and of a size that every element must have an answer for.</summary>
    public static bool IsModerate(SpecimenModel model, ReadOnlySpan<double> u)
    {
        double largest = 0, size = Math.Max(model.Mesh.X.Max() - model.Mesh.X.Min(), model.Mesh.Y.Max() - model.Mesh.Y.Min());
        foreach (double value in u)
            largest = double.IsNaN(value) ? double.PositiveInfinity : Math.Max(largest, Math.Abs(value));
        return largest <= Moderate * size;
    }

    /// <summary>The first element, in slot order, whose answer is not finite, in words; null when all answers are.</summary>
    /// <param name="model">Model.</param>
    /// <param name="table">Its elements.</param>
    /// <param name="state">Their state.</param>
    /// <param name="u">Unknowns.</param>
    /// <param name="at">Place on the path.</param>
    public static string? Find(SpecimenModel model, ElementTable table, StateStore state, ReadOnlySpan<double> u, in PathPoint at)
    {
        for (int block = 0; block < table.Blocks.Count; block++)
        {
            IElementBlock elements = table.Blocks[block];
            int n = 2 * elements.NodesPerElement;
            double[] native = new double[n];
            var buffers = new ElementBuffers { Force = new double[n], Tangent = new double[n * n], LoadRate = new double[n], Dissipation = new double[n] };
            for (int e = 0; e < elements.Count; e++)
            {
                table.Gather(table.Slot(block, e), u, native);
                ElementAnswer answer = elements.Evaluate(e, at, native, state.Accepted(block, e), state.Tentative(block, e), Everything, buffers);
                if (What(answer, buffers) is { } what)
                    return Where(model, elements, e, at, native, state.Accepted(block, e), what);
            }
        }
        return null;
    }

    private static string? What(in ElementAnswer answer, in ElementBuffers buffers) =>
        !Finite(buffers.Force) ? "its force"
        : !Finite(buffers.Tangent) ? "its tangent"
        : !Finite(buffers.LoadRate) ? "its change of force with temperature"
        : !Finite(buffers.Dissipation) ? "the gradient of its dissipated energy"
        : !double.IsFinite(answer.Stored) ? "its stored energy"
        : !double.IsFinite(answer.Dissipated) ? "its dissipated energy" : null;

    private static string Where(SpecimenModel model, IElementBlock elements, int e, in PathPoint at, ReadOnlySpan<double> native, ReadOnlySpan<double> accepted, string what)
    {
        switch (elements)
        {
            case LayerBlock layer:
                var separations = new Separation[layer.PointsPerElement];
                var responses = new LayerResponse[layer.PointsPerElement];
                layer.Sample(e, at, native, accepted, separations, responses);
                int point = Array.FindIndex(responses, r => Wrong(r) is not null);
                (double x, double y) = Place(model, layer.Nodes(e)[..layer.Stations]);
                if (point < 0)
                    return Text($"joint '{layer.Name}', element at x = {x:G6} mm, y = {y:G6} mm: {what} is not finite");
                double along = layer.Position(e, point);
                (x, y) = Place(model, layer, e, along);
                return Text($"joint '{layer.Name}', {along:G6} mm along it (x = {x:G6} mm, y = {y:G6} mm): {Wrong(responses[point])} is not finite at an opening of {separations[point].Opening:G6} mm and a sliding of {separations[point].Sliding:G6} mm");
            case SolidBlock solid:
                Span<double> stresses = stackalloc double[16], positions = stackalloc double[8];
                solid.Stresses(e, native, at.Temperature, accepted, stresses);
                solid.GaussPositions(e, positions);
                for (int p = 0; p < 4; p++)
                    if (!Finite(stresses.Slice(4 * p, 4)))
                        return Text($"adherend '{solid.Name}', integration point at x = {positions[2 * p]:G6} mm, y = {positions[2 * p + 1]:G6} mm: the stress is not finite");
                break;
        }
        (double middleX, double middleY) = Place(model, elements.Nodes(e));
        return Text($"'{elements.Name}', element at x = {middleX:G6} mm, y = {middleY:G6} mm: {what} is not finite");
    }

    private static string? Wrong(in LayerResponse r) =>
        !double.IsFinite(r.Peel) ? "the peel traction"
        : !double.IsFinite(r.Shear) ? "the shear traction"
        : !double.IsFinite(r.PeelByOpening + r.PeelBySliding + r.ShearByOpening + r.ShearBySliding) ? "the stiffness of the law"
        : !double.IsFinite(r.Stored) ? "the stored energy of the law"
        : !double.IsFinite(r.Dissipated) ? "the dissipated energy of the law"
        : !double.IsFinite(r.DissipatedByOpening + r.DissipatedBySliding) ? "the gradient of the law's dissipated energy" : null;

    private static (double X, double Y) Place(SpecimenModel model, ReadOnlySpan<int> nodes)
    {
        double x = 0, y = 0;
        foreach (int node in nodes)
        {
            x += model.Mesh.X[node] / nodes.Length;
            y += model.Mesh.Y[node] / nodes.Length;
        }
        return (x, y);
    }

    /// <summary>The place of a position along a joint, on the straight line between the stations beside it.</summary>
    private static (double X, double Y) Place(SpecimenModel model, LayerBlock layer, int e, double along)
    {
        ReadOnlySpan<int> nodes = layer.Nodes(e);
        int left = 0;
        while (left + 2 < layer.Stations && layer.StationPosition(e, left + 1) < along)
            left++;
        double start = layer.StationPosition(e, left), share = (along - start) / (layer.StationPosition(e, left + 1) - start);
        double[] xs = model.Mesh.X, ys = model.Mesh.Y;
        return (xs[nodes[left]] + share * (xs[nodes[left + 1]] - xs[nodes[left]]), ys[nodes[left]] + share * (ys[nodes[left + 1]] - ys[nodes[left]]));
    }

    private static bool Finite(ReadOnlySpan<double> values)
    {
        foreach (double value in values)
            if (!double.IsFinite(value))
                return false;
        return true;
    }

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
