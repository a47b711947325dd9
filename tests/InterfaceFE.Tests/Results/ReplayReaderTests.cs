using InterfaceFE.Marching;
using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Results;

public class ReplayReaderTests
{
    private const string Header = "stage,point,retries,iteration,control,stride,progress,load factor,root,out of balance [N],relative,correction [mm],unstable directions,changed elements,reason,guess\r\n";

    [Fact]
    public void Searches_that_found_a_point_are_taken_and_others_left_out()
    {
        ReplayPlan plan = ReplayReader.Read(Header
            + "2,1,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,predicted,0\r\n2,1,0,1,own,0.1,0.1,0.1,0,9,2,0,0,3,stalled,0\r\n"
            + "2,1,1,0,own,0.04,0.04,0.04,0,0,1e-12,0,0,3,converged,0\r\n"
            + "2,2,0,0,own,0.1,0.14,0.14,0,0,1e-12,0,0,3,\"converged, but the energy error of the stride is too large\",1.6\r\n"
            + "2,2,1,0,layer work,0.30000000000000004,0.9,0.9,0,1,0.1,0,0,3,predicted,0.64\r\n2,2,1,1,layer work,0.30000000000000004,1.2,1.2,0,0,1e-11,0,0,3,converged past the stage's end,0.64\r\n"
            + "2,2,1,0,own,0.96,1,1,0,0,0.2,0,0,3,predicted,0.8\r\n2,2,1,1,own,0.96,1,1,0,0,1e-13,0,0,3,converged at the floor,0.8\r\n");
        Assert.Equal(2, plan.Points.Count);
        Assert.Equal(new RecordedSearch("own", 0.04, 0, 0.04, 0, 1e-12), Assert.Single(plan.Points[0].Searches));
        Assert.Equal((1, 2), (plan.Points[0].Retries, plan.Points[1].Number));
        Assert.Equal([new RecordedSearch("layer work", 0.1 + 0.2, 0.64, 1.2, 1, 1e-11), new RecordedSearch("own", 0.96, 0.8, 1, 1, 1e-13)], plan.Points[1].Searches);
    }

    [Theory]
    [InlineData("", "it is no convergence.csv")]
    [InlineData("a,b\r\n1,2\r\n", "it is no convergence.csv")]
    [InlineData("stage,point\r\n1,1\r\n", "no column 'retries'")]
    [InlineData(Header, "it holds no point")]
    [InlineData(Header + "2,1,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,stalled,0\r\n", "it holds no point")]
    [InlineData(Header + "2,1,0,0,own,much,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n", "row 2, column 'stride': 'much' is not a number")]
    [InlineData(Header + "2,1,0,0,own,0.1\r\n", "row 2 has 6 fields")]
    [InlineData(Header + "2,1,0,0,\"own,0.1\r\n", "quote is left open")]
    [InlineData(Header + "2,1,0,0,pull,0.1,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n", "control 'pull'")]
    [InlineData(Header + "2,1,0,0,own,0,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n", "cannot be followed")]
    [InlineData(Header + "2,1,0,0,own,0.1,0.1,0.1,1,1,0.5,0,0,3,converged,0\r\n", "root 1")]
    [InlineData(Header + "2,2,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n", "point 1 is missing")]
    [InlineData(Header + "2,1,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n3,2,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n", "stage 2 ends at progress 0.1, and yet stage 3 follows")]
    [InlineData(Header + "2,1,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,stalled,0\r\n2,2,0,0,own,0.1,0.1,0.1,0,1,0.5,0,0,3,converged,0\r\n", "point 1 was not found")]
    public void What_cannot_be_replayed_says_why(string text, string words) =>
        Assert.Contains(words, Assert.Throws<ReplayException>(() => ReplayReader.Read(text)).Message, StringComparison.Ordinal);

    [Fact]
    public void Csv_reader_reads_back_what_the_table_writes()
    {
        using StringWriter writer = new();
        using (var table = new CsvTable(writer, ["a", "b,\"c\""]))
        {
            table.Add("x\r\ny").Add(1e-300).EndRow();
            table.Add((string?)null).Add("say \"no\", he said").EndRow();
        }
        Assert.Equal([["a", "b,\"c\""], ["x\r\ny", "1E-300"], ["", "say \"no\", he said"]], CsvReader.Rows(writer.ToString()));
    }
}
