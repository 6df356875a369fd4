using Microsoft.AspNetCore.Http;
using ModelLab.Web.Http;
using Xunit;

namespace ModelLab.Web.Tests.Http;

/// <summary>Expected choices after the examples of RFC 9110, section 12.5.1.</summary>
public sealed class MediaTypesTests
{
    [Theory]
    [InlineData(null, "application/json")]
    [InlineData("*/*", "application/json")]
    [InlineData("text/csv", "text/csv")]
    [InlineData("text/*;q=0.9, */*;q=0.5", "text/csv")]
    [InlineData("text/csv;q=0.4, application/json;q=0.5", "application/json")]
    [InlineData("*/*, application/json;q=0.1", "text/csv")]
    [InlineData("*/*, text/csv;q=0, application/json;q=0", null)]
    [InlineData("image/png", null)]
    public void The_most_specific_range_decides(string? accept, string? chosen)
    {
        var context = new DefaultHttpContext();
        if (accept is not null)
        {
            context.Request.Headers.Accept = accept;
        }

        Assert.Equal(chosen, MediaTypes.Best(context.Request, "application/json", "text/csv"));
    }
}
