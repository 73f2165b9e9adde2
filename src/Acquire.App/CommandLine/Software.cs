using System.Reflection;

namespace Acquire.App.CommandLine;

/// <summary>Which program this is.</summary>
internal static class Software
{
    /// <summary>Name and version, stored in every run and analysis.</summary>
    public static string Name { get; } = "acquire " + (typeof(Software).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()?.InformationalVersion ?? "0");
}
