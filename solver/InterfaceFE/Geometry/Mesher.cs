using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Makes the mesh of a deck: the same deck gives the same mesh, and a mirrored deck the mirrored mesh.</summary>
public static class Mesher
{
    /// <summary>Meshes all adherends and pairs the faces of all joints.</summary>
    /// <param name="deck">Deck in internal units.</param>
    /// <returns>The mesh, with notes on the chosen lengths and warnings.</returns>
    /// <exception cref="DeckException">When shapes, edges, joints, places or numbers of elements cannot be; key paths name the places.</exception>
    public static MeshingResult Build(Deck deck)
    {
        ArgumentNullException.ThrowIfNull(deck);
        List<string> notes = [];
        List<string> warnings = [];
        bool quadratic = deck.Model.Elements == ElementKind.EightNode;
        Strip[] strips = StripBuilder.Build(deck);
        PlacesOnEdges places = PlacesOnEdges.Collect(deck, strips);
        JointPlan[] joints = new JointPlanner(deck, strips).Plan();
        DivisionPlanner planner = new(deck, strips, joints, places, notes, warnings);
        Dictionary<Run, double[]> along = planner.Divide();
        StripGrid[] grids = LayOut(deck, strips, joints, places, along, quadratic);
        Mesh mesh = Assemble(grids, joints, planner, quadratic);
        for (int i = 0; i < strips.Length; i++)
            ElementCheck.Check(strips[i], mesh.Adherends[i].Connectivity, mesh.NodesPerSolid, mesh.X, mesh.Y);
        foreach (StripGrid grid in grids)
            notes.Add(NoteOn(grid, along, quadratic));
        foreach (JointPlan joint in joints)
            Describe(joint, planner.LongestBonded(joint), quadratic, notes, warnings);
        return new MeshingResult(mesh, notes, warnings);
    }

    private static StripGrid[] LayOut(Deck deck, Strip[] strips, JointPlan[] joints, PlacesOnEdges places, Dictionary<Run, double[]> along, bool quadratic)
    {
        StripGrid[] grids = new StripGrid[strips.Length];
        long nodes = 0;
        for (int i = 0; i < strips.Length; i++)
        {
            Strip strip = strips[i];
            double bonded = joints.Where(j => j.Upper.Strip == strip || j.Lower.Strip == strip).Select(j => j.Wanted).DefaultIfEmpty(double.PositiveInfinity).Min();
            double[] lines = ThroughDivision.Choose(strip, deck.Model.Elements, bonded, (ZoneAt(strip, Side.Lower, joints), ZoneAt(strip, Side.Upper, joints)), places.OnEnds[i],
                deck.Materials[strip.Deck.Of].YieldCurve is not null);
            int elementsAlong = strip.Runs.Sum(r => along[r].Length - 1);
            if (quadratic && elementsAlong == 1 && lines.Length == 2)
                throw new DeckException(strip.Path + ".elements", $"\"{strip.Name}\" would be one single eight-node element, which can deform in a way that costs no energy: use two at least, along or through the thickness");
            int first = (int)nodes;
            nodes += StripGrid.CountNodes(elementsAlong, lines.Length - 1, quadratic);
            if (nodes > Grading.MostNodes)
                throw new DeckException(strip.Path, Text.Of($"with \"{strip.Name}\" ({elementsAlong} by {lines.Length - 1} elements) the mesh has {nodes} nodes; {Grading.MostNodes} are possible: make lengths of elements longer or numbers smaller"));
            grids[i] = new StripGrid(strip, along, lines, quadratic, first);
        }
        return grids;
    }

    private static Mesh Assemble(StripGrid[] grids, JointPlan[] joints, DivisionPlanner planner, bool quadratic)
    {
        int count = grids.Sum(g => g.NodeCount);
        double[] x = new double[count];
        double[] y = new double[count];
        List<MeshedAdherend> adherends = [];
        int first = 0;
        foreach (StripGrid grid in grids)
        {
            grid.WriteNodes(x, y);
            adherends.Add(new MeshedAdherend
            {
                Name = grid.Strip.Name,
                Material = grid.Strip.Deck.Of,
                Width = grid.Strip.Width,
                Thickness = grid.Strip.Thickness,
                Connectivity = grid.Connectivity(),
                FirstNode = first,
                NodeCount = grid.NodeCount,
                ElementsAlong = grid.ElementsAlong,
                ElementsThrough = grid.ElementsThrough,
                PlyOfRow = PlyStack.Rows(grid.Strip, grid.Lines),
                Edges = grid.Edges(),
                StraightAlongX = grid.Strip.StraightAlongX,
            });
            first += grid.NodeCount;
        }
        List<MeshedJoint> meshed = [.. joints.Select(j => Pair(j, planner.EndsOf(j), grids, quadratic, x, y))];
        return new Mesh { X = x, Y = y, NodesPerSolid = quadratic ? 8 : 4, Adherends = adherends, Joints = meshed };
    }

