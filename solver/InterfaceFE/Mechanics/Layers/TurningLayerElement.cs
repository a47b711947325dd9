namespace InterfaceFE.Mechanics.Layers;

/// <summary>How a layer stands at a station.</summary>
/// <param name="Separation">Opening, less the free opening, and sliding [mm].</param>
/// <param name="FaceAngle">Angle from the lower face to the upper one [rad].</param>
/// <param name="Across">Distance of the facing points along the normal, W [mm].</param>
/// <param name="Along">The same along the tangent, V [mm].</param>
/// <param name="Turn">Sine of the frame's turn, over the stretch of its line; the turn itself at small rotation.</param>
public readonly record struct LayerStance(Separation Separation, double FaceAngle, double Across, double Along, double Turn)
{
    /// <summary>
    /// What the couple of tractions τ·W - σ·V adds to the flow of energy through a cut across the layer [N/mm]: couple times turn. A path that cuts the layer takes it off the layer's energy.
    /// </summary>
    public double CoupleFlow(in LayerResponse response) => (response.Shear * Across - response.Peel * Along) * Turn;
}

/// <summary>
/// Layer element whose frame turns with the joint, between faces drawn the layer's thickness apart or on each other. With facing points x+ and x-, D = x+ - x-, and the unit tangent
/// es and normal en of the deformed line that gives the frame: W = D·en, V = D·es, opening w = W less its value before deformation (the drawn thickness), sliding v = V less its
/// value before deformation. A rigid movement opens and slides nothing, however far it turns.
/// <para>
/// Force = ∫ b·(σ·δw + τ·δv) dl over the length of the mid-line before deformation. With the turn a of the frame, δw = δD·en - V·a, δv = δD·es + W·a: tractions on the faces alone would
/// leave the couple V·σ - W·τ per length, which the part with a balances. With g = dx/dξ along the line, a = en·δg/|g|, and its own change is -(es·δg)·a/|g| twice; the tangent has the
/// terms of all these. Without finite rotation the same with everything taken before deformation: v then gets t times the turn of the line.
/// </para>
/// Arrays as in <see cref="LayerElement"/>. Derived here; no allocation; safe between threads.
/// </summary>
public static class TurningLayerElement
{
    private const int Most = 12;

    /// <summary>Forces, tangent, energies and tentative state of one element.</summary>
    /// <param name="kinematics">Frame, and whether rotations are finite.</param>
    /// <param name="rule">Points.</param>
    /// <param name="coordinates">Coordinates, length 4·n [mm].</param>
    /// <param name="displacements">Displacements, length 4·n [mm].</param>
    /// <param name="width">Width of the bond b [mm].</param>
    /// <param name="freeOpening">Stress-free opening w0 [mm].</param>
    /// <param name="law">Law.</param>
    /// <param name="at">Conditions.</param>
    /// <param name="accepted">Accepted state of all points.</param>
    /// <param name="tentative">Tentative state of all points, overwritten; must not alias <paramref name="accepted"/>.</param>
    /// <param name="force">Derivative of the energy by the displacements [N], length 4·n, overwritten.</param>
    /// <param name="tangent">d force / d displacement [N/mm], 4·n × 4·n row-major, overwritten; empty: not wanted.</param>
    /// <param name="dissipatedGradient">d dissipated / d displacement in the tentative stride [N], length 4·n, overwritten; empty: not wanted.</param>
    /// <param name="loadRate">d force / d free opening [N/mm], length 4·n, overwritten; empty: not wanted.</param>
    public static LayerElementSums Evaluate(
        in LayerKinematics kinematics,
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
        int size = 4 * rule.NodesPerFace, stateSize = law.StateSize;
        Span<double> scratch = stackalloc double[4 * Most], opening = scratch[..size], sliding = scratch.Slice(Most, size), turn = scratch.Slice(2 * Most, size), geometric = scratch.Slice(3 * Most, size);
        force.Clear();
        tangent.Clear();
        dissipatedGradient.Clear();
        loadRate.Clear();
        LayerElementTally tally = LayerElementTally.Empty;
        for (int p = 0; p < rule.Count; p++)
        {
            ReadOnlySpan<double> shapes = rule.Shapes(p), slopes = rule.Slopes(p);
            Place place = Place.Of(kinematics, coordinates, displacements, shapes, slopes);
            Separation separation = new(place.Opening - freeOpening, place.Sliding);
            LayerResponse answer = law.Update(separation, at, accepted.Slice(p * stateSize, stateSize), tentative.Slice(p * stateSize, stateSize));
            double weight = rule.Weights[p] * place.Stretch * width;
            tally.Take(weight, answer, separation);
            // Where nothing is carried any more the frame may be anything: faces folded back on each other have none.
            if (answer is { Peel: 0, Shear: 0, PeelByOpening: 0, PeelBySliding: 0, ShearByOpening: 0, ShearBySliding: 0 })
                continue;
            place.Changes(kinematics, shapes, slopes, opening, sliding, turn);
            Add(force, opening, sliding, weight * answer.Peel, weight * answer.Shear);
            Add(dissipatedGradient, opening, sliding, weight * answer.DissipatedByOpening, weight * answer.DissipatedBySliding);
            Add(loadRate, opening, sliding, -weight * answer.PeelByOpening, -weight * answer.ShearByOpening);
            if (tangent.IsEmpty)
                continue;
            AddTangent(tangent, opening, sliding, weight, answer);
            if (!kinematics.Turns)
                continue;
            place.SecondChanges(kinematics, shapes, slopes, weight * answer.Peel, weight * answer.Shear, geometric);
            AddTurning(tangent, turn, geometric, -weight * (answer.Peel * place.Across + answer.Shear * place.Along));
        }
        return tally.Sums;
    }

