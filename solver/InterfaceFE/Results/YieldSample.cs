namespace InterfaceFE.Results;

/// <summary>Where an adherend has yielded most at a point. Elements that touch a grip count apart: stresses there are those of the grip's idealisation.</summary>
/// <param name="Largest">Largest equivalent plastic strain away from grips; 0 where nothing has yielded.</param>
/// <param name="X">x of its place [mm].</param>
/// <param name="Y">y of its place [mm].</param>
/// <param name="AtGrip">Whether an element that touches a grip has yielded.</param>
/// <param name="LargestAnywhere">Largest equivalent plastic strain, grips included.</param>
public readonly record struct YieldSample(double Largest, double X, double Y, bool AtGrip, double LargestAnywhere);
