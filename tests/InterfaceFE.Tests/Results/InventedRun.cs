using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Tests.Results;

/// <summary>
/// Invented runs that look like real ones: a peel coupon whose front grows under two stages, and a hat section on a panel with two strips. The numbers follow simple
/// beam formulas and are no results of any calculation.
/// </summary>
internal static class InventedRun
{
    private const double StarterTip = 30;

    /// <summary>A peel coupon, cooled first, then pulled open; unstable where growth begins.</summary>
    public static RunHistory Peel(bool quadratic = true, int points = 41, int keepEvery = 4)
    {
        (double, double)[] lower = [.. InventedMesh.Run((0, 0), (120, 0), 120)];
        (double, double)[] upper = [.. InventedMesh.Run((0, 4), (120, 4), 120)];
        Mesh mesh = new InventedMesh(quadratic)
            .Strip("lower arm", 4, 2, lower)
            .Strip("upper arm", 4, 2, upper)
            .Joint("bond", 0, 1, 0, 0, 120, position => position > StarterTip)
            .Build();
        RunHistory history = new()
        {
            Title = "Invented peel coupon of a ferry's deckhouse tape, cold",
            Mesh = mesh,
            Grips = [new GripInfo("upper block", true, 0, 1, false, 0, 6), new GripInfo("lower block", false, 0, 0, false, 0, 2)],
            CurvesOf = ["upper block"],
            Gauges = [new GaugeInfo("clip gauge", "mm"), new GaugeInfo("far strain", "-")],
            Stages = ["cool to -40 °C", "pull upper block along +y by 12 mm"],
        };
        for (int i = 0; i < points; i++)
            AddPeelPoint(history, mesh, i, points, keepEvery);
        return history;
    }

    /// <summary>A summary that goes with <see cref="Peel"/>.</summary>
    public static RunSummary PeelSummary(RunHistory history)
    {
        PointRow peak = history.Points.MaxBy(point => point.Grips[0].Force)!;
        RunSummary summary = new() { Status = RunStatus.Finished, Cause = "", Title = history.Title, KernelWidth = 256, Version = "0.1.0", DeckHash = new string('a', 64) };
        summary.Grips.Add(new GripSummary
        {
            Name = "upper block",
            PeakForce = peak.Grips[0].Force,
            DisplacementAtPeak = peak.Grips[0].Displacement,
            PeakPoint = peak.Point,
            FinalForce = history.Points[^1].Grips[0].Force,
            FinalDisplacement = history.Points[^1].Grips[0].Displacement,
        });
        summary.Joints.Add(new JointSummary
        {
            Name = "bond",
            LargestOpening = 7.25,
            LargestSliding = 0.1,
            LargestPeelStrain = 6.6,
            LargestShearStrain = 0.09,
            LargestDamage = 1,
            LargestPeel = 0.5,
            LargestShear = 0.125,
            SeparatedLength = 40,
            ElementLength = 1,
            ElementsPerProcessZone = 9,
        });
        summary.Adherends.Add(new AdherendSummary { Name = "upper arm", LargestEquivalentStress = 180.5, X = 41, Y = 8, Point = peak.Point, LargestPlasticStrain = 0.0015 });
        summary.FirstDamage = new EventSummary("bond at 30 mm", 8, 2, 0.1);
        summary.SelfCheck.Balance = 3.2e-12;
        summary.SelfCheck.PathError = 0.0041;
        summary.SelfCheck.Verdict = Verdict.HoldWithCare;
        summary.SelfCheck.Reasons.Add("the path error is above 0.2 %");
        summary.Remarks.Add("J rotation is empty: the arms are not straight");
        summary.Counts["unknowns"] = 2L * history.Mesh.NodeCount;
        summary.WallSeconds["march"] = 1.25;
        return summary;
    }

    /// <summary>A hat section on a panel, pulled at its crown; coarse, two joints, the left one opens.</summary>
    public static RunHistory Hat(bool quadratic = true)
    {
        (double, double)[] panel = [.. InventedMesh.Run((0, 0), (300, 0), 150)];
        List<(double, double)> hat = [];
        (double, double)[] corners = [(40, 4), (100, 4), (120, 44), (180, 44), (200, 4), (260, 4)];
        int[] pieces = [30, 20, 30, 20, 30];
        for (int i = 0; i < pieces.Length; i++)
            hat.AddRange(InventedMesh.Run(corners[i], corners[i + 1], pieces[i]).Skip(i == 0 ? 0 : 1));
        Mesh mesh = new InventedMesh(quadratic)
            .Strip("panel", 4, 2, panel)
            .Strip("hat", 2, 2, [.. hat])
            .Joint("left strip", 0, 1, 20, 0, 30, position => position > 10)
            .Joint("right strip", 0, 1, 100, 100, 30, _ => true)
            .Build();
        RunHistory history = new()
        {
            Title = "Invented stiffener taped to a deckhouse roof panel, a cold night",
            Mesh = mesh,
            Grips = [new GripInfo("crown", true, 0, 1, false, 150, 46), new GripInfo("hinge/Öse", true, 0, 0, true, 300, 2), new GripInfo("ends", false, 0, 0, false, 0, 0)],
            CurvesOf = ["crown", "hinge/Öse"],
            Gauges = [],
            Stages = ["pull crown along +y by 8 mm"],
        };
        for (int i = 0; i <= 20; i++)
            AddHatPoint(history, mesh, i);
        return history;
    }

