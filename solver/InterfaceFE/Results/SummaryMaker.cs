using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>Makes the summary of a run from its history: peaks, maxima, self-check.</summary>
public static class SummaryMaker
{
    private const double SmoothPeak = 1e-3;
    private const double GoodClosing = 0.1, PoorClosing = 0.5;
    private const double LeastElementsPerZone = 2;
    private const int LeastThroughYielding = 4;
    private const double GoodBalance = 1e-9, PoorBalance = 1e-6;
    private const double GoodPathError = 1e-3, PoorPathError = 1e-2;
    private const double GoodJ = 0.02, PoorJ = 0.1;
    private const double GoodRotation = 5, PoorRotation = 15;

    /// <summary>Fills grips, joints, adherends, events, remarks and self-check of a summary.</summary>
    public static void Fill(RunSummary summary, RunHistory history, RunRecorder recorder, SpecimenModel model)
    {
        for (int g = 0; g < history.Grips.Count; g++)
            summary.Grips.Add(Grip(history, g));
        summary.Joints.AddRange(recorder.Maxima.Joints());
        summary.Adherends.AddRange(recorder.Maxima.Adherends());
        summary.FirstDamage = recorder.Maxima.FirstDamage;
        summary.FirstYield = recorder.Maxima.FirstYield;
        summary.Remarks.AddRange(recorder.Remarks());
        if (history.Points.Find(p => !p.Stable) is { } first)
            summary.Remarks.Add(string.Create(System.Globalization.CultureInfo.InvariantCulture,
                $"from point {first.Point} (stage {first.Stage}, progress {first.Progress:0.####}) on there are {recorder.Maxima.UnstablePoints} points that the stage's own control would not hold: the specimen would jump there"));
        summary.Remarks.Add("stresses of adherends are means at nodes; elements that touch a grip are left out");
        Judge(summary.SelfCheck, history, recorder.Maxima, model);
    }

    private static GripSummary Grip(RunHistory history, int g)
    {
        GripInfo info = history.Grips[g];
        List<PointRow> points = history.Points;
        if (!info.Moved || points.Count == 0)
            return new GripSummary { Name = info.Name };
        GripReading last = points[^1].Grips[g];
        bool pulled = info.DirectionX != 0 || info.DirectionY != 0;
        double[] forces = [.. points.Select(p => p.Grips[g].Force)];
        Peak? force = pulled ? Smooth(points, [.. points.Select(p => p.Grips[g].Displacement)], forces) : null;
        Peak? moment = info.Turned ? LargestMagnitude(points, [.. points.Select(p => p.Grips[g].Rotation ?? 0)], [.. points.Select(p => p.Grips[g].Moment ?? 0)]) : null;
        PointRow? stable = pulled && points.Any(p => !p.Stable) ? points.Where(p => p.Stable).MaxBy(p => p.Grips[g].Force) : null;
        return new GripSummary
        {
            Name = info.Name,
            PeakForce = force?.Value,
            DisplacementAtPeak = force?.At,
            PeakPoint = points[force?.Index ?? moment?.Index ?? 0].Point,
            LargestStableForce = stable?.Grips[g].Force,
            DisplacementAtLargestStable = stable?.Grips[g].Displacement,
            PeakMoment = moment?.Value,
            RotationAtPeak = moment?.At,
            FinalForce = force is null ? null : last.Force,
            FinalDisplacement = force is null ? null : last.Displacement,
            FinalRotation = last.Rotation,
            FinalMoment = info.Turned ? last.Moment : null,
        };
    }

    /// <summary>
    /// Peak of a curve. The parabola is taken only where the highest point and its neighbours belong to one stage and it adds next to nothing: at a kink or where a load is taken back
    /// the highest point itself is the peak.
    /// </summary>
    private static Peak? Smooth(List<PointRow> points, double[] abscissa, double[] ordinate)
    {
        if (Peak.Of(abscissa, ordinate) is not { } peak)
            return null;
        int i = peak.Index;
        bool inside = i > 0 && i < points.Count - 1 && points[i - 1].Stage == points[i].Stage && points[i + 1].Stage == points[i].Stage;
        bool smooth = peak.Value - ordinate[i] <= SmoothPeak * Math.Abs(ordinate[i]);
        return inside && smooth ? peak : new Peak(ordinate[i], abscissa[i], i);
    }

    private static Peak? LargestMagnitude(List<PointRow> points, double[] abscissa, double[] ordinate)
    {
        if (ordinate.Max() >= -ordinate.Min())
            return Smooth(points, abscissa, ordinate);
        Peak? peak = Smooth(points, abscissa, [.. ordinate.Select(v => -v)]);
        return peak is null ? null : peak with { Value = -peak.Value };
    }

