using System.Globalization;
using InterfaceFE.Geometry;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Strips of plies against classical laminate theory.</summary>
public class LaminateTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData("held", "eight-node")]
    [InlineData("held", "four-node")]
    [InlineData("free", "eight-node")]
    [InlineData("uniform strain", "eight-node")]
    [InlineData("uniform strain", "four-node")]
    public void Bending_and_thermal_bow_follow_laminate_theory(string state, string elements)
    {
        foreach (Laminate laminate in (Laminate[])[Laminate.Uneven, Laminate.Crossed])
        {
            (double byMoment, double byHeating) = laminate.Curvatures(state, 10);
            double bent = Curvature(DeckOf.Run(DeckOf.Yaml(laminate.Deck(state, 10, elements))), laminate), bowed = Curvature(DeckOf.Run(DeckOf.Yaml(laminate.Deck(state, null, elements))), laminate);
            output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{state}, {elements}: bent {bent / byMoment:F5}, bowed {bowed / byHeating:F5} of the theory"));
            Close.To(byMoment, bent, 0.002);
            Close.To(byHeating, bowed, 0.002);
        }
    }

    [Fact]
    public void Rows_of_elements_keep_to_their_plies()
    {
        MeshedAdherend strip = Mesher.Build(DeckOf.Yaml(Laminate.Uneven.Deck("held", null))).Mesh.Adherends[0];
        Assert.Equal([0, 1, 2, 3, 4], strip.PlyOfRow.ToArray());
        string given = Laminate.Uneven.Deck("held", null).Replace("{along: 60}", "{along: 60, through: 8}", StringComparison.Ordinal);
        Assert.Equal([0, 0, 1, 2, 2, 3, 3, 4], Mesher.Build(DeckOf.Yaml(given)).Mesh.Adherends[0].PlyOfRow.ToArray());
    }

    private static double Curvature(RunResult run, Laminate laminate)
    {
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        return laminate.Curvature(run.History.Mesh, run.History.Snapshots[^1]);
    }
}
