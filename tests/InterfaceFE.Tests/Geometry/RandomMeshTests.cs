using CsCheck;
using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;
using static InterfaceFE.Tests.Geometry.MeshDecks;

namespace InterfaceFE.Tests.Geometry;

public class RandomMeshTests
{
    [Fact]
    public void Random_stacks_are_paired_graded_and_never_coarser_than_wanted() => Gen.Int[0, int.MaxValue].Sample(CheckStack, iter: 150, threads: 1);

    [Fact]
    public void Random_sheets_keep_area_and_growth() => Gen.Int[0, int.MaxValue].Sample(CheckSheet, iter: 150, threads: 1);

    [Fact]
    public void Nonsense_is_refused_or_meshed_and_never_ends_otherwise() => Gen.Int[0, int.MaxValue].Sample(CheckNonsense, iter: 400, threads: 1);

    private static void CheckNonsense(int seed)
    {
        Random random = new(seed);
        double[] odd = [0, -1, double.NaN, double.PositiveInfinity, 1e300, 1e-300, 1e12, 1e-12, 1e-6, 3, 7, 40, 100];
        double Value(double usual) => random.Next(12) == 0 ? odd[random.Next(odd.Length)] : usual;
        int? Number() => random.Next(4) == 0 ? random.Next(1, 200) : null;
        ElementsDeck? Elements() => random.Next(3) != 0 ? null : new ElementsDeck
        {
            Along = Number(),
            Through = Number(),
            Length = random.Next(6) == 0 ? Value(2) : null,
            Growth = Value(1.2),
            Finer = random.Next(4) == 0 ? [new FinerDeck { From = Value(10), To = Value(20), Length = Value(0.5) }] : null,
        };
        double height = Value(3);
        double foot = height + 1;
        Dictionary<string, AdherendDeck> adherends = new()
        {
            ["a"] = Rectangle(Value(0), 0, Value(100), height, Elements()),
            ["b"] = random.Next(2) == 0
                ? Rectangle(Value(0), height, Value(100), Value(2), Elements())
                : Sheet(Value(2), random.Next(8) == 0 ? null : Value(4), [[Value(10), foot], [Value(60), foot], [Value(70), foot + Value(30)], [Value(90), foot + Value(30)]], new() { ["foot"] = random.Next(1, 5) }, Elements()),
        };
        string upper = adherends["b"].Rectangle != null ? "bottom of b" : random.Next(9) == 0 ? "upper face of b" : "foot of b";
        Dictionary<string, JointDeck> joints = new()
        {
            ["j"] = Joint(upper, random.Next(9) == 0 ? "bottom of a" : "top of a", random.Next(9) == 0 ? "none" : "layer",
                random.Next(2) == 0 ? new StarterCrackDeck { From = JointEnd.Start, Length = Value(20) } : null,
                random.Next(2) == 0 ? [new StretchDeck { From = Value(25), To = Value(30) }] : null,
                random.Next(3) == 0 ? Value(1) : null),
        };
        LayerDeck layer = Layer((CurveShape)random.Next(4), Value(10), Value(5), Value(2), 1);
        Dictionary<string, GripDeck> grips = new()
        {
            ["g"] = new GripDeck { On = [random.Next(9) == 0 ? "nowhere" : "left end of a"], At = random.Next(2) == 0 ? new EdgePoint(double.NaN, Value(1)) : null },
            ["h"] = new GripDeck { On = [upper], From = Value(3), To = Value(6) },
        };
        try
        {
            MeshFacts.Check(Deck(adherends, joints, layer, (ElementKind)random.Next(2), grips));
        }
        catch (DeckException refused)
        {
            Assert.NotEmpty(refused.Problems);
            Assert.All(refused.Problems, p => Assert.True(p.Path.Length > 0 && p.Message.Length > 10));
        }
    }

