using ArrayWatch.Messaging;
using ArrayWatch.Simulation;
using MQTTnet;
using MQTTnet.Protocol;

namespace ArrayWatch.Demo;

/// <summary>Plays the invented arrays and publishes their frames over MQTT, each at the time at which it would be there.</summary>
internal sealed class ScenePublisher(IReadOnlyList<DemoScene> scenes, DemoClock clock, MqttOptions broker, TimeProvider time) : BackgroundService
{
    private const int StartValue = 7;

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        clock.Start(time.GetUtcNow());
        try
        {
            await Task.WhenAll(scenes.Select(scene => Task.Run(() => PlayAsync(scene, stoppingToken), stoppingToken)));
        }
        catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
        {
            // The show is over.
        }
    }

    private async Task PlayAsync(DemoScene demo, CancellationToken stopping)
    {
        Scene scene = demo.Scene with { StartTimeSeconds = clock.SceneStart.ToUnixTimeMilliseconds() / 1000.0 };
        SceneRunner runner = new(scene, new RandomNumbers(StartValue));
        float[] data = new float[runner.FrameLength];
        int[] shape = [scene.SnapshotsPerFrame, scene.Frequencies.Count, scene.Geometry.Count];
        string topic = $"{broker.TopicPrefix}/{demo.Id}/snapshots";
        using IMqttClient client = new MqttClientFactory().CreateMqttClient();
        await client.ConnectAsync(
            new MqttClientOptionsBuilder().WithTcpServer("127.0.0.1", broker.Port).WithClientId($"demo-{demo.Id}")
                .WithProtocolVersion(MQTTnet.Formatter.MqttProtocolVersion.V500).Build(), stopping);
        while (!stopping.IsCancellationRequested)
        {
            runner.NextFrame(data);
            byte[] body = FrameWriter.Write(runner.TimeSeconds, runner.Sequence, scene.SnapshotIntervalSeconds, scene.Frequencies, shape, data);
            TimeSpan early = DateTimeOffset.UnixEpoch.AddSeconds(runner.LastSnapshotSeconds) - time.GetUtcNow();
            if (early > TimeSpan.Zero) await Task.Delay(early, time, stopping);
            await client.PublishAsync(
                new MqttApplicationMessageBuilder().WithTopic(topic).WithPayload(body).WithContentType("application/cbor")
                    .WithQualityOfServiceLevel(MqttQualityOfServiceLevel.AtLeastOnce).Build(), stopping);
        }
    }
}
