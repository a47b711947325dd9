namespace InterfaceFE.Mechanics.Layers;

/// <summary>Branches met at the points of an element.</summary>
[Flags]
public enum LayerBranches
{
    /// <summary>No point.</summary>
    None = 0,

    /// <summary>Some point is elastic.</summary>
    Elastic = 1,

    /// <summary>Some point grows on its curve.</summary>
    Growing = 2,

    /// <summary>Some point unloads or reloads below its largest separation.</summary>
    Unloading = 4,

    /// <summary>Some point gives way on the release branch.</summary>
    Releasing = 8,

    /// <summary>Some point is separated.</summary>
    Separated = 16,

    /// <summary>Some point is pressed together.</summary>
    Pressed = 32,
}

/// <summary>Sums over an element.</summary>
/// <param name="Stored">Stored energy, contact included [mJ = N·mm].</param>
/// <param name="Dissipated">Dissipated energy since the virgin state [mJ].</param>
/// <param name="DissipatedByFreeOpening">d dissipated / d free opening in the tentative stride [N].</param>
/// <param name="LargestDamage">Largest damage of a point, 0 to 1.</param>
/// <param name="LeastDamage">Least damage of a point, 0 to 1.</param>
/// <param name="Branches">Branches met; the tangent is the virgin one when this is <see cref="LayerBranches.Elastic"/> alone.</param>
public readonly record struct LayerElementSums(double Stored, double Dissipated, double DissipatedByFreeOpening, double LargestDamage, double LeastDamage, LayerBranches Branches)
{
    /// <summary>Integral of the peel traction [N].</summary>
    public double PeelResultant { get; init; }

    /// <summary>Energy spent in friction since the virgin state [mJ].</summary>
    public double SpentInFriction { get; init; }

    /// <summary>Whether damage grows at some point.</summary>
    public bool Growing => (Branches & (LayerBranches.Growing | LayerBranches.Releasing)) != 0;

    /// <summary>Whether some point is not on the virgin tension branch, so that the tangent differs from the virgin one.</summary>
    public bool Changed => (Branches & ~LayerBranches.Elastic) != 0;
}

/// <summary>Adds up the answers at the points of an element.</summary>
internal struct LayerElementTally
{
    private double _stored, _dissipated, _dissipatedByFree, _resultant, _friction, _damage, _leastDamage;
    private LayerBranches _branches;

    /// <summary>Nothing yet.</summary>
    public static LayerElementTally Empty => new() { _leastDamage = 1 };

    /// <summary>The sums so far.</summary>
    public readonly LayerElementSums Sums => new(_stored, _dissipated, _dissipatedByFree, _damage, _leastDamage, _branches) { PeelResultant = _resultant, SpentInFriction = _friction };

    /// <summary>Takes the answer at a point that stands for an area [mm²].</summary>
    public void Take(double area, in LayerResponse answer, in Separation separation)
    {
        _stored += area * answer.Stored;
        _dissipated += area * answer.Dissipated;
        _dissipatedByFree -= area * answer.DissipatedByOpening;
        _resultant += area * answer.Peel;
        _friction += area * answer.SpentInFriction;
        _damage = Math.Max(_damage, answer.Damage);
        _leastDamage = Math.Min(_leastDamage, answer.Damage);
        _branches |= (LayerBranches)(1 << (int)answer.Branch) | (separation.Opening < 0 ? LayerBranches.Pressed : 0);
    }
}

