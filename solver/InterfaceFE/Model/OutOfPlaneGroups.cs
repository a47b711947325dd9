using InterfaceFE.Geometry;

namespace InterfaceFE.Model;

/// <summary>Adherends that strain out of plane together: those that joints tie to each other, directly or over others.</summary>
public sealed class OutOfPlaneGroups
{
    private readonly int[] _group;

    /// <summary>Finds the groups of a mesh.</summary>
    /// <param name="mesh">The mesh.</param>
    /// <param name="length">Length to which elongations are counted [mm].</param>
    /// <param name="given">Strain that is given; null: the one that leaves no force out of plane.</param>
    public OutOfPlaneGroups(Mesh mesh, double length, double? given)
    {
        Length = length;
        Given = given;
        int[] root = [.. Enumerable.Range(0, mesh.Adherends.Count)];
        foreach (MeshedJoint joint in mesh.Joints)
        {
            int from = Math.Max(root[joint.UpperAdherend], root[joint.LowerAdherend]), to = Math.Min(root[joint.UpperAdherend], root[joint.LowerAdherend]);
            for (int i = 0; i < root.Length; i++)
                if (root[i] == from)
                    root[i] = to;
        }
        int[] roots = [.. root.Distinct()];
        _group = [.. root.Select(r => Array.IndexOf(roots, r))];
        Count = roots.Length;
    }

    /// <summary>Number of groups.</summary>
    public int Count { get; }

    /// <summary>Length to which elongations are counted [mm].</summary>
    public double Length { get; }

    /// <summary>Strain that is given; null: the one that leaves no force out of plane.</summary>
    public double? Given { get; }

    /// <summary>Group of an adherend.</summary>
    public int Of(int adherend) => _group[adherend];

    /// <summary>First adherend of a group.</summary>
    public int FirstOf(int group) => Array.IndexOf(_group, group);
}