    private static MeshedJoint Pair(JointPlan joint, Span ends, StripGrid[] grids, bool quadratic, double[] x, double[] y)
    {
        (int[] lower, double[] at) = grids[joint.Lower.Strip.Index].FaceBetween(joint.Lower, ends);
        (int[] upper, double[] atUpper) = grids[joint.Upper.Strip.Index].FaceBetween(joint.Upper, ends);
        if (!at.AsSpan().SequenceEqual(atUpper) || at.Length < 2)
            throw new InvalidOperationException($"The faces of joint {joint.Name} were divided unequally: {at.Length} and {atUpper.Length} lines.");
        // Faces may lie a millionth of a thickness off: the upper one is laid on the lower one, or the layer's drawn thickness above it.
        for (int i = 0; i < lower.Length; i++)
            (x[upper[i]], y[upper[i]]) = (x[lower[i]], y[lower[i]] + joint.DrawnThickness);
        int elements = at.Length - 1;
        bool[] bonded = new bool[elements];
        for (int i = 0; i < elements; i++)
            bonded[i] = joint.IsBonded((at[i] + at[i + 1]) / 2);
        return new MeshedJoint
        {
            Name = joint.Name,
            Layer = joint.Deck.Layer,
            Width = joint.Width,
            UpperAdherend = joint.Upper.Strip.Index,
            LowerAdherend = joint.Lower.Strip.Index,
            LowerNodes = PerElement(lower, elements, quadratic),
            UpperNodes = PerElement(upper, elements, quadratic),
            Bonded = bonded,
            Position = [.. at.Select(p => p - at[0])],
            OnePercentLength = joint.Length.OnePercent,
            ProcessZoneEstimate = joint.Length.Zone,
        };
    }

    /// <summary>A row of nodes as elements (start, middle, end) or (start, end).</summary>
    private static int[] PerElement(int[] row, int elements, bool quadratic)
    {
        int perFace = quadratic ? 3 : 2;
        int[] nodes = new int[elements * perFace];
        for (int i = 0; i < elements; i++)
            for (int j = 0; j < perFace; j++)
                nodes[i * perFace + j] = row[i * (perFace - 1) + j];
        return nodes;
    }

    private static string NoteOn(StripGrid grid, Dictionary<Run, double[]> along, bool quadratic)
    {
        double shortest = double.PositiveInfinity;
        double longest = 0;
        foreach (Run run in grid.Strip.Runs)
        {
            double[] points = along[run];
            for (int i = 1; i < points.Length; i++)
            {
                shortest = Math.Min(shortest, Math.Abs(points[i] - points[i - 1]));
                longest = Math.Max(longest, Math.Abs(points[i] - points[i - 1]));
            }
        }
        return Text.Of($"{grid.Strip.Name}: {grid.ElementsAlong} by {grid.ElementsThrough} {(quadratic ? "eight" : "four")}-node elements, {shortest:G4} to {longest:G4} mm long, {grid.Strip.Thickness / grid.ElementsThrough:G4} mm high on average");
    }

    private static void Describe(JointPlan joint, double longest, bool quadratic, List<string> notes, List<string> warnings)
    {
        JointLength length = joint.Length;
        string by = joint.Deck.ElementLength is { } given
            ? Text.Of($"the deck asks for {given:G4} mm; left out it would be {length.Default:G4} mm by {length.Reason}")
            : Text.Of($"wanted {length.Default:G4} mm by {length.Reason}");
        string share = quadratic ? "" : " (a third of the formula, for four-node elements)";
        notes.Add(Text.Of($"{joint.Name}: elements along the bond up to {longest:G4} mm; {by}; 1 % error at about {length.OnePercent:G4} mm{share}, decided by {length.Mode} with a process zone of about {length.Zone:G4} mm"));
        if (longest > length.OnePercent * (1 + 1e-6))
            warnings.Add(Text.Of($"{joint.Name}: elements along the bond are up to {longest:G4} mm long, above the {length.OnePercent:G4} mm at which the error is about 1 %{share}; process zone about {length.Zone:G4} mm in {length.Mode}"));
    }

    private static double ZoneAt(Strip strip, Side side, JointPlan[] joints)
    {
        double zone = double.PositiveInfinity;
        foreach (JointPlan joint in joints)
            foreach (JointFace face in (ReadOnlySpan<JointFace>)[joint.Upper, joint.Lower])
                if (face.Strip == strip && face.Side == side)
                    zone = Math.Min(zone, joint.Length.Zone);
        return zone;
    }
}
