using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Mechanics.Elements;

/// <summary>
/// What plane elements share once the gradients of their shape functions are known. Gradients run point after point, <c>count</c> functions each; an
/// incompatible mode counts as one more function. Vectors over functions run x, y of function 0, x, y of function 1, ...
/// </summary>
internal static class PlaneKernel
{
    /// <summary>Natural to Cartesian derivatives at one point; returns the determinant of the Jacobian.</summary>
    public static double Map(ReadOnlySpan<double> coordinates, ReadOnlySpan<double> byXi, ReadOnlySpan<double> byEta, Span<double> byX, Span<double> byY)
    {
        double determinant = Jacobian(coordinates, byXi, byEta, out double xXi, out double yXi, out double xEta, out double yEta);
        double inverse = 1 / determinant;
        for (int i = 0; i < byXi.Length; i++)
        {
            byX[i] = (yEta * byXi[i] - yXi * byEta[i]) * inverse;
            byY[i] = (xXi * byEta[i] - xEta * byXi[i]) * inverse;
        }
        return determinant;
    }

    /// <summary>Jacobian of the map at one point; returns its determinant.</summary>
    public static double Jacobian(
        ReadOnlySpan<double> coordinates, ReadOnlySpan<double> byXi, ReadOnlySpan<double> byEta, out double xXi, out double yXi, out double xEta, out double yEta)
    {
        xXi = yXi = xEta = yEta = 0;
        for (int i = 0; i < byXi.Length; i++)
        {
            double x = coordinates[2 * i], y = coordinates[2 * i + 1];
            xXi += byXi[i] * x;
            yXi += byXi[i] * y;
            xEta += byEta[i] * x;
            yEta += byEta[i] * y;
        }
        return xXi * yEta - xEta * yXi;
    }

    /// <summary>Stiffness over all functions, row-major (2·count)², overwritten.</summary>
    public static void Stiffness(
        int count, ReadOnlySpan<double> byX, ReadOnlySpan<double> byY, ReadOnlySpan<double> areas, PlaneElasticity material, double width, Span<double> stiffness)
    {
        int size = 2 * count;
        stiffness = stiffness[..(size * size)];
        stiffness.Clear();
        for (int point = 0; point < GaussPoints.Count; point++)
            AddStiffness(byX.Slice(point * count, count), byY.Slice(point * count, count), areas[point] * width, material.Stiffness, stiffness);
        Mirror(size, stiffness);
    }

    /// <summary>Copies the upper triangle of a row-major matrix to the lower.</summary>
    public static void Mirror(int size, Span<double> matrix)
    {
        for (int row = 1; row < size; row++)
            for (int column = 0; column < row; column++)
                matrix[row * size + column] = matrix[column * size + row];
    }

    /// <summary>Adds the upper triangle of Bᵀ·D·B·factor of one point, D symmetric.</summary>
    public static void AddStiffness(ReadOnlySpan<double> byX, ReadOnlySpan<double> byY, double factor, ReadOnlySpan<double> d, Span<double> stiffness)
    {
        int size = 2 * byX.Length;
        for (int j = 0; j < byX.Length; j++)
        {
            double gx = byX[j] * factor, gy = byY[j] * factor;
            // Stress per unit x and per unit y movement of function j.
            double xxX = d[0] * gx + d[2] * gy, yyX = d[3] * gx + d[5] * gy, xyX = d[6] * gx + d[8] * gy;
            double xxY = d[1] * gy + d[2] * gx, yyY = d[4] * gy + d[5] * gx, xyY = d[7] * gy + d[8] * gx;
            for (int i = 0; i <= j; i++)
            {
                double hx = byX[i], hy = byY[i];
                int at = 2 * i * size + 2 * j;
                stiffness[at] += hx * xxX + hy * xyX;
                stiffness[at + 1] += hx * xxY + hy * xyY;
                if (i < j)
                    stiffness[at + size] += hy * yyX + hx * xyX;
                stiffness[at + size + 1] += hy * yyY + hx * xyY;
            }
        }
    }

    /// <summary>Displacement gradient at one point: du/dx, du/dy, dv/dx, dv/dy.</summary>
    public static void Gradient(ReadOnlySpan<double> byX, ReadOnlySpan<double> byY, ReadOnlySpan<double> displacements, Span<double> gradient)
    {
        double uX = 0, uY = 0, vX = 0, vY = 0;
        for (int i = 0; i < byX.Length; i++)
        {
            double u = displacements[2 * i], v = displacements[2 * i + 1];
            uX += byX[i] * u;
            uY += byY[i] * u;
            vX += byX[i] * v;
            vY += byY[i] * v;
        }
        gradient[0] = uX;
        gradient[1] = uY;
        gradient[2] = vX;
        gradient[3] = vY;
    }