    /// <summary>Opening and sliding at a station, and how the layer stands there.</summary>
    /// <param name="kinematics">Frame, and whether rotations are finite.</param>
    /// <param name="coordinates">Coordinates, length 4·n [mm].</param>
    /// <param name="displacements">Displacements, length 4·n [mm].</param>
    /// <param name="freeOpening">Stress-free opening [mm].</param>
    /// <param name="xi">Position from -1 (start) to 1 (end).</param>
    public static LayerStance At(in LayerKinematics kinematics, ReadOnlySpan<double> coordinates, ReadOnlySpan<double> displacements, double freeOpening, double xi)
    {
        int n = coordinates.Length / 4;
        Span<double> scratch = stackalloc double[6], shapes = scratch[..n], slopes = scratch.Slice(3, n);
        LayerRule.Shape(xi, shapes, slopes);
        Place place = Place.Of(kinematics, coordinates, displacements, shapes, slopes);
        double lowerX = 0, lowerY = 0, upperX = 0, upperY = 0;
        for (int a = 0; a < n; a++)
        {
            lowerX += slopes[a] * (coordinates[2 * a] + displacements[2 * a]);
            lowerY += slopes[a] * (coordinates[2 * a + 1] + displacements[2 * a + 1]);
            upperX += slopes[a] * (coordinates[2 * (n + a)] + displacements[2 * (n + a)]);
            upperY += slopes[a] * (coordinates[2 * (n + a) + 1] + displacements[2 * (n + a) + 1]);
        }
        return new LayerStance(new Separation(place.Opening - freeOpening, place.Sliding), Math.Atan2(lowerX * upperY - lowerY * upperX, lowerX * upperX + lowerY * upperY), place.Across, place.Along, place.Turn);
    }

    /// <summary>Adds normal part · opening + tangential part · sliding.</summary>
    private static void Add(Span<double> sum, ReadOnlySpan<double> opening, ReadOnlySpan<double> sliding, double normalPart, double tangentialPart)
    {
        for (int i = 0; i < sum.Length; i++)
            sum[i] += normalPart * opening[i] + tangentialPart * sliding[i];
    }

    private static void AddTangent(Span<double> tangent, ReadOnlySpan<double> opening, ReadOnlySpan<double> sliding, double weight, in LayerResponse k)
    {
        int size = opening.Length;
        for (int j = 0; j < size; j++)
        {
            double peel = weight * (k.PeelByOpening * opening[j] + k.PeelBySliding * sliding[j]), shear = weight * (k.ShearByOpening * opening[j] + k.ShearBySliding * sliding[j]);
            for (int i = 0; i < size; i++)
                tangent[i * size + j] += opening[i] * peel + sliding[i] * shear;
        }
    }

    /// <summary>Adds geometric⊗turn + turn⊗geometric + both · turn⊗turn.</summary>
    private static void AddTurning(Span<double> tangent, ReadOnlySpan<double> turn, ReadOnlySpan<double> geometric, double both)
    {
        int size = turn.Length;
        for (int i = 0; i < size; i++)
            for (int j = 0; j < size; j++)
                tangent[i * size + j] += geometric[i] * turn[j] + turn[i] * geometric[j] + both * turn[i] * turn[j];
    }