    private static void CheckStack(int seed)
    {
        Random random = new(seed);
        double scale = Math.Pow(10, random.Next(-2, 3));
        double Between(double a, double b) => a + (b - a) * random.NextDouble();
        int bodies = random.Next(2, 5);
        double growth = 1 + Math.Pow(10, Between(-1.5, 0.4));
        Dictionary<string, AdherendDeck> adherends = [];
        Dictionary<string, JointDeck> joints = [];
        Dictionary<string, GripDeck> grips = [];
        double y = Between(-5, 5) * scale;
        double x = 0;
        double length = Between(60, 200) * scale;
        List<(double X, double Length)> bodiesAt = [];
        for (int i = 0; i < bodies; i++)
        {
            double height = Between(1, 8) * scale;
            ElementsDeck elements = new()
            {
                Growth = growth,
                Finer = random.Next(3) == 0 ? [new FinerDeck { From = 0.3 * length, To = 0.4 * length, Length = Between(0.1, 1) * height }] : null,
                Length = random.Next(3) == 0 ? Between(0.5, 3) * height : null,
            };
            adherends[$"body {i}"] = Rectangle(x, y, length, height, elements);
            if (random.Next(2) == 0)
                grips[$"grip {i}"] = new GripDeck { On = [$"top of body {i}"], At = new EdgePoint(double.NaN, Between(0, 1) * length) };
            bodiesAt.Add((x, length));
            if (i > 0)
            {
                double start = Math.Max(x, bodiesAt[i - 1].X);
                double overlap = Math.Min(x + length, bodiesAt[i - 1].X + bodiesAt[i - 1].Length) - start;
                joints[$"joint {i}"] = Joint($"bottom of body {i}", $"top of body {i - 1}",
                    crack: random.Next(2) == 0 ? new StarterCrackDeck { From = (JointEnd)random.Next(2), Length = Between(0.05, 0.4) * overlap } : null,
                    unbonded: random.Next(3) == 0 ? [new StretchDeck { From = 0.45 * overlap, To = Between(0.46, 0.59) * overlap }] : null,
                    length: random.Next(3) == 0 ? Between(0.2, 4) * scale : null);
            }
            y += height;
            // The next body overlaps a part of this one, or all of it.
            double next = Between(40, 200) * scale;
            x += random.Next(3) == 0 ? 0 : Between(-0.6 * next, 0.6 * length);
            length = next;
        }
        LayerDeck layer = Layer(CurveShape.Trapezoid, Between(1, 10) / scale, Between(0.2, 2), Between(1, 4) * scale, scale);
        Deck deck = Deck(adherends, joints, layer, (ElementKind)random.Next(2), grips);
        MeshingResult result = MeshFacts.Check(deck);
        CheckMirrorImage(result.Mesh, Mirrored(deck));
        Assert.DoesNotContain(result.Warnings, w => w.Contains("growth", StringComparison.Ordinal));
        Mesh mesh = result.Mesh;
        foreach (MeshedAdherend adherend in mesh.Adherends)
        {
            AdherendDeck body = adherends[adherend.Name];
            Close.To(body.Rectangle!.Size[0] * body.Rectangle.Size[1], MeshFacts.Area(mesh, adherend), 1e-10);
            CheckGrowth(MeshFacts.Lengths(mesh, adherend.Edges["top"]), growth);
        }
        foreach (MeshedJoint joint in mesh.Joints)
        {
            double wanted = joints[joint.Name].ElementLength ?? joint.OnePercentLength / 2;
            for (int e = 0; e < joint.ElementCount; e++)
                Assert.True(!joint.Bonded[e] || joint.Position[e + 1] - joint.Position[e] <= wanted * (1 + 1e-8));
            if (joints[joint.Name].StarterCrack is { } crack)
            {
                double tip = crack.From == JointEnd.Start ? crack.Length : joint.Position[^1] - crack.Length;
                int at = Array.FindIndex(joint.Position, p => Math.Abs(p - tip) <= 1e-9 * joint.Position[^1]);
                Assert.True(at > 0);
                Assert.NotEqual(joint.Bonded[at - 1], joint.Bonded[at]);
            }
        }
    }

    /// <summary>The deck of rectangles with x turned to -x.</summary>
    private static Deck Mirrored(Deck deck)
    {
        Dictionary<string, AdherendDeck> adherends = [];
        foreach ((string name, AdherendDeck body) in deck.Adherends)
        {
            double length = body.Rectangle!.Size[0];
            FinerDeck[]? finer = body.Elements!.Finer?.Select(f => f with { From = length - f.To, To = length - f.From }).ToArray();
            adherends[name] = body with
            {
                Rectangle = body.Rectangle with { Corner = [-body.Rectangle.Corner[0] - length, body.Rectangle.Corner[1]] },
                Elements = body.Elements with { Finer = finer },
            };
        }
        double LengthOf(string edge) => deck.Adherends[EdgeName.Parse(edge, "").Adherend].Rectangle!.Size[0];
        double Overlap(JointDeck joint)
        {
            RectangleDeck a = deck.Adherends[EdgeName.Parse(joint.Upper, "").Adherend].Rectangle!;
            RectangleDeck b = deck.Adherends[EdgeName.Parse(joint.Lower, "").Adherend].Rectangle!;
            return Math.Min(a.Corner[0] + a.Size[0], b.Corner[0] + b.Size[0]) - Math.Max(a.Corner[0], b.Corner[0]);
        }
        return deck with
        {
            Adherends = adherends,
            Joints = deck.Joints!.ToDictionary(j => j.Key, j => j.Value with
            {
                StarterCrack = j.Value.StarterCrack == null ? null : j.Value.StarterCrack with { From = 1 - j.Value.StarterCrack.From },
                Unbonded = j.Value.Unbonded?.Select(u => new StretchDeck { From = Overlap(j.Value) - u.To, To = Overlap(j.Value) - u.From }).ToArray(),
            }),
            Grips = deck.Grips.ToDictionary(g => g.Key, g => g.Value with { At = new EdgePoint(double.NaN, LengthOf(g.Value.On[0]) - g.Value.At!.Value.Distance) }),
        };
    }

