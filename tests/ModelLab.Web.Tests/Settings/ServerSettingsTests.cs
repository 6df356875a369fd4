using Microsoft.Extensions.Configuration;
using Microsoft.Extensions.FileProviders;
using Microsoft.Extensions.Hosting;
using ModelLab.Web.Settings;
using Xunit;

namespace ModelLab.Web.Tests.Settings;

public sealed class ServerSettingsTests
{
    [Fact]
    public void Without_settings_the_defaults_hold()
    {
        var settings = Read([], development: true);
        Assert.Equal(Path.Combine(AppContext.BaseDirectory, "data"), settings.Storage.DataFolder);
        Assert.Equal(Path.Combine(AppContext.BaseDirectory, "data", "keys"), settings.Storage.KeysFolder);
        Assert.Equal(1L << 30, settings.Uploads.MaximumBytes);
        Assert.Equal(12, settings.SignIn.MinimumPasswordLength);
        Assert.Equal(72, settings.SignIn.LongestSessionHours);
        Assert.False(settings.Proxies.Any);
    }

    [Fact]
    public void Outside_Development_the_data_lie_in_the_folder_of_the_account()
    {
        var local = Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData);
        Assert.SkipWhen(local.Length == 0, "This account has no folder for local application data.");
        Assert.Equal(Path.Combine(local, "ModelLab"), Read([], development: false).Storage.DataFolder);
    }

    [Theory]
    [InlineData("ModelLab:Uploads:MaximumBytes", "lots", "is 'lots', which is no whole number.")]
    [InlineData("ModelLab:Uploads:MaximumBytes", "0", "is 0; it may be from 1 to 68719476736.")]
    [InlineData("ModelLab:MaximumRequestBytes", "99999999999", "is 99999999999; it may be from 16384 to 67108864.")]
    [InlineData("ModelLab:SignIn:MinimumPasswordLength", "8", "is 8; it may be from 12 to 64.")]
    [InlineData("ModelLab:SignIn:LongestSessionHours", "0", "is 0; it may be from 1 to 2160.")]
    [InlineData("ModelLab:SignIn:LongestSessionHours", "11", "is 11, less than SessionHours (12).")]
    [InlineData("ModelLab:SignIn:LockOutMinutes", "1.5", "is '1.5', which is no whole number.")]
    [InlineData("ModelLab:Tokens:DefaultDays", "", "is '', which is no whole number.")]
    [InlineData("ModelLab:Proxies:Addresses", "10.0.0.1,proxy", "holds 'proxy', which is no IP address.")]
    [InlineData("ModelLab:Proxies:Networks:0", "10.0.0.0/40", "holds '10.0.0.0/40', which is no network such as 10.0.0.0/8.")]
    [InlineData("ModelLab:OrphanHours:Each", "1", "takes one value, not a section.")]
    [InlineData("ModelLab:Datafolder2", "x", "is not known. Known under ModelLab are: ")]
    [InlineData("ModelLab:Uploads:MaxBytes", "5", "is not known. Known under ModelLab:Uploads are: MaximumBytes.")]
    [InlineData("urls", "127.0.0.1:80", "holds '127.0.0.1:80', which is no address such as http://127.0.0.1:5240.")]
    [InlineData("FORWARDEDHEADERS_ENABLED", "true", "would believe forwarded headers from anyone")]
    [InlineData("Kestrel:Endpoints:Http:Url", "http://localhost:1", "would override the address")]
    public void A_wrong_setting_is_refused_with_its_name(string name, string value, string message)
    {
        var refused = Assert.Throws<SettingsRefusedException>(() => Read(new() { [name] = value }, development: true));
        var problem = Assert.Single(refused.Problems);
        Assert.StartsWith(problem.Setting, name, StringComparison.Ordinal);
        Assert.Contains(message, problem.Message, StringComparison.Ordinal);
        Assert.StartsWith($"The setting {problem.Setting} {message}", refused.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void All_wrong_settings_are_named_at_once()
    {
        var refused = Assert.Throws<SettingsRefusedException>(() => Read(
            new() { ["ModelLab:Uploads:MaximumBytes"] = "x", ["ModelLab:Colour"] = "red", ["ModelLab:Tokens:DefaultDays"] = "100", ["ModelLab:Tokens:MaximumDays"] = "30" },
            development: true));
        Assert.Equal(
            ["ModelLab:Colour", "ModelLab:Tokens:DefaultDays", "ModelLab:Uploads:MaximumBytes"],
            refused.Problems.Select(p => p.Setting).Order(StringComparer.Ordinal));
    }

    [Theory]
    [InlineData("http://*:8080")]
    [InlineData("http://+:80;https://[::]:443")]
    [InlineData("http://0.0.0.0:5000")]
    public void Addresses_that_the_server_can_take_are_let_through(string urls) => Read(new() { ["urls"] = urls }, development: true);

    [Fact]
    public void Names_are_taken_without_case_and_lists_from_numbered_values_too()
    {
        var settings = Read(new() { ["modellab:proxies:networks:0"] = "10.0.0.0/8", ["modellab:proxies:networks:1"] = "fd00::/8" }, development: true);
        Assert.Equal(["10.0.0.0/8", "fd00::/8"], settings.Proxies.Networks);
    }

    [Fact]
    public void A_relative_folder_counts_from_the_content_root()
    {
        var settings = Read(new() { ["ModelLab:DataFolder"] = "here", ["ModelLab:KeysFolder"] = "../apart" }, development: false);
        Assert.Equal(Path.Combine(AppContext.BaseDirectory, "here"), settings.Storage.DataFolder);
        Assert.Equal(Path.GetFullPath(Path.Combine(AppContext.BaseDirectory, "../apart")), settings.Storage.KeysFolder);
    }

    private static ServerSettings Read(Dictionary<string, string?> values, bool development) =>
        ServerSettings.Read(new ConfigurationBuilder().AddInMemoryCollection(values).Build(), new Surroundings(development ? "Development" : "Production"));

    private sealed class Surroundings(string name) : IHostEnvironment
    {
        public string EnvironmentName { get; set; } = name;

        public string ApplicationName { get; set; } = "ModelLab.Web";

        public string ContentRootPath { get; set; } = AppContext.BaseDirectory;

        public IFileProvider ContentRootFileProvider { get; set; } = new NullFileProvider();
    }
}
