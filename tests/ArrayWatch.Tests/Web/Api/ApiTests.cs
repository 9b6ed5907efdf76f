using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;
using ArrayWatch.Tests.Web.Sample;

namespace ArrayWatch.Tests.Web.Api;

public sealed class ApiTests : IAsyncLifetime
{
    private const string Swap = "/api/alerts/01JSWAP0000000000000000001";
    private readonly HttpClient _client = new();
    private PagesHost _host = null!;

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    public async ValueTask InitializeAsync()
    {
        _host = await PagesHost.StartAsync();
        _client.BaseAddress = new Uri(_host.Address);
    }

    public async ValueTask DisposeAsync()
    {
        _client.Dispose();
        await _host.DisposeAsync();
    }

    [Fact]
    public async Task Arrays_are_listed_with_channels_bins_last_frame_and_standing()
    {
        JsonElement arrays = await GetAsync("/api/arrays");

        Assert.Equal(5, arrays.GetArrayLength());
        JsonElement aft = arrays[0];
        Assert.Equal("aft", aft.GetProperty("id").GetString());
        Assert.Equal(32, aft.GetProperty("channels").GetInt32());
        Assert.Equal(12, aft.GetProperty("bins").GetInt32());
        Assert.Equal("degraded", aft.GetProperty("standing").GetString());
        Assert.Equal(2, aft.GetProperty("counts").GetProperty("faulty").GetInt32());
        Assert.Equal(JsonValueKind.Null, arrays[4].GetProperty("lastFrame").ValueKind);
    }

    [Fact]
    public async Task Health_is_the_health_message()
    {
        JsonElement health = await GetAsync("/api/arrays/aft/health");

        Assert.Equal("faulty", health.GetProperty("channels")[11].GetProperty("standing").GetString());
        Assert.Equal("out-of-service", health.GetProperty("channels")[30].GetProperty("standing").GetString());
        Assert.Equal(JsonValueKind.Null, health.GetProperty("channels")[3].GetProperty("gainDecibels").ValueKind);
    }

    [Fact]
    public async Task Coherence_is_of_the_nearest_bin()
    {
        JsonElement picture = await GetAsync("/api/arrays/aft/coherence?frequency=505&scale=slow");

        Assert.Equal(500, picture.GetProperty("frequency").GetDouble());
        Assert.Equal(32 * 32, picture.GetProperty("magnitude").GetArrayLength());
        Assert.Equal(32 * 32, picture.GetProperty("modelPhaseDegrees").GetArrayLength());
    }