/// <summary>
/// Layer element of zero thickness between two faces with 3 (quadratic) or 2 nodes each: separation, forces and tangent with small rotation.
/// The frame at each point is that of the undeformed mid-line: tangent s from its Jacobian (start to end), normal n its quarter turn counter-clockwise, from lower to upper.
/// Opening = n·jump - free opening, sliding = s·jump; force = ∫ b·N·(σ·n + τ·s) dl on the upper face, its opposite on the lower.
/// Facing nodes coincide, so rigid translation and infinitesimal rotation give no separation. No allocation; safe between threads.
/// </summary>
/// <remarks>
/// Arrays: coordinates and displacements [lower node 0 x, y, lower node 1 x, y, ..., upper node 0 x, y, ...], length 4·n with n nodes per face, in mm;
/// state point after point, <see cref="ILayerLaw.StateSize"/> each.
/// </remarks>
public static class LayerElement
{
    /// <summary>Forces, tangent, energies and tentative state of one element.</summary>
    /// <param name="rule">Points.</param>
    /// <param name="coordinates">Coordinates, length 4·n [mm].</param>
    /// <param name="displacements">Displacements, length 4·n [mm].</param>
    /// <param name="width">Width of the bond b [mm].</param>
    /// <param name="freeOpening">Stress-free opening w0 [mm].</param>
    /// <param name="law">Law.</param>
    /// <param name="at">Conditions.</param>
    /// <param name="accepted">Accepted state of all points.</param>
    /// <param name="tentative">Tentative state of all points, overwritten; must not alias <paramref name="accepted"/>.</param>
    /// <param name="force">Derivative of the energy by the displacements [N], length 4·n, overwritten; empty: not wanted.</param>
    /// <param name="tangent">d force / d displacement [N/mm], 4·n × 4·n row-major, overwritten; empty: not wanted.</param>
    /// <param name="dissipatedGradient">d dissipated / d displacement in the tentative stride [N], length 4·n, overwritten; empty: not wanted.</param>
    /// <param name="loadRate">d force / d free opening [N/mm], length 4·n, overwritten; empty: not wanted.</param>
    /// <exception cref="ArgumentException">A length does not fit.</exception>
    public static LayerElementSums Evaluate(
        LayerRule rule,
        ReadOnlySpan<double> coordinates,
        ReadOnlySpan<double> displacements,
        double width,
        double freeOpening,
        ILayerLaw law,
        in LawPoint at,
        ReadOnlySpan<double> accepted,
        Span<double> tentative,
        Span<double> force,
        Span<double> tangent,
        Span<double> dissipatedGradient,
        Span<double> loadRate)
    {
        ArgumentNullException.ThrowIfNull(rule);
        ArgumentNullException.ThrowIfNull(law);
        int n = rule.NodesPerFace, stateSize = law.StateSize;
        CheckLengths(4 * n, rule.Count * stateSize, coordinates, displacements, accepted, tentative, force, tangent, dissipatedGradient, loadRate);
        // Sums over the degrees of freedom of the jump, 2·n; the faces get them with opposite signs at the end.
        Span<double> jumpForce = stackalloc double[6], jumpGradient = stackalloc double[6], jumpRate = stackalloc double[6], jumpTangent = stackalloc double[36];
        jumpForce.Clear();
        jumpGradient.Clear();
        jumpRate.Clear();
        jumpTangent.Clear();
        LayerElementTally tally = LayerElementTally.Empty;
        for (int p = 0; p < rule.Count; p++)
        {
            ReadOnlySpan<double> shapes = rule.Shapes(p);
            PointFrame frame = FrameOf(coordinates, shapes, rule.Slopes(p));
            Separation separation = SeparationOf(frame, displacements, shapes, freeOpening);
            LayerResponse answer = law.Update(separation, at, accepted.Slice(p * stateSize, stateSize), tentative.Slice(p * stateSize, stateSize));
            double weight = rule.Weights[p] * frame.Stretch * width;
            tally.Take(weight, answer, separation);
            AddVector(jumpForce, frame, shapes, weight * answer.Peel, weight * answer.Shear);
            AddVector(jumpGradient, frame, shapes, weight * answer.DissipatedByOpening, weight * answer.DissipatedBySliding);
            AddVector(jumpRate, frame, shapes, -weight * answer.PeelByOpening, -weight * answer.ShearByOpening);
            if (!tangent.IsEmpty)
                AddTangent(jumpTangent, frame, shapes, weight, answer);
        }
        SpreadVector(jumpForce[..(2 * n)], force);
        SpreadVector(jumpGradient[..(2 * n)], dissipatedGradient);
        SpreadVector(jumpRate[..(2 * n)], loadRate);
        SpreadTangent(jumpTangent, 2 * n, tangent);
        return tally.Sums;
    }

