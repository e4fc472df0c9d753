using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class BulkTests
{
    [Fact]
    public void Rows_written_come_back_as_they_are_null_and_empty_apart_and_repeated_values_too()
    {
        string?[][] rows =
        [
            ["a", "1.5", null], ["a", "1.5", ""], ["b", "-0", "é\U0001F600"], [new string('n', 300), "1e300", null], ["b", "5e-324", null], ["", "2", "x"],
        ];
        using var fixture = new FeedFixture(withFiles: false);
        using var store = fixture.Open();
        var read = store.Write(connection =>
        {
            connection.Run("CREATE TEMP TABLE t (n INTEGER PRIMARY KEY, name TEXT, number TEXT, text TEXT)");
            using (var insert = new BulkStatement(connection, "INSERT INTO t VALUES (?1, ?2, ?3, ?4)"))
            {
                for (var i = 0; i < rows.Length; i++) Assert.Equal(1, insert.Set(0, i).Set(1, rows[i][0]).Set(2, rows[i][1]).Set(3, rows[i][2]).Run());
            }
            var back = new List<(string, double?, string?)>();
            using var query = new BulkQuery(connection, "SELECT name, number, text FROM t WHERE n >= ?1 ORDER BY n", "0");
            while (query.Next()) back.Add((query.Name(0), query.Number(1), query.Text(2)));
            return back;
        });

        Assert.Equal(rows.Select(r => (r[0]!, (double?)double.Parse(r[1]!, System.Globalization.CultureInfo.InvariantCulture), r[2])), read);
        Assert.True(double.IsNegative(read[2].Item2!.Value));
        Assert.Same(read[0].Item1, read[1].Item1);
    }

    [Fact]
    public void Number_of_null_is_null()
    {
        using var fixture = new FeedFixture(withFiles: false);
        using var store = fixture.Open();

        Assert.Null(store.Use(connection =>
        {
            using var query = new BulkQuery(connection, "SELECT NULL");
            Assert.True(query.Next());
            return query.Number(0);
        }));
    }
}
