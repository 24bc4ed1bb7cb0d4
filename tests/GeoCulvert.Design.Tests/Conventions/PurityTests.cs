using System.Reflection;
using System.Reflection.Metadata;
using System.Reflection.PortableExecutable;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Tests.Conventions;

/// <summary>Design computes: it meets no file, console, clock, environment, chance without a seed, or foreign library but two.</summary>
public class PurityTests
{
    private static readonly HashSet<string> ForbiddenTypes = new(StringComparer.Ordinal)
    {
        "System.Console", "System.Diagnostics.Process", "System.Diagnostics.Stopwatch", "System.IO.File", "System.IO.FileInfo",
        "System.IO.FileStream", "System.IO.Directory", "System.IO.DirectoryInfo", "System.IO.Path", "System.IO.StreamWriter", "System.TimeProvider",
        "System.Net.Http.HttpClient", "System.Security.Cryptography.RandomNumberGenerator", "System.Runtime.InteropServices.NativeLibrary",
    };

    private static readonly HashSet<string> ForbiddenMembers = new(StringComparer.Ordinal)
    {
        "System.DateTime.get_Now", "System.DateTime.get_UtcNow", "System.DateTime.get_Today", "System.DateTimeOffset.get_Now",
        "System.DateTimeOffset.get_UtcNow", "System.Guid.NewGuid", "System.Random.get_Shared", "System.Random..ctor()",
    };

    [Fact]
    public void DesignReferencesOnlyGeometryAndNumerics() => Assert.All(
        typeof(Finding).Assembly.GetReferencedAssemblies().Select(a => a.Name!),
        name => Assert.True(name is "NetTopologySuite" or "MathNet.Numerics" || name.StartsWith("System.", StringComparison.Ordinal), name));

    [Fact]
    public void DesignTouchesNothingOutside()
    {
        using var file = File.OpenRead(typeof(Finding).Assembly.Location);
        using var image = new PEReader(file);
        var metadata = image.GetMetadataReader();
        var offences = new List<string>();
        foreach (var handle in metadata.TypeReferences)
        {
            var type = metadata.GetTypeReference(handle);
            var name = $"{metadata.GetString(type.Namespace)}.{metadata.GetString(type.Name)}";
            if (ForbiddenTypes.Contains(name)) offences.Add(name);
        }

        foreach (var handle in metadata.MemberReferences)
        {
            var member = metadata.GetMemberReference(handle);
            if (member.Parent.Kind != HandleKind.TypeReference) continue;
            var type = metadata.GetTypeReference((TypeReferenceHandle)member.Parent);
            var name = $"{metadata.GetString(type.Namespace)}.{metadata.GetString(type.Name)}.{metadata.GetString(member.Name)}";
            if (name == "System.Random..ctor" && metadata.GetBlobReader(member.Signature) is var s && ParameterCount(ref s) == 0) name += "()";
            // Iterators compiled from yield ask for the managed thread, nothing else of the environment.
            var environment = name.StartsWith("System.Environment.", StringComparison.Ordinal) && name != "System.Environment.get_CurrentManagedThreadId";
            if (environment || ForbiddenMembers.Contains(name)) offences.Add(name);
        }

        Assert.Empty(offences);

        static int ParameterCount(ref BlobReader signature)
        {
            signature.ReadSignatureHeader();
            return signature.ReadCompressedInteger();
        }
    }

    [Fact]
    public void OnlyLayersKnowsGdal() => Assert.All(
        Repository.SourceFiles("src").Where(f => !f.Contains("GeoCulvert.Layers", StringComparison.Ordinal)),
        f => Assert.DoesNotContain("DllImport", File.ReadAllText(f), StringComparison.Ordinal));

    [Fact]
    public void PublicFieldsAreConstantsOrTables() => Assert.Empty(
        typeof(Finding).Assembly.GetExportedTypes()
            .Where(t => !t.IsEnum)
            .SelectMany(t => t.GetFields(BindingFlags.Public | BindingFlags.Static | BindingFlags.DeclaredOnly))
            .Where(f => f is { IsLiteral: false, IsInitOnly: false })
            .Select(f => $"{f.DeclaringType}.{f.Name}"));
}