    /// <summary>Opening and sliding at a station.</summary>
    /// <param name="nodesPerFace">3 or 2.</param>
    /// <param name="coordinates">Coordinates, length 4·n [mm].</param>
    /// <param name="displacements">Displacements, length 4·n [mm].</param>
    /// <param name="freeOpening">Stress-free opening [mm].</param>
    /// <param name="xi">Position from -1 (start) to 1 (end).</param>
    /// <exception cref="ArgumentException">A length does not fit.</exception>
    public static Separation SeparationAt(int nodesPerFace, ReadOnlySpan<double> coordinates, ReadOnlySpan<double> displacements, double freeOpening, double xi)
    {
        Span<double> shapes = stackalloc double[3], slopes = stackalloc double[3];
        PointFrame frame = FrameAt(nodesPerFace, coordinates, xi, shapes, slopes);
        RequireLength(displacements.Length, 4 * nodesPerFace, nameof(displacements));
        return SeparationOf(frame, displacements, shapes[..nodesPerFace], freeOpening);
    }

    /// <summary>Frame of the undeformed mid-line at a station.</summary>
    /// <param name="nodesPerFace">3 or 2.</param>
    /// <param name="coordinates">Coordinates, length 4·n [mm].</param>
    /// <param name="xi">Position from -1 (start) to 1 (end).</param>
    /// <exception cref="ArgumentException">A length does not fit.</exception>
    public static PointFrame FrameAt(int nodesPerFace, ReadOnlySpan<double> coordinates, double xi) =>
        FrameAt(nodesPerFace, coordinates, xi, stackalloc double[3], stackalloc double[3]);

    private static PointFrame FrameAt(int nodesPerFace, ReadOnlySpan<double> coordinates, double xi, Span<double> shapes, Span<double> slopes)
    {
        if (nodesPerFace is not (2 or 3))
            throw new ArgumentOutOfRangeException(nameof(nodesPerFace), nodesPerFace, "nodesPerFace must be 2 or 3");
        RequireLength(coordinates.Length, 4 * nodesPerFace, nameof(coordinates));
        LayerRule.Shape(xi, shapes[..nodesPerFace], slopes[..nodesPerFace]);
        return FrameOf(coordinates, shapes[..nodesPerFace], slopes[..nodesPerFace]);
    }

    private static PointFrame FrameOf(ReadOnlySpan<double> coordinates, ReadOnlySpan<double> shapes, ReadOnlySpan<double> slopes)
    {
        int upper = 2 * shapes.Length;
        double x = 0, y = 0, dx = 0, dy = 0;
        for (int a = 0; a < shapes.Length; a++)
        {
            double middleX = 0.5 * (coordinates[2 * a] + coordinates[upper + 2 * a]), middleY = 0.5 * (coordinates[2 * a + 1] + coordinates[upper + 2 * a + 1]);
            x += shapes[a] * middleX;
            y += shapes[a] * middleY;
            dx += slopes[a] * middleX;
            dy += slopes[a] * middleY;
        }
        double stretch = double.Hypot(dx, dy);
        return new PointFrame(x, y, dx / stretch, dy / stretch, stretch);
    }

    private static Separation SeparationOf(in PointFrame frame, ReadOnlySpan<double> displacements, ReadOnlySpan<double> shapes, double freeOpening)
    {
        int upper = 2 * shapes.Length;
        double jumpX = 0, jumpY = 0;
        for (int a = 0; a < shapes.Length; a++)
        {
            jumpX += shapes[a] * (displacements[upper + 2 * a] - displacements[2 * a]);
            jumpY += shapes[a] * (displacements[upper + 2 * a + 1] - displacements[2 * a + 1]);
        }
        return new Separation(jumpY * frame.TangentX - jumpX * frame.TangentY - freeOpening, jumpX * frame.TangentX + jumpY * frame.TangentY);
    }

