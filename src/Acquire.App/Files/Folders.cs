using System.Globalization;
using System.Runtime.InteropServices;

namespace Acquire.App.Files;

/// <summary>Where the program keeps what is not the user's: sockets, notes about running processes, diagnostic logs.</summary>
/// <remarks>After the XDG Base Directory Specification 0.8; runs go to <c>runs/</c> below the current folder.</remarks>
internal static partial class Folders
{
    /// <summary>Sockets and notes about live processes; readable by this account only.</summary>
    public static string Runtime => Private(Path.Combine(RuntimeHome(), "acquire"));

    /// <summary>Diagnostic logs.</summary>
    public static string State => Private(Path.Combine(Home("XDG_STATE_HOME", ".local", "state"), "acquire"));

    /// <summary>The user's own driver, material and settings files.</summary>
    public static string Configuration => Path.Combine(Home("XDG_CONFIG_HOME", ".config"), "acquire");

    /// <summary>Creates the folder for this account only when it is not there.</summary>
    private static string Private(string path)
    {
        if (OperatingSystem.IsWindows())
        {
            Directory.CreateDirectory(path);
        }
        else
        {
            Directory.CreateDirectory(path, UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute);
        }

        return path;
    }

    private static string RuntimeHome()
    {
        var given = Environment.GetEnvironmentVariable("XDG_RUNTIME_DIR");
        if (!string.IsNullOrEmpty(given) && Directory.Exists(given))
        {
            return given;
        }

        // Without a session folder: one of our own below the temporary folder, named after the account.
        var account = OperatingSystem.IsWindows()
            ? Environment.UserName
            : EffectiveUserId().ToString(CultureInfo.InvariantCulture);
        return Private(Path.Combine(Path.GetTempPath(), $"acquire-{account}"));
    }

    private static string Home(string variable, params string[] below)
    {
        var given = Environment.GetEnvironmentVariable(variable);
        if (!string.IsNullOrEmpty(given))
        {
            return given;
        }

        return OperatingSystem.IsWindows()
            ? Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData)
            : Path.Combine([Environment.GetFolderPath(Environment.SpecialFolder.UserProfile), .. below]);
    }

    [LibraryImport("libc", EntryPoint = "geteuid")]
    private static partial uint EffectiveUserId();
}
