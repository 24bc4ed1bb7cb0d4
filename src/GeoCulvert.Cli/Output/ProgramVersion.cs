using System.Reflection;

namespace GeoCulvert.Cli.Output;

/// <summary>The version of the program.</summary>
internal static class ProgramVersion
{
    /// <summary>"0.1.0".</summary>
    public static string Text { get; } = typeof(ProgramVersion).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()?.InformationalVersion ?? "0.0.0";
}
