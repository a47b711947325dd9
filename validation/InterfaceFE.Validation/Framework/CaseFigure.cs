namespace InterfaceFE.Validation.Framework;

/// <summary>A curve of a figure.</summary>
/// <param name="Name">Name in the legend.</param>
/// <param name="X">Abscissas; pairs that are not finite break the line.</param>
/// <param name="Y">Ordinates, as many.</param>
/// <param name="Points">Whether each point is marked.</param>
public sealed record CaseCurve(string Name, IReadOnlyList<double> X, IReadOnlyList<double> Y, bool Points = false);

/// <summary>A figure of the report: curves over one pair of axes.</summary>
/// <param name="FileName">File name without extension, lower-case words joined by hyphens; unique.</param>
/// <param name="Title">Title.</param>
/// <param name="Subtitle">Grey line under the title.</param>
/// <param name="XTitle">Words and unit below.</param>
/// <param name="YTitle">Words and unit at the left.</param>
/// <param name="Curves">At most five curves.</param>
public sealed record CaseFigure(string FileName, string Title, string Subtitle, string XTitle, string YTitle, IReadOnlyList<CaseCurve> Curves);
