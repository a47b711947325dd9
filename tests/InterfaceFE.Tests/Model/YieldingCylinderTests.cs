using System.Globalization;
using InterfaceFE.Marching;
using InterfaceFE.Tests.Mechanics.Elements;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Thick cylinder that yields (Hill, The Mathematical Theory of Plasticity, 1950), formulas exact for Poisson's ratio 1/2.</summary>
public class YieldingCylinderTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData(120, 139.207, 0.3, 0.01)]
    [InlineData(160, 180.134, 0.3, 0.01)]
    [InlineData(120, 139.207, 0.4999, 0.002)]
    [InlineData(160, 180.134, 0.4999, 0.002)]
    public void Outer_face_moves_as_by_Hill(double radius, double pressure, double poisson, double tolerance)
    {
        Close.To(pressure, PressedCylinder.Pressure(radius), 1e-5);
        PressedCylinder cylinder = new(6, 12, poisson, PressedCylinder.Pressure(radius));
        Assert.True(cylinder.Outcome.Status == MarchStatus.Finished, cylinder.Outcome.Cause);
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"movement {cylinder.OuterMovement / PressedCylinder.Movement(radius, poisson):F5} of Hill's, yielded to {cylinder.YieldedRadius():F2}, {cylinder.Points.Count} points, {cylinder.Iterations.Count} iterations, balance {cylinder.Points[^1].Energy.Balance:E1}, path error {cylinder.Points[^1].Energy.PathError:E1}"));
        Close.To(PressedCylinder.Movement(radius, poisson), cylinder.OuterMovement, tolerance);
        Assert.True(cylinder.Points[^1].Energy.Balance < 1e-9 && cylinder.Points[^1].Energy.PathError < 1e-3);
    }

    [Theory]
    [InlineData(0.3)]
    [InlineData(0.4999)]
    public void Limit_pressure_is_Hills(double poisson)
    {
        double limit = PressedCylinder.Pressure(PressedCylinder.Outer);
        PressedCylinder cylinder = new(4, 12, poisson, 1.02 * limit);
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{cylinder.Reached * 1.02:R} of the limit: {cylinder.Outcome.Cause}"));
        Assert.Equal(MarchStatus.StoppedEarly, cylinder.Outcome.Status);
        Close.To(1, 1.02 * cylinder.Reached, 1e-5);
    }

    [Fact]
    public void Corrections_converge_quadratically_while_metal_yields()
    {
        PressedCylinder cylinder = new(4, 8, 0.3, 0.999 * PressedCylinder.Pressure(PressedCylinder.Outer));
        List<double> orders = [];
        foreach (IGrouping<int, MarchIteration> point in cylinder.Iterations.GroupBy(i => i.Point))
        {
            double[] relative = [.. point.Select(i => i.Newton.Relative)];
            // The last three forces out of balance, once they are small and before rounding rules.
            for (int i = 2; i < relative.Length; i++)
                if (relative[i - 2] < 1e-2 && relative[i] > 1e-12 && relative[i] < relative[i - 1] && relative[i - 1] < relative[i - 2] && i == relative.Length - 1)
                    orders.Add(Math.Log(relative[i] / relative[i - 1]) / Math.Log(relative[i - 1] / relative[i - 2]));
        }
        orders.Sort();
        output.WriteLine("orders of the last correction: " + string.Join(", ", orders.Select(o => o.ToString("F2", CultureInfo.InvariantCulture))));
        Assert.NotEmpty(orders);
        Assert.True(orders[orders.Count / 2] > 1.7, "median order");
    }
}
