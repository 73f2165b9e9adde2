using Acquire.Drivers.Files;

namespace Acquire.Drivers.Tests.Files;

public sealed class DriverCatalogueTests : IDisposable
{
    private readonly string _folder = Directory.CreateTempSubdirectory("acquire-drivers-").FullName;

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    [Fact]
    public void ShippedNames_AreTheFilesOfTheFolder() =>
        Assert.Equal(Directory.GetFiles(RepositoryFiles.Drivers, "*.driver.yaml").Select(path => Path.GetFileName(path)[..^".driver.yaml".Length]).Order(StringComparer.Ordinal),
            DriverCatalogue.ShippedNames);

    [Fact]
    public void Find_EveryShippedDriver_IsGoodAndNamesItsSchema()
    {
        foreach (var name in DriverCatalogue.ShippedNames)
        {
            var found = DriverCatalogue.Shipped.Find(name);
            Assert.Empty(found.Diagnostics);
            Assert.StartsWith("# yaml-language-server: $schema=driver.schema.json\n", found.Value!.Source.Text, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Find_FileBesideTheBench_GoesBeforeTheUsersAndTheShippedOne()
    {
        var user = Directory.CreateDirectory(Path.Combine(_folder, "user")).FullName;
        var catalogue = DriverCatalogue.For(Path.Combine(_folder, "x.bench.yaml"), user);
        var shipped = catalogue.Find("scpi-lamp").Value!.Source;
        Assert.Equal("scpi-lamp.driver.yaml", shipped.File);
        Write(user, "scpi-lamp", shipped.Text);
        Assert.Equal(Path.Combine(user, "scpi-lamp.driver.yaml"), catalogue.Find("scpi-lamp").Value!.Source.File);
        Write(_folder, "scpi-lamp", shipped.Text);
        Assert.Equal(Path.Combine(_folder, "scpi-lamp.driver.yaml"), catalogue.Find("scpi-lamp").Value!.Source.File);
    }

    [Fact]
    public void Find_FileWithAnotherNameInside_IsRefused()
    {
        Write(_folder, "my-lamp", DriverCatalogue.Shipped.Find("scpi-lamp").Value!.Source.Text);
        var found = DriverCatalogue.For(Path.Combine(_folder, "x.bench.yaml"), _folder).Find("my-lamp");
        Assert.Contains("the driver's name is not that of its file; found 'scpi-lamp'; allowed 'my-lamp'", found.Diagnostics[0].ToString(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("no-such-driver", "there is no driver of this name")]
    [InlineData("../secret", "this is not a name of a driver")]
    [InlineData("", "this is not a name of a driver")]
    public void Find_NothingThere_ListsWhatIs(string name, string message)
    {
        var diagnostic = Assert.Single(DriverCatalogue.Shipped.Find(name).Diagnostics);
        Assert.Contains(message, diagnostic.ToString(), StringComparison.Ordinal);
        Assert.Contains("scpi-lamp, scpi-source-meter, scpi-temperature-controller", diagnostic.Allowed, StringComparison.Ordinal);
    }

    private static void Write(string folder, string name, string text) => File.WriteAllText(Path.Combine(folder, name + ".driver.yaml"), text);
}