    private static void Judge(SelfCheck check, RunHistory history, RunMaxima maxima, SpecimenModel model)
    {
        check.Balance = history.Energies.Max(e => e.Balance);
        check.PathError = history.Energies.Max(e => e.PathError);
        check.JDisagreement = Disagreement(history, model);
        check.ElementsPerProcessZone = maxima.Joints().Where((_, joint) => maxima.HasGrown(joint)).Select(j => (double?)j.ElementsPerProcessZone).Min();
        check.UnstablePoints = maxima.UnstablePoints;
        check.LargestRotationDegrees = maxima.LargestRotation * 180 / Math.PI;
        var verdict = Verdict.NumbersHold;
        Grade(check.Balance, GoodBalance, PoorBalance, "forces are not in balance: balance");
        Grade(check.PathError, GoodPathError, PoorPathError, "strides are long for the path: path error");
        if (!model.Unknowns.Turns)
            Grade(check.LargestRotationDegrees, GoodRotation, PoorRotation, "rotations are large for `rotation: small`: largest rotation in degrees");
        if (check.JDisagreement is { } j)
            Grade(j, GoodJ, PoorJ, "energy release rates by independent formulas disagree: relative difference");
        foreach (MeshedJoint joint in model.Mesh.Joints)
        {
            double longest = 0;
            for (int e = 0; e < joint.ElementCount; e++)
                if (joint.Bonded[e])
                    longest = Math.Max(longest, joint.Position[e + 1] - joint.Position[e]);
            Grade(longest / joint.OnePercentLength, 1 + 1e-9, 2, $"elements along joint '{joint.Name}' are long: length over the one for 1 % error");
        }
        for (int joint = 0; joint < model.Layers.Count; joint++)
            Grade(maxima.ClosingShare(joint), GoodClosing, PoorClosing, $"joint '{model.Layers[joint].Name}' is pressed into itself, give the layer a stiffer `contact stiffness`: depth over thickness");
        for (int adherend = 0; adherend < model.Solids.Count; adherend++)
        {
            int through = model.Mesh.Adherends[adherend].ElementsThrough;
            if (maxima.HasYielded(adherend) && through < LeastThroughYielding)
                Grade((double)LeastThroughYielding / through, 1, double.PositiveInfinity, $"'{model.Solids[adherend].Name}' yields with fewer than {LeastThroughYielding} elements through its thickness: {LeastThroughYielding} over their number");
        }
        if (check.ElementsPerProcessZone is < LeastElementsPerZone)
            Grade(LeastElementsPerZone / check.ElementsPerProcessZone.Value, 1, double.PositiveInfinity, "fewer than two elements within a process zone: two over their number");
        if (PeakIsUnstable(history))
            Care("the largest load lies on an unstable path: under its own control the specimen would leave the path before; see the largest stable force");
        check.Verdict = verdict;

        void Care(string words)
        {
            verdict = verdict == Verdict.DoNotHold ? verdict : Verdict.HoldWithCare;
            check.Reasons.Add(words);
        }

        void Grade(double value, double good, double poor, string words)
        {
            if (value <= good)
                return;
            Verdict own = value <= poor ? Verdict.HoldWithCare : Verdict.DoNotHold;
            verdict = own > verdict ? own : verdict;
            check.Reasons.Add(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{words} {value:G3} (should be at most {good:G3})"));
        }
    }

    private static bool PeakIsUnstable(RunHistory history)
    {
        int main = history.CurvesOf.Count == 0 ? -1 : history.Grips.ToList().FindIndex(g => g.Name == history.CurvesOf[0]);
        return main >= 0 && !history.Grips[main].Turned && history.Points.MaxBy(p => p.Grips[main].Force) is { Stable: false };
    }

    private static double? Disagreement(RunHistory history, SpecimenModel model)
    {
        double? worst = null;
        foreach (FrontRow row in history.Fronts)
        {
            ILayerLaw law = model.Layers.First(l => l.Name == row.Joint).Law;
            double floor = 0.02 * Math.Min(law.PeelToughness, law.ShearToughness);
            // With relaxation the integral over time at the starter tip is another quantity than those over space.
            double[] values = [.. new[] { row.JPath, row.JRotation, law.DependsOnTime ? null : row.JUnderLaw }.Where(v => v is not null).Select(v => v!.Value)];
            if (values.Length < 2 || values.Max() < floor)
                continue;
            worst = Math.Max(worst ?? 0, (values.Max() - values.Min()) / values.Max());
        }
        return worst;
    }
}