    [Fact]
    public async Task A_trend_is_of_one_channel_by_its_label()
    {
        JsonElement trend = await GetAsync("/api/arrays/aft/trends?metric=gainDecibels&channel=H12&from=2026-05-01T00:00:00Z&to=2026-05-01T02:00:00%2B01:00&points=50");

        Assert.Equal(50, trend.GetProperty("mean").GetArrayLength());
        Assert.Equal("H12", trend.GetProperty("channel").GetString());
        Assert.StartsWith("2026-05-01T00:", trend.GetProperty("times")[0].GetString(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("/api/arrays/nowhere/health", 404)]
    [InlineData("/api/arrays/spare/health", 404)]
    [InlineData("/api/arrays/aft/coherence", 400)]
    [InlineData("/api/arrays/aft/coherence?frequency=NaN", 400)]
    [InlineData("/api/arrays/aft/coherence?frequency=500&scale=medium", 400)]
    [InlineData("/api/arrays/aft/trends", 400)]
    [InlineData("/api/arrays/aft/trends?metric=gainDecibels", 400)]
    [InlineData("/api/arrays/aft/trends?metric=gainDecibels&channel=Z9", 400)]
    [InlineData("/api/arrays/aft/trends?metric=misfit&channel=H1", 400)]
    [InlineData("/api/arrays/aft/trends?metric=unheard-of", 400)]
    [InlineData("/api/arrays/aft/trends?metric=misfit&points=1", 400)]
    [InlineData("/api/arrays/aft/trends?metric=misfit&points=10001", 400)]
    [InlineData("/api/arrays/aft/trends?metric=misfit&from=yesterday", 400)]
    [InlineData("/api/arrays/aft/trends?metric=misfit&from=2026-05-01T00:00:00", 400)]
    [InlineData("/api/arrays/aft/trends?metric=misfit&from=2026-05-02T00:00:00Z&to=2026-05-01T00:00:00Z", 400)]
    [InlineData("/api/alerts?array=nowhere", 404)]
    [InlineData("/api/alerts?state=angry", 400)]
    [InlineData("/api/alerts?limit=0", 400)]
    [InlineData("/api/alerts/01J0", 404)]
    [InlineData("/api/no/such/thing", 404)]
    public async Task What_cannot_be_answered_gets_a_problem_that_says_why(string path, int status)
    {
        using HttpResponseMessage answer = await _client.GetAsync(path, Stop);

        await AssertProblemAsync(answer, status);
    }

    [Fact]
    public async Task Alerts_are_newest_first_and_can_be_filtered()
    {
        JsonElement all = await GetAsync("/api/alerts"), waiting = await GetAsync("/api/alerts?array=aft&state=unacknowledged");

        Assert.Equal(2, all.GetArrayLength());
        Assert.Equal("swap", all[0].GetProperty("kind").GetString());
        Assert.Equal("unacknowledged", Assert.Single(waiting.EnumerateArray()).GetProperty("state").GetString());
        Assert.Equal(0, (await GetAsync("/api/alerts?to=2001-01-01T00:00:00Z")).GetArrayLength());
    }

    [Fact]
    public async Task An_action_is_carried_out_and_kept_in_the_audit_log()
    {
        using HttpResponseMessage answer = await _client.PostAsJsonAsync(Swap + "/acknowledge", new { who = "A. Person", why = "seen" }, Stop);

        Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        JsonElement detail = await GetAsync(Swap);
        Assert.Equal("acknowledged", detail.GetProperty("alert").GetProperty("state").GetString());
        Assert.Equal("A. Person", detail.GetProperty("audit")[0].GetProperty("who").GetString());
        Assert.Equal(2, detail.GetProperty("history").GetArrayLength());
    }

    [Theory]
    [InlineData("/acknowledge", "{}", 400)]
    [InlineData("/acknowledge", "{\"who\":\"  \"}", 400)]
    [InlineData("/acknowledge", "not json", 400)]
    [InlineData("/shelve", "{\"who\":\"a\"}", 400)]
    [InlineData("/shelve", "{\"who\":\"a\",\"until\":\"2001-01-01T00:00:00Z\"}", 400)]
    [InlineData("/shelve", "{\"who\":\"a\",\"until\":\"2999-01-01T00:00:00Z\"}", 400)]
    [InlineData("/unshelve", "{\"who\":\"a\"}", 409)]
    public async Task An_action_that_is_not_possible_is_refused_with_the_reason(string verb, string body, int status)
    {
        using StringContent content = new(body, Encoding.UTF8, "application/json");
        using HttpResponseMessage answer = await _client.PostAsync(Swap + verb, content, Stop);

        await AssertProblemAsync(answer, status);
    }

    [Fact]
    public async Task An_action_on_an_unknown_alert_is_not_found()
    {
        using HttpResponseMessage answer = await _client.PostAsJsonAsync("/api/alerts/01J0/acknowledge", new { who = "a" }, Stop);

        await AssertProblemAsync(answer, 404);
    }

    [Fact]
    public async Task A_form_from_anywhere_and_a_script_from_another_site_are_refused()
    {
        using FormUrlEncodedContent form = new(new Dictionary<string, string> { ["who"] = "a" });
        using HttpResponseMessage asForm = await _client.PostAsync(Swap + "/acknowledge", form, Stop);
        await AssertProblemAsync(asForm, 415);

        using HttpRequestMessage foreign = new(HttpMethod.Post, Swap + "/acknowledge") { Content = JsonContent.Create(new { who = "a" }) };
        foreign.Headers.Add("Origin", "http://elsewhere.example");
        using HttpResponseMessage asForeign = await _client.SendAsync(foreign, Stop);
        await AssertProblemAsync(asForeign, 403);

        using HttpRequestMessage own = new(HttpMethod.Post, Swap + "/acknowledge") { Content = JsonContent.Create(new { who = "a" }) };
        own.Headers.Add("Origin", _host.Address);
        using HttpResponseMessage asOwn = await _client.SendAsync(own, Stop);
        Assert.Equal(HttpStatusCode.OK, asOwn.StatusCode);
    }

    [Fact]
    public async Task A_store_that_fails_is_a_problem_of_the_service_not_of_the_caller()
    {
        _host.History.Failure = new IOException("disk gone");

        using HttpResponseMessage answer = await _client.GetAsync("/api/alerts", Stop);

        await AssertProblemAsync(answer, 503);
    }

    [Fact]
    public async Task The_interface_is_described_by_OpenAPI()
    {
        JsonElement paths = (await GetAsync("/openapi/v1.json")).GetProperty("paths");

        string[] expected =
        [
            "/api/arrays", "/api/arrays/{id}/health", "/api/arrays/{id}/coherence", "/api/arrays/{id}/trends", "/api/alerts",
            "/api/alerts/{id}/acknowledge", "/api/alerts/{id}/shelve", "/api/alerts/{id}/unshelve", "/api/alerts/{id}/out-of-service",
        ];
        Assert.Subset(paths.EnumerateObject().Select(static p => p.Name).ToHashSet(), expected.ToHashSet());
    }

    [Theory]
    [InlineData("/")]
    [InlineData("/_framework/blazor.web.js")]
    [InlineData("/_content/Plotly.Blazor/plotly-3.7.0.min.js")]
    [InlineData("/_content/ArrayWatch.Web/arraywatch.css")]
    public async Task Pages_and_their_files_are_served_with_headers_that_keep_browsers_at_home(string path)
    {
        using HttpResponseMessage answer = await _client.GetAsync(path, Stop);

        Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        Assert.Contains("default-src 'self'", answer.Headers.GetValues("Content-Security-Policy").Single(), StringComparison.Ordinal);
        Assert.Equal("nosniff", answer.Headers.GetValues("X-Content-Type-Options").Single());
    }

    private async Task<JsonElement> GetAsync(string path)
    {
        using HttpResponseMessage answer = await _client.GetAsync(path, Stop);
        Assert.True(answer.IsSuccessStatusCode, $"{path}: {answer.StatusCode} {await answer.Content.ReadAsStringAsync(Stop)}");
        return await answer.Content.ReadFromJsonAsync<JsonElement>(Stop);
    }

    private static async Task AssertProblemAsync(HttpResponseMessage answer, int status)
    {
        string text = await answer.Content.ReadAsStringAsync(Stop);
        Assert.True((int)answer.StatusCode == status, $"{answer.StatusCode}: {text}");
        Assert.Equal("application/problem+json", answer.Content.Headers.ContentType?.MediaType);
        using JsonDocument problem = JsonDocument.Parse(text);
        Assert.Equal(status, problem.RootElement.GetProperty("status").GetInt32());
        Assert.False(string.IsNullOrWhiteSpace(problem.RootElement.GetProperty("detail").GetString()));
    }
}
