using System.Net;
using System.Security.Cryptography;
using System.Text;
using Microsoft.AspNetCore.Http;
using Microsoft.AspNetCore.Http.Metadata;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using ModelLab.Web.Http;
using ModelLab.Web.Tests.Hosting;
using Xunit;

namespace ModelLab.Web.Tests.Features.Sources;

public sealed class UploadTests(SharedServer shared)
{
    private static readonly byte[] File = Encoding.UTF8.GetBytes("plot,yield,soil\n1,2.5,clay\n2,3.5,loam\n3,4.25,clay\n");
    private static readonly byte[] FileWithAddresses = Encoding.UTF8.GetBytes("email,yield\nada@example.org,2\nsten@example.org,3\nnoor@example.org,4\n");

    [Fact]
    public async Task A_file_is_taken_in_as_it_is()
    {
        var project = await shared.Client.OpenProjectAsync();
        var source = await shared.Client.UploadAsync(project, File).JsonAsync(HttpStatusCode.Created);
        Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(File)), source.Text("sha256"));
        Assert.Equal(3, source["rows"]!.GetValue<int>());
        Assert.Equal(source.Text("id"), source.Text("sourceId"));
        Assert.Equal(["plot", "yield", "soil"], source["variables"]!.AsArray().Select(v => v!.Text("name")));
        var dataset = await shared.Client.FetchAsync($"/api/v1/projects/{project}/datasets/{source.Text("datasetId")}").JsonAsync(HttpStatusCode.OK);
        Assert.Equal("plots.csv", dataset.Text("fileName"));
        Assert.Equal(3.4166666666666665, dataset["variables"]![1]!["numbers"]!["mean"]!.GetValue<double>(), 1e-12);
    }

    [Fact]
    public async Task Fields_may_come_behind_the_file()
    {
        var project = await shared.Client.OpenProjectAsync();
        var problem = await shared.Client.UploadAsync(project, FileWithAddresses).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("email", problem["errors"]![0]!.Text("column"));
        await shared.Client.UploadAsync(project, FileWithAddresses, null, ("identifiersChecked", "true")).JsonAsync(HttpStatusCode.Created);
    }

    [Theory]
    [InlineData("identifiersChecked", "yes", "identifiersChecked")]
    [InlineData("colour", "red", "colour")]
    [InlineData("delimiter", "ab", "delimiter")]
    [InlineData("delimiter", "1", "delimiter")]
    [InlineData("delimiter", "\"", "delimiter")]
    [InlineData("delimiter", "\0", "delimiter")]
    [InlineData("decimalMark", "tab", "decimalMark")]
    [InlineData("decimalMark", "x", "decimalMark")]
    [InlineData("previousDatasetId", "none", null)]
    public async Task A_field_that_cannot_be_is_refused_and_nothing_is_left(string name, string value, string? column)
    {
        var project = await shared.Client.OpenProjectAsync();
        var problem = await shared.Client.UploadAsync(project, File, null, (name, value), ("reason", "Typed wrongly.")).ProblemAsync(
            column is null ? HttpStatusCode.NotFound : HttpStatusCode.UnprocessableEntity);
        Assert.Equal(column, problem["errors"]?[0]?.Text("column"));
        Assert.Empty((await shared.Client.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK))["datasets"]!.AsArray());
    }

    [Fact]
    public async Task An_upload_without_a_file_is_refused()
    {
        var project = await shared.Client.OpenProjectAsync();
        using var form = new MultipartFormDataContent { { new StringContent("true"), "identifiersChecked" } };
        var problem = await shared.Client.PostAsync($"/api/v1/projects/{project}/sources", form, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("file", problem["errors"]![0]!.Text("column"));
        await shared.Client.PostJsonAsync($"/api/v1/projects/{project}/sources", "{}").ProblemAsync(HttpStatusCode.UnsupportedMediaType);
    }

    [Fact]
    public async Task A_body_that_breaks_off_is_refused()
    {
        var project = await shared.Client.OpenProjectAsync();
        foreach (var text in new[] { "--b\r\nContent-Disposition: form-data; name=\"file\"; filename=\"x.csv\"\r\n\r\na,b\n1,2\n", "--b\r\nContent-Disp", "nothing of the kind" })
        {
            using var body = new ByteArrayContent(Encoding.UTF8.GetBytes(text));
            body.Headers.TryAddWithoutValidation("Content-Type", "multipart/form-data; boundary=b");
            await shared.Client.PostAsync($"/api/v1/projects/{project}/sources", body, TestContext.Current.CancellationToken).ProblemAsync(HttpStatusCode.BadRequest);
        }

        Assert.Empty((await shared.Client.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK))["datasets"]!.AsArray());
    }

    [Fact]
    public async Task A_file_that_is_no_table_is_refused_with_its_row()
    {
        var project = await shared.Client.OpenProjectAsync();
        var problem = await shared.Client.UploadAsync(project, Encoding.UTF8.GetBytes("a,b\n1,2\n3\n")).ProblemAsync(HttpStatusCode.UnprocessableEntity);
        Assert.Equal("unreadableFile", problem.Text("kind"));
        Assert.Equal(2, problem["errors"]![0]!["row"]!.GetValue<int>());
    }

    [Fact]
    public async Task A_file_above_the_limit_is_refused_and_one_at_it_is_not()
    {
        await using var server = await WebServer.StartAsync(s => s.Settings["Uploads:MaximumBytes"] = $"{File.Length}");
        using var client = await server.ClientAsync(await server.PersonAsync("Ada Quill"));
        var project = await client.OpenProjectAsync();
        await client.UploadAsync(project, File).JsonAsync(HttpStatusCode.Created);
        var problem = await client.UploadAsync(project, [.. File, (byte)'\n']).ProblemAsync(HttpStatusCode.RequestEntityTooLarge);
        Assert.Equal("tooLarge", problem.Text("kind"));
        Assert.Single((await client.FetchAsync($"/api/v1/projects/{project}").JsonAsync(HttpStatusCode.OK))["datasets"]!.AsArray());
    }

    [Fact]
    public void The_limit_on_requests_is_raised_for_uploads_alone()
    {
        var raised = shared.Server.Services.GetRequiredService<EndpointDataSource>().Endpoints.Where(e => e.Metadata.GetMetadata<IRequestSizeLimitMetadata>() is not null);
        var endpoint = Assert.IsType<RouteEndpoint>(Assert.Single(raised));
        Assert.Equal("/api/v1/projects/{project}/sources", "/" + endpoint.RoutePattern.RawText!.Trim('/'));
        Assert.InRange(endpoint.Metadata.GetMetadata<IRequestSizeLimitMetadata>()!.MaxRequestBodySize!.Value, 1L << 30, (1L << 30) + (1L << 20));
    }

    [Fact]
    public async Task Parts_are_read_one_after_the_other_without_being_kept()
    {
        var request = new DefaultHttpContext().Request;
        request.ContentType = "multipart/form-data; boundary=b";
        var body = new EndlessPart(50_000_000);
        request.Body = body;
        using var upload = new UploadReader(request, long.MaxValue);
        var part = await upload.NextAsync(TestContext.Current.CancellationToken);
        Assert.Equal("big.csv", part!.FileName);
        Assert.Equal(0, await part.Content.ReadAsync(Array.Empty<byte>(), TestContext.Current.CancellationToken));
        var buffer = new byte[8192];
        _ = await part.Content.ReadAsync(buffer, TestContext.Current.CancellationToken);
        Assert.InRange(body.Given, 1, 1_000_000);
        Assert.Null(await upload.NextAsync(TestContext.Current.CancellationToken));
        Assert.True(body.Given > 50_000_000);
    }

    /// <summary>A multipart body with one large part, made as it is read.</summary>
    private sealed class EndlessPart(long length) : Stream
    {
        private readonly byte[] head = Encoding.UTF8.GetBytes("--b\r\nContent-Disposition: form-data; name=\"file\"; filename=\"big.csv\"\r\n\r\n");
        private readonly byte[] tail = Encoding.UTF8.GetBytes("\r\n--b--\r\n");

        public long Given { get; private set; }

        public override bool CanRead => true;

        public override bool CanSeek => false;

        public override bool CanWrite => false;

        public override long Length => throw new NotSupportedException();

        public override long Position { get => Given; set => throw new NotSupportedException(); }

        public override int Read(byte[] buffer, int offset, int count)
        {
            var written = 0;
            while (written < count && Given < head.Length + length + tail.Length)
            {
                buffer[offset + written++] = Given < head.Length ? head[Given] : Given < head.Length + length ? (byte)'x' : tail[Given - head.Length - length];
                Given++;
            }

            return written;
        }

        public override void Flush()
        {
        }

        public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

        public override void SetLength(long value) => throw new NotSupportedException();

        public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();
    }
}
