using System.Globalization;
using System.Net;
using System.Text;
using System.Text.Json.Nodes;
using ModelLab.Ledger.Receipts;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.Paths;

/// <summary>A project from the first upload to the replay, over HTTP alone.</summary>
public sealed class JourneyTests(SharedServer shared)
{
    [Fact]
    public async Task A_path_is_walked_from_upload_to_replay()
    {
        var client = shared.Client;
        var project = await client.OpenProjectAsync("The whole way");
        var root = $"/api/v1/projects/{project}";
        var dataset = (await client.UploadAsync(project, Table()).JsonAsync(HttpStatusCode.Created)).Text("datasetId");
        var described = await client.PatchJsonAsync($"{root}/datasets/{dataset}/variables/dose%20(mg)", """{"label":"Dose given","unit":"mg","kind":"continuous","reason":"From the protocol."}""").JsonAsync(HttpStatusCode.OK);
        Assert.Equal("Dose given", described.Text("label"));
        Assert.True(described["confirmed"]!.GetValue<bool>());
        var soil = await client.PatchJsonAsync($"{root}/datasets/{dataset}/variables/soil", """{"referenceCategory":"loam","reason":"The common soil."}""").JsonAsync(HttpStatusCode.OK);
        Assert.Equal("loam", soil.Text("referenceCategory"));

        var path = await client.PostJsonAsync($"{root}/paths", $$$"""
            {"name":"Main","datasetId":"{{{dataset}}}","outcome":"yield","reason":"As planned.",
             "terms":[{"variable":"dose (mg)"},{"variable":"soil"},{"variable":"noise"}],
             "intercept":true,"heldIn":[{"variable":"dose (mg)"}],"rule":{"direction":"backward","criterion":"p","removeAbove":0.05},
             "covariance":"classical","confidence":0.95}
            """).JsonAsync(HttpStatusCode.Created);
        var pathId = path.Text("id");
        var first = Assert.Single(path["revisions"]!.AsArray())!;
        Assert.Equal("intercept", first["coefficients"]![0]!.Text("term"));
        Assert.Equal(40, first["n"]!.GetValue<int>());

        var preview = await client.PostJsonAsync($"{root}/paths/{pathId}/decisions?preview=true", Decision("remove", first.Text("id"))).JsonAsync(HttpStatusCode.OK);
        Assert.Null(preview["id"]);
        var second = await client.PostJsonAsync($"{root}/paths/{pathId}/decisions", Decision("remove", first.Text("id"))).JsonAsync(HttpStatusCode.Created);
        Assert.Equal(2, second["number"]!.GetValue<int>());
        Assert.Equal(preview["fit"]!.ToJsonString(), second["fit"]!.ToJsonString());
        var stale = await client.PostJsonAsync($"{root}/paths/{pathId}/decisions", Decision("add", first.Text("id"))).ProblemAsync(HttpStatusCode.Conflict);
        Assert.Equal("stale", stale.Text("kind"));
        await client.PostJsonAsync($"{root}/paths/{pathId}/choose", $$"""{"reason":"By the rule.","after":"{{second.Text("id")}}"}""").JsonAsync(HttpStatusCode.Created);

        await RowsAsync(client, $"{root}/revisions/{second.Text("id")}/rows");
        var comment = await client.PostJsonAsync($"{root}/comments", $$"""{"place":{"kind":"revision","id":"{{second.Text("id")}}","part":null},"text":"Why without noise?"}""").JsonAsync(HttpStatusCode.Created);
        await client.PostJsonAsync($"{root}/comments/{comment.Text("id")}/replies", """{"text":"It says nothing."}""").JsonAsync(HttpStatusCode.Created);
        var settled = await client.PostJsonAsync($"{root}/comments/{comment.Text("id")}/settle", """{"reason":"Answered."}""").JsonAsync(HttpStatusCode.Created);
        Assert.True(settled["settled"]!.GetValue<bool>());
        Assert.Equal(2, (await client.FetchAsync($"{root}/comments").JsonAsync(HttpStatusCode.OK)).AsArray().Count);
        _ = (await client.FetchAsync($"{root}/findings").JsonAsync(HttpStatusCode.OK)).AsArray();

        await SourceAsync(client, root);
        await LedgerAsync(client, root);
        var replay = await client.PostAsync($"{root}/replay", null, TestContext.Current.CancellationToken).JsonAsync(HttpStatusCode.OK);
        Assert.True(replay["ok"]!.GetValue<bool>());
        Assert.All(replay["revisions"]!.AsArray(), r => Assert.True(r!["equal"]!.GetValue<bool>()));
    }