    private static void AddPeelPoint(RunHistory history, Mesh mesh, int i, int points, int keepEvery)
    {
        int cold = Math.Min(4, points / 2);
        bool pulling = i > cold;
        double progress = i == 0 ? 0 : pulling ? (double)(i - cold) / Math.Max(1, points - 1 - cold) : (double)i / Math.Max(1, cold);
        double travel = pulling ? 12 * progress : -0.02 * progress;
        double tip = travel < 3 ? StarterTip : StarterTip * Math.Sqrt(travel / 3);
        double force = 60 * travel / 3 * Math.Pow(StarterTip / tip, 3);
        double temperature = pulling ? 233.15 : 293.15 - 60 * progress;
        double moment = 0.4 * force;
        history.Points.Add(new PointRow
        {
            Point = i,
            Stage = i == 0 ? 0 : pulling ? 2 : 1,
            Progress = progress,
            Time = 3600.0 * i,
            Temperature = temperature,
            LoadFactor = progress,
            Stable = !(travel > 2.8 && travel < 4.6),
            Grips = [new GripReading(travel, force, null, null, 0.01 * force, force), new GripReading(0, 0, 0, -moment, -0.01 * force, -force)],
            Gauges = [0.9 * travel, 1e-4 * travel],
        });
        double zone = travel < 0.5 ? 0 : 9;
        double opening = Math.Max(0, 0.3 * travel);
        double j = Math.Min(1.6, 0.4 * travel * travel / 4);
        history.Fronts.Add(new FrontRow
        {
            Joint = "bond",
            Front = 1,
            Point = i,
            CrackTip = tip,
            ProcessZoneStart = zone > 0 ? tip + zone : null,
            ProcessZone = zone > 0 ? zone : null,
            Opening = opening,
            Sliding = 0,
            JPath = 1.01 * j,
            JRotation = null,
            JUnderLaw = j,
            ModeMixDegrees = zone > 0 ? 3.5 : null,
            LargestPeel = 0.5,
            LargestShear = 0.1,
        });
        history.Energies.Add(new EnergyRow
        {
            Point = i,
            Stage = i == 0 ? 0 : pulling ? 2 : 1,
            PutIn = 10.0 * i,
            StoredInAdherends = 6.0 * i,
            StoredInLayers = i,
            SpentInLayers = 3.0 * i,
            SpentInYielding = 0,
            SpentInFriction = 0,
            Thermal = 0,
            ReleasedInJumps = 0,
            Balance = 1e-12,
            PathError = 1e-4,
        });
        history.Iterations.Add(new IterationRow
        {
            Stage = pulling ? 2 : 1,
            Point = i,
            Retries = 0,
            Iteration = 3,
            Control = "travel",
            Stride = 0.02,
            Progress = progress,
            LoadFactor = progress,
            Root = 0,
            OutOfBalance = 1e-9,
            Relative = 1e-11,
            Correction = 1e-8,
            UnstableDirections = 0,
            ChangedElements = 12,
            Reason = "converged",
            Guess = 1,
        });
        FieldSnapshot fields = Fields(mesh, i, pulling ? 2 : 1, 3600.0 * i, temperature, (x, upper) => (0, (upper ? 0.5 : -0.5) * travel * Bent(x, tip)), tip);
        AddDamage(history, mesh, fields, i);
        if (i % keepEvery == 0 || i == points - 1)
            history.Snapshots.Add(fields);
    }

