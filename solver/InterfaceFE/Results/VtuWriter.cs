using InterfaceFE.Geometry;

namespace InterfaceFE.Results;

/// <summary>
/// Fields of a point as two VTU files: the adherends (quadratic quads or quads) and the layers (quadratic edges or lines on the mid-line between the faces of each
/// pair; every element has points of its own, so a jump between elements stays one). Coordinates are those before deformation, in mm. Data of the file as a whole tell
/// point, stage, time, and the index of each adherend or joint as a number under its name: one of the two readers that the files are tried with takes no array of text.
/// </summary>
public static class VtuWriter
{
    /// <summary>Writes the adherends: displacement, stresses, plastic strain and temperature at the nodes, index of the adherend at the cells.</summary>
    /// <param name="path">File; its folder must exist.</param>
    /// <param name="mesh">The mesh.</param>
    /// <param name="fields">Fields on that mesh.</param>
    public static void WriteSolids(string path, Mesh mesh, FieldSnapshot fields)
    {
        ArgumentNullException.ThrowIfNull(mesh);
        ArgumentNullException.ThrowIfNull(fields);
        int perSolid = mesh.NodesPerSolid;
        int cells = mesh.Adherends.Sum(adherend => adherend.Connectivity.Length / perSolid);
        long[] connectivity = new long[cells * perSolid];
        int[] adherends = new int[cells];
        int next = 0;
        for (int a = 0; a < mesh.Adherends.Count; a++)
        {
            int[] nodes = mesh.Adherends[a].Connectivity;
            adherends.AsSpan(next / perSolid, nodes.Length / perSolid).Fill(a);
            foreach (int node in nodes)
                connectivity[next++] = node;
        }

        VtuFile file = new(mesh.X, mesh.Y, connectivity, perSolid, cellType: perSolid == 8 ? (byte)23 : (byte)9);
        double[] temperature = new double[mesh.NodeCount];
        temperature.AsSpan().Fill(Celsius.From(fields.Temperature));
        file.AddPointVectors("displacement [mm]", fields.DisplacementX, fields.DisplacementY);
        file.AddPointData("stress xx [MPa]", fields.StressXx);
        file.AddPointData("stress yy [MPa]", fields.StressYy);
        file.AddPointData("stress zz [MPa]", fields.StressZz);
        file.AddPointData("stress xy [MPa]", fields.StressXy);
        file.AddPointData("equivalent stress [MPa]", fields.EquivalentStress);
        file.AddPointData("plastic strain", fields.PlasticStrain);
        file.AddPointData("temperature [°C]", temperature);
        file.AddCellData("adherend", adherends);
        for (int a = 0; a < mesh.Adherends.Count; a++)
            file.AddFieldData($"adherend {mesh.Adherends[a].Name}", [a]);
        AddWhen(file, fields);
        WholeFile.Write(path, file.Write);
    }

    /// <summary>Writes the layers of all joints: separations, tractions, damage and the displacement of the mid-line at the stations, joint and bond at the cells.</summary>
    /// <param name="path">File; its folder must exist.</param>
    /// <param name="mesh">The mesh.</param>
    /// <param name="fields">Fields on that mesh.</param>
    public static void WriteLayers(string path, Mesh mesh, FieldSnapshot fields)
    {
        ArgumentNullException.ThrowIfNull(mesh);
        ArgumentNullException.ThrowIfNull(fields);
        int perFace = mesh.NodesPerFace;
        List<double> x = [], y = [], ux = [], uy = [];
        List<double> opening = [], sliding = [], peel = [], shear = [], damage = [];
        List<int> joints = [], bonded = [];
        foreach (LayerField layer in fields.Layers)
        {
            MeshedJoint joint = mesh.Joints[layer.Joint];
            for (int i = 0; i < joint.LowerNodes.Length; i++)
            {
                int lower = joint.LowerNodes[i], upper = joint.UpperNodes[i];
                x.Add(0.5 * (mesh.X[lower] + mesh.X[upper]));
                y.Add(0.5 * (mesh.Y[lower] + mesh.Y[upper]));
                ux.Add(0.5 * (fields.DisplacementX[lower] + fields.DisplacementX[upper]));
                uy.Add(0.5 * (fields.DisplacementY[lower] + fields.DisplacementY[upper]));
            }
            opening.AddRange(layer.Opening);
            sliding.AddRange(layer.Sliding);
            peel.AddRange(layer.Peel);
            shear.AddRange(layer.Shear);
            damage.AddRange(layer.Damage);
            foreach (bool isBonded in joint.Bonded)
            {
                joints.Add(layer.Joint);
                bonded.Add(isBonded ? 1 : 0);
            }
        }

        VtuFile file = new([.. x], [.. y], Edges(joints.Count, perFace), perFace, cellType: perFace == 3 ? (byte)21 : (byte)3);
        file.AddPointVectors("displacement [mm]", [.. ux], [.. uy]);
        file.AddPointData("opening [mm]", [.. opening]);
        file.AddPointData("sliding [mm]", [.. sliding]);
        file.AddPointData("peel traction [MPa]", [.. peel]);
        file.AddPointData("shear traction [MPa]", [.. shear]);
        file.AddPointData("damage", [.. damage]);
        file.AddCellData("joint", [.. joints]);
        file.AddCellData("bonded", [.. bonded]);
        for (int j = 0; j < mesh.Joints.Count; j++)
            file.AddFieldData($"joint {mesh.Joints[j].Name}", [j]);
        AddWhen(file, fields);
        WholeFile.Write(path, file.Write);
    }

    /// <summary>Points of each edge: stations run start, middle, end; the format wants start, end, middle.</summary>
    private static long[] Edges(int count, int perFace)
    {
        long[] edges = new long[count * perFace];
        for (int i = 0; i < count; i++)
        {
            long first = (long)i * perFace;
            edges[first] = first;
            edges[first + 1] = first + perFace - 1;
            if (perFace == 3)
                edges[first + 2] = first + 1;
        }
        return edges;
    }

    private static void AddWhen(VtuFile file, FieldSnapshot fields)
    {
        file.AddFieldData("point", [fields.Point]);
        file.AddFieldData("stage", [fields.Stage]);
        file.AddFieldData("time [s]", [fields.Time]);
    }
}
