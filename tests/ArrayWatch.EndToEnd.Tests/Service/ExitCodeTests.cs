using System.Net;
using System.Net.Sockets;
using System.Text.Json.Nodes;
using ArrayWatch.EndToEnd.Tests.Servers;

namespace ArrayWatch.EndToEnd.Tests.Service;

public sealed class ExitCodeTests
{
    [Fact]
    public async Task Checking_a_good_configuration_ends_with_0_and_a_summary()
    {
        using WorkFolder folder = new();
        await using ServiceProcess check = ServiceProcess.Start("check", "--config", folder.Write(WorkFolder.Small(1883, null)));
        Assert.Equal(0, await check.EndAsync());
        Assert.Empty(check.Errors);
        Assert.Contains("array aft", check.Output, StringComparison.Ordinal);
        Assert.Contains("1000 Hz", check.Output, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("check")]
    [InlineData("run")]
    public async Task A_bad_configuration_ends_with_2_and_a_line_for_each_cause(string command)
    {
        using WorkFolder folder = new();
        JsonObject configuration = WorkFolder.Small(1883, null);
        configuration["broker"]!["port"] = -1;
        configuration["arrays"]![0]!["tolerence"] = new JsonObject();
        await using ServiceProcess service = ServiceProcess.Start(command, "--config", folder.Write(configuration));
        Assert.Equal(2, await service.EndAsync());
        Assert.Equal(
        [
            "broker.port: -1 is not allowed; give a whole number: a port from 1 to 65535",
            "arrays[0].tolerence: is no known key; the nearest known one is 'tolerances'",
        ], service.Errors);
    }

    [Fact]
    public async Task A_command_line_that_makes_no_sense_ends_with_2()
    {
        await using ServiceProcess service = ServiceProcess.Start("run");
        Assert.Equal(2, await service.EndAsync());
        Assert.NotEmpty(service.Errors);
    }

    [Fact]
    public async Task A_missing_configuration_ends_a_run_with_3()
    {
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", "/nowhere/arraywatch.json");
        Assert.Equal(3, await service.EndAsync());
        Assert.Contains("/nowhere/arraywatch.json", Assert.Single(service.Errors), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public async Task A_port_that_is_taken_ends_with_3_and_one_line(bool isWeb)
    {
        using TcpListener other = new(IPAddress.Loopback, 0);
        other.Start();
        int taken = ((IPEndPoint)other.LocalEndpoint).Port;
        using WorkFolder folder = new();
        JsonObject configuration = isWeb ? WorkFolder.Small(MosquittoBroker.FreePort(), taken) : WorkFolder.Small(taken, null, embedded: true);
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", folder.Write(configuration));
        Assert.Equal(3, await service.EndAsync());
        Assert.Contains(isWeb ? "web.url" : "broker.port", Assert.Single(service.Errors), StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", service.Output, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_store_that_cannot_be_opened_ends_with_3_and_one_line()
    {
        using WorkFolder folder = new();
        JsonObject configuration = WorkFolder.Small(MosquittoBroker.FreePort(), null);
        configuration["store"]!["path"] = "/proc/nowhere/store.db";
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", folder.Write(configuration));
        Assert.Equal(3, await service.EndAsync());
        Assert.Contains("/proc/nowhere", Assert.Single(service.Errors), StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", service.Output, StringComparison.Ordinal);
    }
}