    private static void AddHatPoint(RunHistory history, Mesh mesh, int i)
    {
        double progress = i / 20.0, travel = 8 * progress, tip = 10 + 40 * Math.Max(0, progress - 0.4);
        history.Points.Add(new PointRow
        {
            Point = i,
            Stage = i == 0 ? 0 : 1,
            Progress = progress,
            Time = 240 * progress,
            Temperature = 233.15,
            LoadFactor = progress,
            Stable = true,
            Grips =
            [
                new GripReading(travel, 300 * travel / (1 + 0.05 * travel * travel), null, null, 0, 300 * travel),
                new GripReading(0, 0, 0.01 * travel, 20000 * Math.Sin(0.15 * travel), 0, 0),
                new GripReading(0, 0, null, null, 0, -300 * travel),
            ],
            Gauges = [],
        });
        for (int front = 1; front <= 2; front++)
        {
            history.Fronts.Add(new FrontRow
            {
                Joint = "left strip",
                Front = front,
                Point = i,
                CrackTip = front == 1 ? tip : 60 - 0.2 * tip,
                ProcessZoneStart = front == 1 ? tip + 5 : 60 - 0.2 * tip - 4,
                ProcessZone = 5,
                Opening = null,
                Sliding = null,
                JPath = null,
                JRotation = null,
                JUnderLaw = null,
                ModeMixDegrees = null,
                LargestPeel = 0.4,
                LargestShear = 0.3,
            });
        }
        double Lift(double x) => Math.Exp(-Math.Pow((x - 150) / 70, 2));
        FieldSnapshot fields = Fields(mesh, i, 1, 240 * progress, 233.15, (x, upper) => (0, (upper ? 0.35 : 0.12) * travel * Lift(x)), tip);
        AddDamage(history, mesh, fields, i);
        if (i % 5 == 0)
            history.Snapshots.Add(fields);
    }

    private static double Bent(double x, double tip) => x >= tip ? 0 : Math.Pow(1 - x / tip, 2) * (1 + 0.5 * x / tip);

    private static FieldSnapshot Fields(Mesh mesh, int point, int stage, double time, double temperature, Func<double, bool, (double, double)> move, double tip)
    {
        int n = mesh.NodeCount;
        double[] ux = new double[n], uy = new double[n], xx = new double[n], yy = new double[n], xy = new double[n], equivalent = new double[n], plastic = new double[n];
        foreach (MeshedAdherend adherend in mesh.Adherends)
        {
            bool upper = !ReferenceEquals(adherend, mesh.Adherends[0]);
            for (int k = adherend.FirstNode; k < adherend.FirstNode + adherend.NodeCount; k++)
            {
                double x = mesh.X[k];
                (ux[k], uy[k]) = move(x, upper);
                double lever = Math.Exp(-Math.Abs(x - tip - 6) / 15);
                xx[k] = 4 * point * lever * ((mesh.Y[k] % 4) - 2);
                yy[k] = 2 * lever;
                xy[k] = lever;
                equivalent[k] = Math.Abs(xx[k]) + lever;
                plastic[k] = Math.Max(0, equivalent[k] - 180) * 1e-4;
            }
        }
        List<LayerField> layers = [];
        for (int j = 0; j < mesh.Joints.Count; j++)
            layers.Add(Layer(mesh, j, uy));
        return new FieldSnapshot
        {
            Point = point,
            Stage = stage,
            Time = time,
            Temperature = temperature,
            DisplacementX = ux,
            DisplacementY = uy,
            StressXx = xx,
            StressYy = yy,
            StressZz = new double[n],
            StressXy = xy,
            EquivalentStress = equivalent,
            PlasticStrain = plastic,
            Layers = layers,
        };
    }

    private static LayerField Layer(Mesh mesh, int index, double[] uy)
    {
        double final = mesh.Joints.Count > 1 ? 1.6 : 0.9;
        MeshedJoint joint = mesh.Joints[index];
        int per = mesh.NodesPerFace, n = joint.LowerNodes.Length;
        double[] position = new double[n], opening = new double[n], peel = new double[n], shear = new double[n], damage = new double[n];
        for (int k = 0; k < n; k++)
        {
            int element = k / per;
            position[k] = joint.Position[element] + (joint.Position[element + 1] - joint.Position[element]) * (k % per) / (per - 1);
            opening[k] = uy[joint.UpperNodes[k]] - uy[joint.LowerNodes[k]] + 0.3 * Math.Exp(-Math.Abs(position[k] - 60) / 30) * 0.3;
            bool bonded = joint.Bonded[element];
            damage[k] = bonded ? Math.Clamp((opening[k] - 0.12) / final, 0, 1) : 1;
            peel[k] = bonded ? Math.Min(opening[k] / 0.12, 1) * 0.5 * (1 - damage[k]) - 0.05 * Math.Exp(-Math.Abs(position[k] - 80) / 10) : 0;
            shear[k] = bonded ? 0.2 * peel[k] : 0;
        }
        return new LayerField { Joint = index, Position = position, Opening = opening, Sliding = new double[n], Peel = peel, Shear = shear, Damage = damage };
    }

    private static void AddDamage(RunHistory history, Mesh mesh, FieldSnapshot fields, int point)
    {
        foreach (LayerField layer in fields.Layers)
        {
            MeshedJoint joint = mesh.Joints[layer.Joint];
            float[] damage = new float[joint.ElementCount];
            for (int e = 0; e < damage.Length; e++)
                damage[e] = joint.Bonded[e] ? (float)layer.Damage.AsSpan(e * mesh.NodesPerFace, mesh.NodesPerFace).ToArray().Max() : float.NaN;
            history.Damage.Add(new DamageRow(point, layer.Joint, damage));
        }
    }
}
