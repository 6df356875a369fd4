using System.Net;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Http;

public sealed class HostileJsonTests(SharedServer shared)
{
    [Theory]
    [InlineData("""{"name":"x","question":"y","owner":"me"}""", "$.owner", "The member 'owner' is not known here. Known are: name, question.")]
    [InlineData("""{"Name":"x","question":"y"}""", "$.Name", "The member 'Name' is not known here.")]
    [InlineData("""{"name":"x","name":"z","question":"y"}""", "$", "The member 'name' stands twice")]
    [InlineData("""{"name":5,"question":"y"}""", "$.name", "expected is a text")]
    [InlineData("""{"name":["x"],"question":"y"}""", "$.name", "expected is a text")]
    [InlineData("""["name"]""", "$", "expected is an object")]
    [InlineData("null", "$", "")]
    [InlineData("""{"name":"x",}""", "$", "The body is not JSON")]
    [InlineData("""{"name":"x" // why""", "$", "The body is not JSON")]
    [InlineData("""{"name":NaN}""", "$.name", "The body is not JSON")]
    [InlineData("""{"name":"x","question":"\ud800"}""", "$", "")]
    [InlineData("{\"name\":\"x\",\"question\":\"a\nb\"}", "$.question", "The body is not JSON")]
    [InlineData("""{"name":"x" """, "$", "The body is not JSON")]
    public async Task A_broken_project_is_refused_with_its_place(string body, string place, string words)
    {
        var problem = await shared.Client.PostJsonAsync("/api/v1/projects", body).ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Contains(words, problem.Text("detail"), StringComparison.Ordinal);
        Assert.StartsWith(place, problem["errors"]![0]!.Text("column"), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("""{"rule":{"direction":"backward","criterion":"p","removeAbove":1e999}}""", "$.rule.removeAbove", "The number is too large for a double.")]
    [InlineData("""{"rule":{"direction":"backward","criterion":"p","removeAbove":"0.05"}}""", "$.rule.removeAbove", "A number is expected here.")]
    [InlineData("""{"rule":{"direction":"sideways","criterion":"p","removeAbove":0.05}}""", "$.rule.direction", "expected is one of backward")]
    [InlineData("""{"rule":{"direction":0,"criterion":"p","removeAbove":0.05}}""", "$.rule.direction", "expected is one of backward")]
    [InlineData("""{"rule":{"criterion":"p"}}""", "$.rule", "Missing in the body at $.rule: 'direction'")]
    [InlineData("""{"terms":[{"variable":"a"},{"power":{"variable":"b","degree":99}}]}""", "$.terms[1]", "A power names a variable and a whole degree from 2 to 20")]
    [InlineData("""{"terms":[{"cube":"a"}]}""", "$.terms[0]", "'cube' is no kind of term offered here")]
    [InlineData("""{"terms":[{"variable":"a","variable":"b"}]}""", "$.terms[0]", "")]
    [InlineData("""{"terms":{"variable":"a"}}""", "$.terms", "expected is a list")]
    [InlineData("""{"terms":[{"variable":"a"},null]}""", "$", "The list 'terms' holds null")]
    [InlineData("""{"heldIn":[null]}""", "$", "The list 'heldIn' holds null")]
    [InlineData("""{"rule":{"direction":"Backward","criterion":"p","removeAbove":0.05}}""", "$.rule.direction", "expected is one of backward")]
    [InlineData("""{"rule":{"direction":"backward","criterion":"p, aic"}}""", "$.rule.criterion", "expected is one of p, aic")]
    [InlineData("""{"confidence":123456789012345678901234567890e400}""", "$.confidence", "The number is too large for a double.")]
    [InlineData("""{"intercept":"yes"}""", "$.intercept", "expected is true or false")]
    public async Task A_broken_path_is_refused_with_its_place(string body, string place, string words)
    {
        var problem = await shared.Client.PostJsonAsync("/api/v1/projects/x/paths", body).ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Contains(words, problem.Text("detail"), StringComparison.Ordinal);
        Assert.Equal(place, problem["errors"]![0]!.Text("column"));
    }

    [Theory]
    [InlineData("""{"datasetId":"x","steps":[null]}""", "The list 'steps' holds null")]
    [InlineData("""{"datasetId":"x","steps":[{"kind":"collapse","reason":"r","groups":[null]}]}""", "The list 'groups' holds null")]
    [InlineData("""{"datasetId":"x","steps":[{"kind":"collapse","reason":"r","groups":[{"label":"a","categories":["b",null]}]}]}""", "The list 'categories' holds null")]
    [InlineData("""{"datasetId":"x","steps":[{"kind":"completeCases","reason":"r","variables":[null]}]}""", "The list 'variables' holds null")]
    public async Task A_list_with_nothing_at_a_place_is_refused(string body, string words)
    {
        var problem = await shared.Client.PostJsonAsync("/api/v1/projects/x/preparations", body).ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Contains(words, problem.Text("detail"), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("reviewer, analyst")]
    [InlineData("reviewer,owner")]
    [InlineData("Owner")]
    [InlineData("3")]
    [InlineData(" owner")]
    public async Task A_role_is_one_word(string role)
    {
        var project = await shared.Client.OpenProjectAsync();
        var body = $$"""{"email":"{{WebServer.EmailOf("Sten Marsh")}}","role":"{{role}}","reason":"to help"}""";
        var problem = await shared.Client.PostJsonAsync($"/api/v1/projects/{project}/people", body).ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Contains("expected is one of reader, reviewer, analyst, owner", problem.Text("detail"), StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_charset_that_is_not_known_is_refused()
    {
        using var body = new ByteArrayContent("{}"u8.ToArray());
        body.Headers.TryAddWithoutValidation("Content-Type", "application/json; charset=nonsense");
        await shared.Client.PostAsync("/api/v1/projects", body, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.UnsupportedMediaType);
    }

    [Fact]
    public async Task Deep_nesting_is_refused()
    {
        var body = """{"terms":""" + string.Concat(Enumerable.Repeat("[", 5000)) + string.Concat(Enumerable.Repeat("]", 5000)) + "}";
        await shared.Client.PostJsonAsync("/api/v1/projects/x/paths", body).ProblemAsync(HttpStatusCode.BadRequest);
        var terms = """{"terms":[""" + string.Concat(Enumerable.Repeat("""{"power":""", 5000)) + "1" + string.Concat(Enumerable.Repeat("}", 5000)) + "]}";
        await shared.Client.PostJsonAsync("/api/v1/projects/x/paths", terms).ProblemAsync(HttpStatusCode.BadRequest);
    }

    [Fact]
    public async Task Bytes_that_are_no_text_are_refused()
    {
        var body = new ByteArrayContent([.. "{\"name\":\""u8, 0xC3, 0x28, .. "\",\"question\":\"y\"}"u8]);
        body.Headers.ContentType = new("application/json");
        await shared.Client.PostAsync("/api/v1/projects", body, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.BadRequest);
    }

    [Theory]
    [InlineData("""{"name":"a\u0000b","question":"y"}""", "name")]
    [InlineData("""{"name":"a\nb","question":"y"}""", "name")]
    [InlineData("""{"name":"","question":"y"}""", "name")]
    [InlineData("""{"name":null,"question":"y"}""", "name")]
    [InlineData("""{"question":"y"}""", "name")]
    [InlineData("""{"name":"x"}""", "question")]
    public async Task A_text_that_is_none_is_refused_by_its_field(string body, string field)
    {
        var problem = await shared.Client.PostJsonAsync("/api/v1/projects", body).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal(field, problem["errors"]![0]!.Text("column"));
    }

    [Theory]
    [InlineData("""{"reason":"x"}""", "'active'")]
    [InlineData("""{"active":false,"reason":null}""", "'reason' may not be null")]
    public async Task A_member_that_has_to_be_there_is_named(string body, string words)
    {
        var problem = await shared.Client.PatchJsonAsync("/api/v1/people/x", body).ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Contains(words, problem.Text("detail"), StringComparison.Ordinal);
    }

    [Fact]
    public async Task Nothing_of_a_refused_body_was_stored()
    {
        await using var server = await WebServer.StartAsync();
        using var client = await server.ClientAsync(await server.PersonAsync("Ada Quill"));
        await client.PostJsonAsync("/api/v1/projects", """{"name":"x","question":"y","more":1}""").ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Empty((await client.FetchAsync("/api/v1/projects").JsonAsync(HttpStatusCode.OK)).AsArray());
    }
}
