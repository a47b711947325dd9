using System.Text;

namespace InterfaceFE.Results;

/// <summary>Writes files so that a reader finds the old content or the new one, never half of it.</summary>
internal static class WholeFile
{
    /// <summary>Writes a file beside its final name and moves it there; on failure the half-written one is removed and the old file stays.</summary>
    /// <param name="path">Final name; its folder must exist.</param>
    /// <param name="write">Writes the content.</param>
    public static void Write(string path, Action<Stream> write)
    {
        string part = path + ".part";
        try
        {
            using (FileStream stream = new(part, FileMode.Create, FileAccess.Write, FileShare.Read))
                write(stream);
            File.Move(part, path, overwrite: true);
        }
        catch
        {
            File.Delete(part);
            throw;
        }
    }

    /// <summary>Writes text as UTF-8 without byte order mark.</summary>
    public static void Write(string path, string text) => Write(path, stream => stream.Write(Encoding.UTF8.GetBytes(text)));
}
