using GeoCulvert.Design.Basis;

namespace GeoCulvert.Cli.Output;

/// <summary>
/// The output folder. Files are written into <c>.new</c> inside it and moved into place only when all are there: a crash before that
/// leaves the former results untouched, and a crash during the moves is finished by the next run (the mark <c>.new/complete</c> says so).
/// </summary>
internal sealed class ResultsFolder : IDisposable
{
    private const string Mark = "complete";
    private readonly string _fresh;
    private readonly FileStream _lock;

    private ResultsFolder(string folder, FileStream held)
    {
        (Folder, _fresh, _lock) = (folder, Path.Combine(folder, ".new"), held);
        if (File.Exists(Path.Combine(_fresh, Mark))) MoveAll();
        if (Directory.Exists(_fresh)) Directory.Delete(_fresh, recursive: true);
        Directory.CreateDirectory(_fresh);
    }

    /// <summary>The folder that people see.</summary>
    public string Folder { get; }

    /// <summary>Opens (and creates) the folder for one writer.</summary>
    /// <exception cref="InputException">It cannot be written, or another run is writing into it.</exception>
    public static ResultsFolder Open(string folder, string place)
    {
        try
        {
            Directory.CreateDirectory(folder);
            var held = new FileStream(
                Path.Combine(folder, ".lock"), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None, 1, FileOptions.DeleteOnClose);
            return new ResultsFolder(folder, held);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException(place, $"the results folder {folder}, which cannot be written ({e.Message})", "a folder this user may write and no other run is using");
        }
    }

    /// <summary>Where a new file is written until <see cref="Publish"/>.</summary>
    public string PathOf(string name)
    {
        var path = Path.Combine(_fresh, name);
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        return path;
    }

    /// <summary>Moves every new file into place.</summary>
    /// <returns>The files, relative to the folder, in order.</returns>
    public IReadOnlyList<string> Publish()
    {
        File.WriteAllText(Path.Combine(_fresh, Mark), "");
        return MoveAll();
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        if (Directory.Exists(_fresh)) Directory.Delete(_fresh, recursive: true);
        _lock.Dispose();
    }

    private List<string> MoveAll()
    {
        var moved = new List<string>();
        foreach (var file in Directory.EnumerateFiles(_fresh, "*", SearchOption.AllDirectories).Order(StringComparer.Ordinal))
        {
            var name = Path.GetRelativePath(_fresh, file);
            if (name == Mark) continue;
            var target = Path.Combine(Folder, name);
            Directory.CreateDirectory(Path.GetDirectoryName(target)!);
            File.Move(file, target, overwrite: true);
            moved.Add(name);
        }

        File.Delete(Path.Combine(_fresh, Mark));
        return moved;
    }
}
