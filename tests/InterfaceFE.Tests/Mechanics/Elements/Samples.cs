using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>Single elements and materials for tests; random ones come from a seed that the test names.</summary>
internal static class Samples
{
    /// <summary>Invented material, turned so that every entry of the stiffness counts.</summary>
    public static PlaneElasticity Laminate(OutOfPlaneState state) =>
        PlaneElasticity.Orthotropic(new OrthotropicConstants(24000, 9000, 17000, 0.30, 0.12, 0.28, 3600, 14e-6, 30e-6, 11e-6), state).Rotated(0.4);

    /// <summary>Coordinates of an element with straight sides from x, y of its four corners.</summary>
    public static double[] FromCorners<TElement>(double[] corners)
        where TElement : struct, IPlaneElement
    {
        double[] coordinates = new double[TElement.Unknowns];
        corners.CopyTo(coordinates, 0);
        for (int side = 0; TElement.Nodes == 8 && side < 4; side++)
            for (int k = 0; k < 2; k++)
                coordinates[8 + 2 * side + k] = (corners[2 * side + k] + corners[2 * ((side + 1) % 4) + k]) / 2;
        return coordinates;
    }

    /// <summary>A distorted element about 3 × 2, with bent sides if asked for and if it has middle nodes.</summary>
    public static double[] Distorted<TElement>(int seed, bool curved)
        where TElement : struct, IPlaneElement
    {
        Random random = new(seed);
        double[] coordinates = FromCorners<TElement>([.. new double[] { 0, 0, 3, 0, 3, 2, 0, 2 }.Select(v => v + 0.6 * (random.NextDouble() - 0.5))]);
        for (int i = 8; curved && i < coordinates.Length; i++)
            coordinates[i] += 0.3 * (random.NextDouble() - 0.5);
        return coordinates;
    }

    public static double[] Displacements<TElement>(int seed)
        where TElement : struct, IPlaneElement
    {
        Random random = new(seed);
        return [.. Enumerable.Range(0, TElement.Unknowns).Select(_ => 0.02 * (random.NextDouble() - 0.5))];
    }
}