    /// <summary>Gradients at all points, four numbers each.</summary>
    public static void Gradients(int count, ReadOnlySpan<double> byX, ReadOnlySpan<double> byY, ReadOnlySpan<double> displacements, Span<double> gradients)
    {
        for (int point = 0; point < GaussPoints.Count; point++)
            Gradient(byX.Slice(point * count, count), byY.Slice(point * count, count), displacements, gradients.Slice(4 * point, 4));
    }

    /// <summary>Stresses at all points from their gradients, four numbers each.</summary>
    public static void Stresses(ReadOnlySpan<double> gradients, PlaneElasticity material, double temperatureChange, Span<double> stresses)
    {
        Span<double> strain = stackalloc double[3];
        for (int point = 0; point < GaussPoints.Count; point++)
        {
            Strain(gradients.Slice(4 * point, 4), strain);
            material.Stress(strain, temperatureChange, stresses.Slice(4 * point, 4));
        }
    }

    /// <summary>Elastic energy from the gradients at all points.</summary>
    public static double Energy(ReadOnlySpan<double> gradients, ReadOnlySpan<double> areas, PlaneElasticity material, double width, double temperatureChange)
    {
        Span<double> strain = stackalloc double[3];
        double energy = 0;
        for (int point = 0; point < GaussPoints.Count; point++)
        {
            Strain(gradients.Slice(4 * point, 4), strain);
            energy += material.EnergyDensity(strain, temperatureChange) * areas[point] * width;
        }
        return energy;
    }

    /// <summary>Force of stresses on the first <paramref name="loaded"/> functions: integral of Bᵀ·stress, overwritten.</summary>
    public static void Force(
        int count,
        int loaded,
        ReadOnlySpan<double> byX,
        ReadOnlySpan<double> byY,
        ReadOnlySpan<double> areas,
        ReadOnlySpan<double> stresses,
        double width,
        Span<double> force)
    {
        force[..(2 * loaded)].Clear();
        for (int point = 0; point < GaussPoints.Count; point++)
        {
            double factor = areas[point] * width;
            double xx = stresses[4 * point] * factor, yy = stresses[4 * point + 1] * factor, xy = stresses[4 * point + 3] * factor;
            for (int i = 0; i < loaded; i++)
            {
                double gx = byX[point * count + i], gy = byY[point * count + i];
                force[2 * i] += gx * xx + gy * xy;
                force[2 * i + 1] += gy * yy + gx * xy;
            }
        }
    }

    /// <summary>Stresses of one kelvin at blocked displacements, the same at all points.</summary>
    public static void StressesOfOneKelvin(PlaneElasticity material, Span<double> stresses)
    {
        Span<double> strain = stackalloc double[3];
        strain.Clear();
        for (int point = 0; point < GaussPoints.Count; point++)
            material.Stress(strain, 1, stresses.Slice(4 * point, 4));
    }

    /// <summary>Area and smallest relative determinant from the determinants at the Gauss points and at the nodes.</summary>
    public static ElementShape Shape(ReadOnlySpan<double> gaussDeterminants, ReadOnlySpan<double> nodeDeterminants)
    {
        double area = 0;
        foreach (double determinant in gaussDeterminants)
            area += determinant;
        double smallest = double.PositiveInfinity;
        foreach (double determinant in gaussDeterminants)
            smallest = Math.Min(smallest, determinant);
        foreach (double determinant in nodeDeterminants)
            smallest = Math.Min(smallest, determinant);
        // Over the size of the mean, so that a clockwise element shows a negative ratio instead of a positive one.
        return new ElementShape(area, smallest / Math.Abs(area / GaussPoints.Count));
    }

    /// <summary>Position of one point from the shape functions there.</summary>
    public static void Position(ReadOnlySpan<double> values, ReadOnlySpan<double> coordinates, Span<double> position)
    {
        double x = 0, y = 0;
        for (int node = 0; node < values.Length; node++)
        {
            x += values[node] * coordinates[2 * node];
            y += values[node] * coordinates[2 * node + 1];
        }
        position[0] = x;
        position[1] = y;
    }

    /// <summary>Values at nodes with natural coordinates <paramref name="xi"/>, <paramref name="eta"/> from values at the Gauss points.</summary>
    public static void Extrapolate(ReadOnlySpan<double> xi, ReadOnlySpan<double> eta, int components, ReadOnlySpan<double> gaussValues, Span<double> nodeValues)
    {
        Span<double> weights = stackalloc double[GaussPoints.Count];
        for (int node = 0; node < xi.Length; node++)
        {
            GaussPoints.InterpolationWeights(xi[node], eta[node], weights);
            for (int component = 0; component < components; component++)
            {
                double sum = 0;
                for (int point = 0; point < GaussPoints.Count; point++)
                    sum += weights[point] * gaussValues[point * components + component];
                nodeValues[node * components + component] = sum;
            }
        }
    }

    /// <summary>Strain xx, yy, xy (engineering) of a gradient.</summary>
    public static void Strain(ReadOnlySpan<double> gradient, Span<double> strain)
    {
        strain[0] = gradient[0];
        strain[1] = gradient[3];
        strain[2] = gradient[1] + gradient[2];
    }
}