    private static void CheckMirrorImage(Mesh mesh, Deck mirrored)
    {
        Mesh image = Mesher.Build(mirrored).Mesh;
        Assert.Equal(mesh.NodeCount, image.NodeCount);
        for (int i = 0; i < mesh.Adherends.Count; i++)
        {
            MeshedEdge top = mesh.Adherends[i].Edges["top"];
            MeshedEdge imageTop = image.Adherends[i].Edges["top"];
            Assert.Equal(top.Nodes.Length, imageTop.Nodes.Length);
            for (int j = 0; j < top.Nodes.Length; j++)
                Close.To(top.Length - top.Arc[j], imageTop.Arc[^(j + 1)], 0, 1e-9 * top.Length);
        }
    }

    private static void CheckSheet(int seed)
    {
        Random random = new(seed);
        double scale = Math.Pow(10, random.Next(-2, 3));
        int points = random.Next(2, 7);
        double angle = random.NextDouble() * 2 * Math.PI;
        double[][] line = new double[points][];
        double thickness = (0.5 + 2 * random.NextDouble()) * scale;
        double radius = thickness * (0.6 + 3 * random.NextDouble());
        line[0] = [random.NextDouble() * scale, random.NextDouble() * scale];
        double exact = 0;
        for (int i = 1; i < points; i++)
        {
            double turn = i == 1 ? 0 : (random.NextDouble() - 0.5) * Math.PI * 1.2;
            turn = Math.Abs(turn) < 0.05 ? 0 : turn;
            double length = (40 + 40 * random.NextDouble()) * scale;
            angle += turn;
            line[i] = [line[i - 1][0] + length * Math.Cos(angle), line[i - 1][1] + length * Math.Sin(angle)];
            exact += length + radius * (Math.Abs(turn) - 2 * Math.Tan(Math.Abs(turn) / 2));
        }
        double growth = 1 + Math.Pow(10, 1.9 * random.NextDouble() - 1.5);
        ElementKind kind = (ElementKind)random.Next(2);
        Mesh mesh = MeshFacts.Check(Deck(new() { ["sheet"] = Sheet(thickness, radius, line, null, new ElementsDeck { Growth = growth }) }, kind: kind)).Mesh;
        MeshedAdherend sheet = mesh.Adherends[0];
        Close.To(exact * thickness, MeshFacts.Area(mesh, sheet), kind == ElementKind.EightNode ? 1e-5 : 2e-3);
        double[] upper = WalkedLengths(mesh, sheet.Edges["upper face"]);
        double[] lower = WalkedLengths(mesh, sheet.Edges["lower face"]);
        CheckGrowth([.. upper.Zip(lower, (a, b) => (a + b) / 2)], growth);
    }

    /// <summary>Lengths in the order of the walk, in which nodes are numbered: the two faces may start at different ends.</summary>
    private static double[] WalkedLengths(Mesh mesh, MeshedEdge edge)
    {
        double[] lengths = MeshFacts.Lengths(mesh, edge);
        if (edge.Nodes[0] > edge.Nodes[^1])
            Array.Reverse(lengths);
        return lengths;
    }

    private static void CheckGrowth(double[] lengths, double growth)
    {
        for (int i = 1; i < lengths.Length; i++)
            Assert.True(Math.Max(lengths[i] / lengths[i - 1], lengths[i - 1] / lengths[i]) <= growth * (1 + 1e-7), $"growth {growth}: {lengths[i - 1]}, {lengths[i]} at {i}");
    }
}
