namespace InterfaceFE.Benchmarks.Rivals;

/// <summary>A solver to compare with is missing or broke off. The message says what, and how to get it where it is missing.</summary>
public sealed class RivalException : Exception
{
    /// <summary>Makes one with a message.</summary>
    public RivalException(string message)
        : base(message)
    {
    }

    /// <summary>Makes one with a message and its cause.</summary>
    public RivalException(string message, Exception cause)
        : base(message, cause)
    {
    }

    /// <summary>Makes one without a message of its own.</summary>
    public RivalException()
    {
    }
}