    [Fact]
    public async Task People_of_a_project_are_managed_by_its_owner()
    {
        var project = await shared.Client.OpenProjectAsync();
        var root = $"/api/v1/projects/{project}/people";
        var member = await shared.Client.PostJsonAsync(root, $$"""{"email":"{{shared.Stranger.Email}}","role":"reviewer","reason":"Second pair of eyes."}""").JsonAsync(HttpStatusCode.Created);
        Assert.Equal("reviewer", member.Text("role"));
        await shared.StrangerClient.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK);
        await shared.StrangerClient.UploadAsync(project, Table()).ProblemAsync(HttpStatusCode.Forbidden);
        await shared.StrangerClient.PatchJsonAsync($"{root}/{shared.Stranger.Id}", """{"role":"owner","reason":"Me."}""").ProblemAsync(HttpStatusCode.Forbidden);
        await shared.Client.PatchJsonAsync($"{root}/{shared.Stranger.Id}", """{"role":"analyst","reason":"More work."}""").JsonAsync(HttpStatusCode.OK);
        await shared.Client.PatchJsonAsync($"{root}/{shared.Analyst.Id}", """{"role":"reader","reason":"Off."}""").ProblemAsync(HttpStatusCode.Conflict);
        await shared.Client.PatchJsonAsync($"{root}/{shared.Stranger.Id}", """{"reason":"No role."}""").ProblemAsync(HttpStatusCode.UnprocessableEntity);
        await shared.Client.DeleteAsync($"{root}/{shared.Stranger.Id}", TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        using var removed = await shared.Client.DeleteAsync($"{root}/{shared.Stranger.Id}?reason=Done", TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.NoContent, removed.StatusCode);
        await shared.StrangerClient.FetchAsync($"/api/v1/projects/{project}").ProblemAsync(HttpStatusCode.NotFound);
    }

    private static async Task RowsAsync(HttpClient client, string address)
    {
        var rows = (await client.FetchAsync($"{address}?statistics=leverage,cooksDistance").JsonAsync(HttpStatusCode.OK)).AsArray();
        Assert.Equal(40, rows.Count);
        Assert.Equal(["row", "leverage", "cooksDistance"], rows[0]!.AsObject().Select(m => m.Key));

        // The leverages add up to the number of columns of the model: intercept, dose, two of three soils (Hoaglin and Welsch 1978).
        Assert.Equal(4, rows.Sum(r => r!["leverage"]!.GetValue<double>()), 1e-9);

        using var request = new HttpRequestMessage(HttpMethod.Get, $"{address}?statistics=leverage,cooksDistance");
        request.Headers.Add("Accept", "text/csv");
        using var answer = await client.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.Equal("text/csv", answer.Content.Headers.ContentType?.MediaType);
        var lines = (await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken)).Split("\r\n");
        Assert.Equal("row,leverage,cooksDistance", lines[0]);
        Assert.Equal(string.Create(CultureInfo.InvariantCulture, $"1,{rows[0]!["leverage"]!.GetValue<double>():R},{rows[0]!["cooksDistance"]!.GetValue<double>():R}"), lines[1]);
        Assert.Equal(42, lines.Length);

