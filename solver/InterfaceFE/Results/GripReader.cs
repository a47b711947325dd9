using InterfaceFE.Decks;
using InterfaceFE.Marching;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>Reads displacement, force, rotation and moment of the grips at a point. Forces and moments are those on the specimen.</summary>
/// <param name="model">The model.</param>
/// <param name="grips">Grips as results know them, in the model's order.</param>
public sealed class GripReader(SpecimenModel model, IReadOnlyList<GripInfo> grips)
{
    /// <summary>Readings at the accepted point.</summary>
    public IReadOnlyList<GripReading> Read(FullEquilibrium equilibrium)
    {
        var readings = new GripReading[grips.Count];
        for (int i = 0; i < readings.Length; i++)
            readings[i] = Read(equilibrium, model.Grips[i], grips[i]);
        return readings;
    }

    private GripReading Read(FullEquilibrium equilibrium, Grip grip, GripInfo info)
    {
        UnknownMap map = model.Unknowns;
        double x = 0, y = 0, forceX = 0, forceY = 0;
        int points = 0;
        double? rotation = null, moment = null;
        foreach (int b in grip.Bodies)
        {
            GripBody body = map.Bodies[b];
            if (body.Rigid)
            {
                int first = map.OfBody(b);
                x += equilibrium.AcceptedDisplacement[first];
                y += equilibrium.AcceptedDisplacement[first + 1];
                points++;
                forceX += equilibrium.GripForce(first);
                forceY += equilibrium.GripForce(first + 1);
                if (grip.Bodies.Count == 1)
                {
                    rotation = equilibrium.AcceptedDisplacement[first + 2];
                    moment = equilibrium.GripForce(first + 2);
                }
                continue;
            }
            foreach (int node in body.Nodes)
            {
                int first = map.OfNode(node);
                x += equilibrium.AcceptedDisplacement[first];
                y += equilibrium.AcceptedDisplacement[first + 1];
                points++;
                forceX += equilibrium.GripForce(first);
                forceY += equilibrium.GripForce(first + 1);
            }
        }
        double? crosshead = null;
        foreach (LoadTrain train in grip.LoadTrains)
        {
            int unknown = map.OfCrosshead(train);
            bool alongX = train.Component == GripComponent.X;
            if (alongX)
                forceX += equilibrium.ExternalForce(unknown);
            else
                forceY += equilibrium.ExternalForce(unknown);
            if ((alongX ? info.DirectionX : info.DirectionY) is var sense && sense != 0)
                crosshead = sense * equilibrium.AcceptedDisplacement[unknown];
        }
        return new GripReading((x * info.DirectionX + y * info.DirectionY) / points, forceX * info.DirectionX + forceY * info.DirectionY, rotation, moment, forceX, forceY) { Crosshead = crosshead };
    }
}
