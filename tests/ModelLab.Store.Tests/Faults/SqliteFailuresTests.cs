using Microsoft.Data.Sqlite;
using ModelLab.Store.Sqlite.Connections;

namespace ModelLab.Store.Tests.Faults;

// Result codes: SQLite's documentation, "Result and Error Codes"; from memory.
public sealed class SqliteFailuresTests
{
    [Theory]
    [InlineData(5, "Another program holds the database.", false)]
    [InlineData(8, "The data folder may not be written to.", false)]
    [InlineData(10, "The disk that holds the data could not be written or read.", false)]
    [InlineData(11, "The database file is damaged.", false)]
    [InlineData(13, "The disk that holds the data is full.", true)]
    public void A_failure_of_the_database_is_said_in_plain_words(int code, string beginning, bool full)
    {
        var explained = SqliteFailures.Explain(new InvalidOperationException("outside", new SqliteException("inside", code)))!;
        Assert.StartsWith(beginning, explained.Message, StringComparison.Ordinal);
        Assert.Equal(full, explained.Full);
    }

    [Fact]
    public void Other_failures_stay_as_they_are()
    {
        Assert.Null(SqliteFailures.Explain(new SqliteException("constraint", 19)));
        Assert.Null(SqliteFailures.Explain(new InvalidOperationException()));
    }
}
