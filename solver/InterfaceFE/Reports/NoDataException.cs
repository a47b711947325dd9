namespace InterfaceFE.Reports;

/// <summary>There is nothing to draw; the message says why, in words for the user.</summary>
internal sealed class NoDataException(string message) : Exception(message);