    /// <summary>Where a point of the layer is: its frame, and D along it.</summary>
    private readonly ref struct Place
    {
        private readonly double _tangentX, _tangentY, _slope;

        private Place(double tangentX, double tangentY, double slope, double across, double along, double opening, double sliding, double stretch, double turn)
        {
            Turn = turn;
            (_tangentX, _tangentY, _slope) = (tangentX, tangentY, slope);
            (Across, Along, Opening, Sliding, Stretch) = (across, along, opening, sliding, stretch);
        }

        /// <summary>W = D·en in the frame that forces belong to [mm].</summary>
        public double Across { get; }

        /// <summary>V = D·es in that frame [mm].</summary>
        public double Along { get; }

        /// <summary>Opening, free opening included [mm].</summary>
        public double Opening { get; }

        /// <summary>Sliding [mm].</summary>
        public double Sliding { get; }

        /// <summary>Length of the mid-line before deformation per ξ [mm].</summary>
        public double Stretch { get; }

        /// <summary>Sine of the frame's turn over the stretch of its line.</summary>
        public double Turn { get; }

        public static Place Of(in LayerKinematics kinematics, ReadOnlySpan<double> x, ReadOnlySpan<double> u, ReadOnlySpan<double> shapes, ReadOnlySpan<double> slopes)
        {
            int n = shapes.Length, upper = 2 * n;
            (double below, double above) = Shares(kinematics.Frame);
            double jumpX = 0, jumpY = 0, thickX = 0, thickY = 0, middleX = 0, middleY = 0, startX = 0, startY = 0, moveX = 0, moveY = 0;
            for (int a = 0; a < n; a++)
            {
                int i = 2 * a, j = upper + 2 * a;
                jumpX += shapes[a] * (u[j] - u[i]);
                jumpY += shapes[a] * (u[j + 1] - u[i + 1]);
                thickX += shapes[a] * (x[j] - x[i]);
                thickY += shapes[a] * (x[j + 1] - x[i + 1]);
                middleX += 0.5 * slopes[a] * (x[i] + x[j]);
                middleY += 0.5 * slopes[a] * (x[i + 1] + x[j + 1]);
                startX += slopes[a] * (below * x[i] + above * x[j]);
                startY += slopes[a] * (below * x[i + 1] + above * x[j + 1]);
                moveX += slopes[a] * (below * u[i] + above * u[j]);
                moveY += slopes[a] * (below * u[i + 1] + above * u[j + 1]);
            }
            double stretch = double.Hypot(middleX, middleY), slope = double.Hypot(startX, startY), tangentX = startX / slope, tangentY = startY / slope;
            double across = thickY * tangentX - thickX * tangentY, along = thickX * tangentX + thickY * tangentY;
            if (!kinematics.Turns)
            {
                double turn = (moveY * tangentX - moveX * tangentY) / slope;
                return new Place(tangentX, tangentY, slope, across, along,
                    jumpY * tangentX - jumpX * tangentY - along * turn, jumpX * tangentX + jumpY * tangentY + across * turn, stretch, turn);
            }
            (double lineX, double lineY) = (startX + moveX, startY + moveY);
            double length = double.Hypot(lineX, lineY), esX = lineX / length, esY = lineY / length, dX = thickX + jumpX, dY = thickY + jumpY;
            double w = dY * esX - dX * esY, v = dX * esX + dY * esY;
            return new Place(esX, esY, length, w, v, w - across, v - along, stretch, (tangentX * esY - tangentY * esX) * slope / length);
        }

        /// <summary>Change of opening, sliding and the frame's angle by a unit of each displacement.</summary>
        public void Changes(in LayerKinematics kinematics, ReadOnlySpan<double> shapes, ReadOnlySpan<double> slopes, Span<double> opening, Span<double> sliding, Span<double> turn)
        {
            (double below, double above) = Shares(kinematics.Frame);
            int n = shapes.Length;
            for (int a = 0; a < 2 * n; a++)
            {
                double shape = a < n ? -shapes[a] : shapes[a - n], share = (a < n ? below * slopes[a] : above * slopes[a - n]) / _slope;
                double turnX = -share * _tangentY, turnY = share * _tangentX;
                turn[2 * a] = turnX;
                turn[2 * a + 1] = turnY;
                opening[2 * a] = -shape * _tangentY - Along * turnX;
                opening[2 * a + 1] = shape * _tangentX - Along * turnY;
                sliding[2 * a] = shape * _tangentX + Across * turnX;
                sliding[2 * a + 1] = shape * _tangentY + Across * turnY;
            }
        }

        /// <summary>-σ·(δD·es) + τ·(δD·en) - (τ·W - σ·V)·(es·δg)/|g| by a unit of each displacement: what stands beside the turn in the second derivative of σ·w + τ·v at fixed tractions.</summary>
        public void SecondChanges(in LayerKinematics kinematics, ReadOnlySpan<double> shapes, ReadOnlySpan<double> slopes, double peel, double shear, Span<double> geometric)
        {
            (double below, double above) = Shares(kinematics.Frame);
            double couple = (shear * Across - peel * Along) / _slope, x = -peel * _tangentX - shear * _tangentY, y = -peel * _tangentY + shear * _tangentX;
            int n = shapes.Length;
            for (int a = 0; a < 2 * n; a++)
            {
                double shape = a < n ? -shapes[a] : shapes[a - n], share = couple * (a < n ? below * slopes[a] : above * slopes[a - n]);
                geometric[2 * a] = shape * x - share * _tangentX;
                geometric[2 * a + 1] = shape * y - share * _tangentY;
            }
        }

        private static (double Below, double Above) Shares(LayerFrame frame) => frame switch
        {
            LayerFrame.UpperFace => (0, 1),
            LayerFrame.LowerFace => (1, 0),
            _ => (0.5, 0.5),
        };
    }
}
