namespace InterfaceFE.Benchmarks.Models;

/// <summary>A set of slots that changes at one place, with a few sets of new matrices to go through in turn, so that each change is a real one.</summary>
/// <param name="Slots">Slots.</param>
/// <param name="Matrices">Sets of matrices, one per slot each.</param>
public sealed record ElementChange(int[] Slots, double[][][] Matrices)
{
    private const int Sets = 3;

    /// <summary>Unknowns of the slots, each once, rising.</summary>
    public int[] Unknowns(BenchmarkModel model)
    {
        ArgumentNullException.ThrowIfNull(model);
        SortedSet<int> all = [];
        foreach (int slot in Slots)
            foreach (int unknown in model.Pattern.Unknowns(slot))
                all.Add(unknown);
        return [.. all];
    }

    /// <summary>
    /// Neighbouring layer elements that soften as in a process zone, at several places spread evenly over the inner eight tenths of all bonded stretches.
    /// </summary>
    /// <param name="model">The model.</param>
    /// <param name="count">Neighbouring elements at a place.</param>
    /// <param name="places">Number of places.</param>
    public static ElementChange[] OfLayer(BenchmarkModel model, int count, int places)
    {
        ArgumentNullException.ThrowIfNull(model);
        int bonded = model.Mesh.Joints.Sum(joint => joint.Bonded);
        var changes = new ElementChange[places];
        for (int p = 0; p < places; p++)
        {
            int middle = (int)(bonded * (0.1 + 0.8 * (p + 0.5) / places)), passed = 0;
            BenchmarkJoint joint = model.Mesh.Joints.First(j => (passed += j.Bonded) > middle);
            // Zones stay a few elements away from the joint's ends.
            int inJoint = middle - (passed - joint.Bonded), most = joint.Bonded - count - 2;
            int first = joint.FirstElement + joint.FirstBonded + Math.Clamp(inJoint - count / 2, Math.Min(2, Math.Max(most, 0)), Math.Max(most, 0));
            int[] elements = [.. Enumerable.Range(first, Math.Min(count, joint.Bonded))];
            changes[p] = new ElementChange(
                [.. elements.Select(model.LayerSlot)],
                [.. Enumerable.Range(0, Sets).Select(set => elements.Select((e, i) => model.LayerMatrix(e, Level(i, elements.Length, set))).ToArray())]);
        }
        return changes;
    }

    /// <summary>Yielding columns: all solid and layer elements whose middle lies within a width around a place, over the full height.</summary>
    /// <param name="model">The model of a strip.</param>
    /// <param name="width">Width [mm].</param>
    /// <param name="middle">x of the patch's middle [mm].</param>
    public static ElementChange OfColumns(BenchmarkModel model, double width, double middle)
    {
        ArgumentNullException.ThrowIfNull(model);
        BenchmarkMesh mesh = model.Mesh;
        int[] solids = [.. Enumerable.Range(0, mesh.SolidCount).Where(e => IsWithin(mesh.MiddleX(mesh.SolidNodes(e))))];
        int[] layers = [.. Enumerable.Range(0, mesh.LayerCount).Where(e => IsWithin(mesh.MiddleX(mesh.LayerNodes(e))))];
        return new ElementChange(
            [.. solids, .. layers.Select(model.LayerSlot)],
            [.. Enumerable.Range(1, ElementMatrices.SolidStates - 1).Select(state => (double[][])
            [
                .. solids.Select(e => model.SolidMatrix(e, state)), .. layers.Select((e, i) => model.LayerMatrix(e, Level(i, layers.Length, state))),
            ])]);

        bool IsWithin(double x) => Math.Abs(x - middle) < 0.5 * width;
    }

    /// <summary>Levels fall through the zone; each set starts a third of the zone further on, so that every element gets numbers well away from those it had.</summary>
    private static int Level(int element, int count, int set) => 1 + (int)((ElementMatrices.OpenLevel - 2) * (((double)element / count + (double)set / Sets) % 1));
}