    /// <summary>Adds N·(normal part·n + tangential part·s).</summary>
    private static void AddVector(Span<double> sums, in PointFrame frame, ReadOnlySpan<double> shapes, double normalPart, double tangentialPart)
    {
        double x = tangentialPart * frame.TangentX - normalPart * frame.TangentY, y = tangentialPart * frame.TangentY + normalPart * frame.TangentX;
        for (int a = 0; a < shapes.Length; a++)
        {
            sums[2 * a] += shapes[a] * x;
            sums[2 * a + 1] += shapes[a] * y;
        }
    }

    /// <summary>Adds N·N with the 2×2 tangent turned into x and y: [n s]·K·[n s]ᵀ.</summary>
    private static void AddTangent(Span<double> sums, in PointFrame frame, ReadOnlySpan<double> shapes, double weight, in LayerResponse k)
    {
        double tx = frame.TangentX, ty = frame.TangentY, nx = -ty, ny = tx;
        double peelX = weight * (k.PeelByOpening * nx + k.PeelBySliding * tx), peelY = weight * (k.PeelByOpening * ny + k.PeelBySliding * ty);
        double shearX = weight * (k.ShearByOpening * nx + k.ShearBySliding * tx), shearY = weight * (k.ShearByOpening * ny + k.ShearBySliding * ty);
        double xx = nx * peelX + tx * shearX, xy = nx * peelY + tx * shearY, yx = ny * peelX + ty * shearX, yy = ny * peelY + ty * shearY;
        int size = 2 * shapes.Length;
        for (int a = 0; a < shapes.Length; a++)
        {
            for (int c = 0; c < shapes.Length; c++)
            {
                double product = shapes[a] * shapes[c];
                int at = 2 * a * size + 2 * c;
                sums[at] += product * xx;
                sums[at + 1] += product * xy;
                sums[at + size] += product * yx;
                sums[at + size + 1] += product * yy;
            }
        }
    }

    private static void SpreadVector(ReadOnlySpan<double> jump, Span<double> result)
    {
        if (result.IsEmpty)
            return;
        for (int i = 0; i < jump.Length; i++)
        {
            result[i] = -jump[i];
            result[jump.Length + i] = jump[i];
        }
    }

    private static void SpreadTangent(ReadOnlySpan<double> jump, int size, Span<double> result)
    {
        if (result.IsEmpty)
            return;
        for (int i = 0; i < size; i++)
        {
            Span<double> lower = result.Slice(2 * size * i, 2 * size), upper = result.Slice(2 * size * (size + i), 2 * size);
            for (int j = 0; j < size; j++)
            {
                double value = jump[size * i + j];
                lower[j] = upper[size + j] = value;
                lower[size + j] = upper[j] = -value;
            }
        }
    }

    private static void CheckLengths(
        int unknowns,
        int states,
        ReadOnlySpan<double> coordinates,
        ReadOnlySpan<double> displacements,
        ReadOnlySpan<double> accepted,
        ReadOnlySpan<double> tentative,
        ReadOnlySpan<double> force,
        ReadOnlySpan<double> tangent,
        ReadOnlySpan<double> dissipatedGradient,
        ReadOnlySpan<double> loadRate)
    {
        RequireLength(coordinates.Length, unknowns, nameof(coordinates));
        RequireLength(displacements.Length, unknowns, nameof(displacements));
        RequireLength(accepted.Length, states, nameof(accepted));
        RequireLength(tentative.Length, states, nameof(tentative));
        RequireLength(force.IsEmpty ? unknowns : force.Length, unknowns, nameof(force));
        RequireLength(tangent.IsEmpty ? unknowns * unknowns : tangent.Length, unknowns * unknowns, nameof(tangent));
        RequireLength(dissipatedGradient.IsEmpty ? unknowns : dissipatedGradient.Length, unknowns, nameof(dissipatedGradient));
        RequireLength(loadRate.IsEmpty ? unknowns : loadRate.Length, unknowns, nameof(loadRate));
    }

    private static void RequireLength(int length, int needed, string name)
    {
        if (length != needed)
            throw new ArgumentException(Admissible.Text($"{name} has length {length}, needed is {needed}"), name);
    }
}
