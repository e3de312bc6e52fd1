namespace Portfolio.Server.Tests.Fuzz;

/// <summary>In memory where the system allows it: whether writes outlive a power cut is not asked here, and the disk is slow.</summary>
internal sealed class QuickFolder : IDisposable
{
    private const string InMemory = "/dev/shm";

    public string Path { get; } = Directory.Exists(InMemory)
        ? Directory.CreateDirectory(System.IO.Path.Combine(InMemory, $"portfolio-{Guid.NewGuid():n}")).FullName
        : Directory.CreateTempSubdirectory("portfolio-").FullName;

    public void Dispose() => Directory.Delete(Path, recursive: true);
}