        var unknown = await client.FetchAsync($"{address}?statistics=leverage,luck").ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("luck", unknown["errors"]![0]!.Text("column"));
        using var picture = new HttpRequestMessage(HttpMethod.Get, address);
        picture.Headers.Add("Accept", "image/png");
        await client.SendAsync(picture, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.NotAcceptable);
    }

    private static async Task SourceAsync(HttpClient client, string root)
    {
        var source = Assert.Single((await client.FetchAsync($"{root}/sources").JsonAsync(HttpStatusCode.OK)).AsArray())!;
        using var answer = await client.FetchAsync($"{root}/sources/{source["source"]!.Text("id")}/content");
        var bytes = await answer.Content.ReadAsByteArrayAsync(TestContext.Current.CancellationToken);
        Assert.Equal(Table(), bytes);
        Assert.Equal(source["source"]!.Text("sha256"), Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(bytes)));
        Assert.Equal("application/octet-stream", answer.Content.Headers.ContentType?.MediaType);
        Assert.Equal("attachment", answer.Content.Headers.ContentDisposition?.DispositionType);
        await client.FetchAsync($"{root}/sources/none/content").ProblemAsync(HttpStatusCode.NotFound);
    }

    private static async Task LedgerAsync(HttpClient client, string root)
    {
        var page = await client.FetchAsync($"{root}/ledger?from=2").JsonAsync(HttpStatusCode.OK);
        var entries = page["entries"]!.AsArray();
        Assert.Equal(2, entries[0]!["number"]!.GetValue<int>());
        Assert.Equal(page["count"]!.GetValue<int>() - 1, entries.Count);
        Assert.Null(page["next"]);
        var verified = await client.PostAsync($"{root}/ledger/verify", null, TestContext.Current.CancellationToken).JsonAsync(HttpStatusCode.OK);
        Assert.True(verified["ok"]!.GetValue<bool>());
        Assert.Equal(page["count"]!.GetValue<int>(), verified["entries"]!.GetValue<int>());
        Assert.Equal(entries[^1]!.Text("hash"), verified.Text("head"));

        using var answer = await client.FetchAsync($"{root}/ledger/receipt");
        var receipt = Receipt.Parse(await answer.Content.ReadAsByteArrayAsync(TestContext.Current.CancellationToken));
        Assert.Equal(verified.Text("root"), receipt.Root.ToString());
        Assert.Equal(verified.Text("head"), receipt.HeadHash.ToString());

        var file = System.Text.Encoding.UTF8.GetString(receipt.Write());
        var compared = await client.PostJsonAsync($"{root}/ledger/verify", $$"""{"receipts":[{{file}}]}""").JsonAsync(HttpStatusCode.OK);
        Assert.True(compared["ok"]!.GetValue<bool>());
        Assert.True(compared["receipts"]![0]!["ok"]!.GetValue<bool>());
        var forged = file.Replace($"\"count\":{receipt.Count}", $"\"count\":{receipt.Count - 1}", StringComparison.Ordinal);
        var refused = await client.PostJsonAsync($"{root}/ledger/verify", $$"""{"receipts":[{{forged}}]}""").JsonAsync(HttpStatusCode.OK);
        Assert.False(refused["ok"]!.GetValue<bool>());
        Assert.False(refused["receipts"]![0]!["ok"]!.GetValue<bool>());
        var nothing = await client.PostJsonAsync($"{root}/ledger/verify", """{"receipts":[{"count":1}]}""").ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("receipts[0]", nothing["errors"]![0]!.Text("column"));
        await client.PostJsonAsync($"{root}/ledger/verify", """{"receipts":[{"count":1e400}]}""").ProblemAsync(HttpStatusCode.UnprocessableEntity);
    }

    private static string Decision(string kind, string after) =>
        new JsonObject { ["kind"] = kind, ["term"] = new JsonObject { ["variable"] = "noise" }, ["reason"] = "It says nothing.", ["after"] = after }.ToJsonString();

    /// <summary>Forty plots: the yield follows dose and soil; noise is a fixed sequence that has nothing to do with it.</summary>
    private static byte[] Table()
    {
        var text = new StringBuilder("yield,dose (mg),soil,noise\n");
        string[] soils = ["clay", "loam", "sand"];
        for (var i = 0; i < 40; i++)
        {
            var dose = 1.5 + (i % 8);
            var noise = (i * 37 % 41) - 20;
            var yield = 12 + (2.25 * dose) + (3 * (i % 3)) + ((i * 17 % 13) - 6) * 0.4;
            text.Append(CultureInfo.InvariantCulture, $"{yield:0.####},{dose},{soils[i % 3]},{noise * 0.1:0.#}\n");
        }

        return Encoding.UTF8.GetBytes(text.ToString());
    }
}
