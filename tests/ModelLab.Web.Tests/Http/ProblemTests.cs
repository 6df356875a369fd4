using System.Net;
using Microsoft.AspNetCore.Http;
using ModelLab.Intake;
using ModelLab.Projects;
using ModelLab.Statistics.Designs;
using ModelLab.Store.Vault;
using ModelLab.Store.Writing;
using ModelLab.Web.Http;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Http;

public sealed class ProblemTests(SharedServer shared)
{
    public static TheoryData<RefusalKind, int, string> Kinds => new()
    {
        { RefusalKind.Invalid, 422, "invalid" },
        { RefusalKind.NotFound, 404, "notFound" },
        { RefusalKind.Forbidden, 403, "forbidden" },
        { RefusalKind.Stale, 409, "stale" },
        { RefusalKind.Conflict, 409, "conflict" },
        { RefusalKind.Withdrawn, 410, "withdrawn" },
    };

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Every_kind_of_refusal_has_its_status(RefusalKind kind, int status, string word)
    {
        Assert.Equal(Enum.GetValues<RefusalKind>().Length, Kinds.Count);
        var problem = ProblemTranslation.OfRefusal(new DefaultHttpContext(), new RefusedException(kind, "Because."))!;
        Assert.Equal(status, problem.Status);
        Assert.Equal("Because.", problem.Detail);
        Assert.Equal(word, problem.Extensions["kind"]);
    }

    [Fact]
    public void A_refused_file_names_rows_and_columns()
    {
        var problem = ProblemTranslation.OfRefusal(new DefaultHttpContext(), new IntakeRefusedException("No table.", [new IntakeProblem(7, "rooms", "Is no number.")]))!;
        Assert.Equal(422, problem.Status);
        Assert.Equal([new RefusalDetail(7, "rooms", "Is no number.")], Assert.IsAssignableFrom<IReadOnlyList<RefusalDetail>>(problem.Extensions["errors"]));
    }

    [Fact]
    public void A_refused_model_names_what_is_aliased()
    {
        var refused = new ModelRefusedException(ModelRefusal.RankDeficient, "Too many columns.", ["c"], [new Alias("c", ["intercept", "a"])]);
        var problem = ProblemTranslation.OfRefusal(new DefaultHttpContext(), refused)!;
        Assert.Equal(422, problem.Status);
        Assert.Equal("rankDeficient", problem.Extensions["kind"]);
        Assert.Equal([new RefusalDetail(null, "c", "c is already determined by intercept, a.")], Assert.IsAssignableFrom<IReadOnlyList<RefusalDetail>>(problem.Extensions["errors"]));
    }

    [Fact]
    public void A_store_that_was_changed_from_outside_is_said()
    {
        var problem = ProblemTranslation.OfFault(new DefaultHttpContext(), new VaultDamagedException("Chunk 0 of source s is not what was stored."));
        Assert.Equal(500, problem.Status);
        Assert.Equal("damaged", problem.Extensions["kind"]);
        Assert.StartsWith("Chunk 0 of source s is not what was stored. The store was changed from outside.", problem.Detail, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("GET", "It was a request for reading, so nothing was changed.")]
    [InlineData("POST", "look whether it stands in the ledger")]
    public void A_fault_tells_nothing_of_the_inside_and_promises_nothing_that_is_not_sure(string method, string words)
    {
        var context = new DefaultHttpContext();
        context.Request.Method = method;
        Assert.Null(ProblemTranslation.OfRefusal(context, new InvalidOperationException("secret detail")));
        var problem = ProblemTranslation.OfFault(context, new InvalidOperationException("secret detail"));
        Assert.Equal(500, problem.Status);
        Assert.Contains(words, problem.Detail, StringComparison.Ordinal);
        Assert.DoesNotContain("secret", problem.Detail, StringComparison.Ordinal);
    }

    [Fact]
    public void A_full_disk_is_told()
    {
        var full = new StorageFailedException("full", full: true, new IOException());
        Assert.Equal(507, ProblemTranslation.OfFault(new DefaultHttpContext(), full).Status);
        Assert.Equal(507, ProblemTranslation.OfFault(new DefaultHttpContext(), new InvalidOperationException("x", new IOException("No space left", 28))).Status);
        Assert.Equal(503, ProblemTranslation.OfFault(new DefaultHttpContext(), new StorageFailedException("busy", full: false, new IOException())).Status);
    }

    [Fact]
    public async Task An_address_where_nothing_is_answers_a_problem() =>
        Assert.Equal("notFound", (await shared.Client.FetchAsync("/api/v1/nothing").ProblemAsync(HttpStatusCode.NotFound)).Text("kind"));

    [Fact]
    public async Task What_later_issues_bring_is_not_there_yet()
    {
        var project = await shared.Client.OpenProjectAsync();
        await shared.Client.FetchAsync($"/api/v1/projects/{project}/bundle").ProblemAsync(HttpStatusCode.NotFound);
        await shared.Client.PostJsonAsync($"/api/v1/projects/{project}/jobs", "{}").ProblemAsync(HttpStatusCode.NotFound);
    }

    [Fact]
    public async Task A_method_that_is_not_offered_says_which_are()
    {
        using var answer = await shared.Client.DeleteAsync("/api/v1/projects", TestContext.Current.CancellationToken);
        Assert.Equal(["GET", "POST"], answer.Content.Headers.Allow.Order(StringComparer.Ordinal));
        await Task.FromResult(answer).ProblemAsync(HttpStatusCode.MethodNotAllowed);
    }

    [Fact]
    public async Task A_body_that_is_not_JSON_by_its_type_is_refused() =>
        await shared.Client.PostAsync("/api/v1/projects", new StringContent("name: x"), TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.UnsupportedMediaType);

    [Fact]
    public async Task A_parameter_that_cannot_be_read_is_named()
    {
        var project = await shared.Client.OpenProjectAsync();
        var problem = await shared.Client.FetchAsync($"/api/v1/projects/{project}/ledger?from=abc").ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Equal("The parameter 'from' cannot be 'abc'.", problem.Text("detail"));
        Assert.Equal("from", problem["errors"]![0]!.Text("column"));
    }

    [Fact]
    public async Task A_missing_body_is_told()
    {
        using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/projects") { Content = new StringContent(string.Empty, System.Text.Encoding.UTF8, "application/json") };
        var problem = await shared.Client.SendAsync(request, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.BadRequest);
        Assert.Equal("malformed", problem.Text("kind"));
    }
}
