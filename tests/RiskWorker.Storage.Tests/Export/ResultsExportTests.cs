using System.Globalization;
using System.Text;
using System.Text.Json;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Export;

namespace RiskWorker.Storage.Tests.Export;

public sealed class ResultsExportTests
{
    private static readonly RunRecord s_record = RunRecords.Of(new(2026, 11, 27), profitFrom: new DateOnly(2026, 11, 26));

    [Fact]
    public void Json_has_the_fields_of_schema_1_with_their_values()
    {
        using var json = JsonDocument.Parse(Bytes(s => ResultsJson.Write(s_record, s)));
        var root = json.RootElement;

        Assert.Equal(1, root.GetProperty("schema").GetInt32());
        Assert.Equal(s_record.Run, root.GetProperty("run").GetString());
        Assert.Equal("2026-11-27", root.GetProperty("asOf").GetString());
        Assert.Equal("degraded", root.GetProperty("status").GetString());
        Assert.Equal(("lognormal", 200_000, ulong.MaxValue), (root.GetProperty("model").GetString(), root.GetProperty("scenarios").GetInt32(), root.GetProperty("seed").GetUInt64()));
        Assert.Equal("sha256:" + s_record.Snapshot, root.GetProperty("snapshot").GetString());
        Assert.Equal("sha256:" + s_record.Figures, root.GetProperty("figures").GetString());
        Assert.Equal("""{"load":0.1,"calibrate":0.2,"simulate":0.3,"report":0.4}""", JsonSerializer.Serialize(root.GetProperty("timings")));
        Assert.Equal("""{"severity":"warning","code":"stale","subject":"factors","message":"ALPHA has not moved for 3 days; =SUM(A1) is a strange name."}""",
            root.GetProperty("findings")[0].GetRawText().Replace("\n", "", StringComparison.Ordinal).Replace("      ", "", StringComparison.Ordinal).Replace("    }", "}", StringComparison.Ordinal).Replace("\": ", "\":", StringComparison.Ordinal));

        var node = root.GetProperty("nodes")[1];
        Assert.Equal(("FX", "ALL", "USD"), (node.GetProperty("book").GetString(), node.GetProperty("parent").GetString(), node.GetProperty("currency").GetString()));
        var measure = node.GetProperty("measures")[0];
        Assert.Equal(("var", "0.99", 1), (measure.GetProperty("measure").GetString(), measure.GetProperty("confidence").GetRawText(), measure.GetProperty("horizonDays").GetInt32()));
        BitEqual.Assert(123456.78901234567 / 7, measure.GetProperty("value").GetDouble());
        Assert.Equal(2, node.GetProperty("measuresRoot").GetArrayLength());
        Assert.False(root.GetProperty("nodes")[0].TryGetProperty("measuresRoot", out _));
        Assert.Equal(JsonValueKind.Null, root.GetProperty("nodes")[0].GetProperty("parent").ValueKind);

        var limits = root.GetProperty("limits");
        Assert.Equal(("firm-var", "within", 0.5), (limits[0].GetProperty("limit").GetString(), limits[0].GetProperty("status").GetString(), limits[0].GetProperty("used").GetDouble()));
        Assert.Equal(JsonValueKind.Null, limits[1].GetProperty("used").ValueKind);
        var backtest = root.GetProperty("backtest")[0];
        Assert.Equal((2, 2, JsonValueKind.Null), (backtest.GetProperty("days").GetInt32(), backtest.GetProperty("exceptions").GetInt32(), backtest.GetProperty("zone").ValueKind));
    }

    [Fact]
    public void Json_has_the_methods_of_the_kinds_held()
    {
        using var json = JsonDocument.Parse(Bytes(s => ResultsJson.Write(s_record, s)));
        var methods = json.RootElement.GetProperty("methods");

        Assert.Equal(2, methods.GetArrayLength());
        Assert.Equal("""{"kind":"option, european","model":"log-normal","method":"closed form","source":"Black and Scholes 1973","caution":"no smile","lines":2}""", JsonSerializer.Serialize(methods[1]));
    }

    [Fact]
    public void Json_begins_with_the_fields_of_the_published_shape_in_its_order()
    {
        using var json = JsonDocument.Parse(Bytes(s => ResultsJson.Write(s_record, s)));

        string[] shape = ["schema", "run", "asOf", "status", "model", "scenarios", "seed", "snapshot", "version", "figures", "nodes", "models", "limits", "findings", "backtest", "timings"];
        Assert.Equal(shape, json.RootElement.EnumerateObject().Select(p => p.Name).Where(shape.Contains));
    }

    [Fact]
    public void Json_of_a_failed_run_has_findings_and_no_figures()
    {
        using var json = JsonDocument.Parse(Bytes(s => ResultsJson.Write(RunRecords.Of(new(2026, 11, 27), status: RunStatus.Failed), s)));

        Assert.Equal("failed", json.RootElement.GetProperty("status").GetString());
        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("scenarios").ValueKind);
        Assert.Equal(0, json.RootElement.GetProperty("nodes").GetArrayLength());
        Assert.Equal("blocking", json.RootElement.GetProperty("findings")[0].GetProperty("severity").GetString());
    }

    [Fact]
    public void Json_number_that_is_undefined_is_null()
    {
        using var json = JsonDocument.Parse(Bytes(s => ResultsJson.Write(RunRecords.Of(new(2026, 11, 27), var: double.NaN), s)));

        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("nodes")[0].GetProperty("measures")[0].GetProperty("value").ValueKind);
    }

    [Fact]
    public void All_exports_are_the_same_bytes_every_time_in_any_culture()
    {
        var json = Bytes(s => ResultsJson.Write(s_record, s));
        var csv = Bytes(s => ResultsCsv.Write(s_record, s));
        var sensitivities = Bytes(s => SensitivitiesCsv.Write(s_record, s));
        var culture = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = new CultureInfo("") { NumberFormat = { NumberDecimalSeparator = ",", NegativeSign = "~" } };
            Assert.Equal(json, Bytes(s => ResultsJson.Write(s_record, s)));
            Assert.Equal(csv, Bytes(s => ResultsCsv.Write(s_record, s)));
            Assert.Equal(sensitivities, Bytes(s => SensitivitiesCsv.Write(s_record, s)));
        }
        finally
        {
            CultureInfo.CurrentCulture = culture;
        }
        Assert.DoesNotContain((byte)'\r', json);
    }

    [Fact]
    public void Csv_is_one_table_with_a_row_for_each_measure_and_each_limit()
    {
        var lines = Lines(s_record);

        Assert.All(lines, line => Assert.Equal(lines[0].Count(c => c == ','), line.Count(c => c == ',')));
        Assert.Equal(1 + 2 + 4 + 2, lines.Length);
        Assert.StartsWith($"{s_record.Run},2026-11-27,node,ALL,,EUR,-0,var,0.99,1,123456.78901234567,", lines[1], StringComparison.Ordinal);
        Assert.Contains(",node,FX,ALL,EUR,5E-324,es,0.975,10,", lines[6], StringComparison.Ordinal);
        Assert.EndsWith(",fx-es,9000,nav,,,,,inconclusive,,lognormal,,", lines[8], StringComparison.Ordinal);
    }

    [Fact]
    public void Csv_has_a_row_of_its_own_for_each_measure_of_another_model_and_the_sample_of_a_history()
    {
        var (node, measure) = (s_record.Results.Nodes[1], s_record.Results.Nodes[1].Measures[0]);
        var history = measure with { Value = 2, Low = 2, High = 2, Level = 0.95, Sample = new(1.5, null) };
        var lines = Lines(s_record with
        {
            Results = s_record.Results with
            {
                Models =
                [
                    new() { Name = "broken", Kind = ModelKind.Historical },
                    new() { Name = "=history", Kind = ModelKind.Historical, Nodes = [new(node.Book, node.Currency, [history])] },
                ],
            },
        });

        Assert.Equal(lines[0].Split(',').Length, lines[^1].Split(',').Length);
        Assert.EndsWith(",status,status_since,model,sample_low,sample_high", lines[0], StringComparison.Ordinal);
        Assert.Equal(Lines(s_record), lines[..^1]);
        Assert.StartsWith($"{s_record.Run},2026-11-27,model,FX,ALL,USD,", lines[^1], StringComparison.Ordinal);
        Assert.EndsWith(",var,0.99,1,2,2,2,0.95,,,,,,,,,,'=history,1.5,", lines[^1], StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("=cmd|' /C calc'!A0", "'=cmd|' /C calc'!A0")]
    [InlineData("+1", "'+1")]
    [InlineData("-1", "'-1")]
    [InlineData("@SUM(A1)", "'@SUM(A1)")]
    [InlineData("\tA", "'\tA")]
    [InlineData("\rA", "\"'\rA\"")]
    [InlineData("=1,\"2\"", "\"'=1,\"\"2\"\"\"")]
    [InlineData("A=1", "A=1")]
    public void Csv_text_cell_that_a_spreadsheet_would_take_for_a_formula_is_neutralised(string book, string cell)
    {
        var record = s_record with { Results = s_record.Results with { Nodes = [s_record.Results.Nodes[0] with { Book = book }], Limits = [] } };

        Assert.Contains($",node,{cell},,EUR,-0,var,", Encoding.UTF8.GetString(Bytes(s => ResultsCsv.Write(record, s))), StringComparison.Ordinal);
    }

    [Fact]
    public void Json_has_a_line_for_each_sensitivity()
    {
        var text = Encoding.UTF8.GetString(Bytes(s => ResultsJson.Write(s_record, s)));

        string[] lines =
        [
            "  \"sensitivities\": [",
            """    {"book":"ALL","factor":"ALPHA","class":"equity","curve":null,"tenorYears":null,"measure":"delta","value":0.3333333333333333,"gamma":-0},""",
            """    {"book":"ALL","factor":"=EUR.3M","class":"rate","curve":"-EUR","tenorYears":0.25,"measure":"dv01","value":-1E-300,"gamma":null},""",
            """    {"book":"FX","factor":"ALPHA-VOL","class":"vol","curve":null,"tenorYears":null,"measure":"vega","value":null,"gamma":null},""",
            """    {"book":"FX","factor":"BANK","class":"credit","curve":"BANKS, all","tenorYears":5,"measure":"cs01","value":12,"gamma":null}""",
            "  ],",
        ];
        Assert.Contains($"\n{string.Join('\n', lines)}\n", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Json_of_a_run_without_sensitivities_has_an_empty_list()
    {
        using var json = JsonDocument.Parse(Bytes(s => ResultsJson.Write(s_record with { Results = s_record.Results with { Sensitivities = [] } }, s)));

        Assert.Equal("[]", json.RootElement.GetProperty("sensitivities").GetRawText());
    }

    [Fact]
    public void Sensitivities_csv_has_a_row_for_each_in_the_currency_of_its_book_and_no_formula()
    {
        var run = $"{s_record.Run},2026-11-27,";

        Assert.Equal(
            [
                "run,as_of,book,currency,factor,class,curve,tenor_years,measure,value,gamma",
                run + "ALL,EUR,ALPHA,equity,,,delta,0.3333333333333333,-0",
                run + "ALL,EUR,'=EUR.3M,rate,'-EUR,0.25,dv01,-1E-300,",
                run + "FX,USD,ALPHA-VOL,vol,,,vega,,",
                run + "FX,USD,BANK,credit,\"BANKS, all\",5,cs01,12,",
                "",
            ],
            Encoding.UTF8.GetString(Bytes(s => SensitivitiesCsv.Write(s_record, s))).Split("\r\n"));
    }

    private static string[] Lines(RunRecord record) => Encoding.UTF8.GetString(Bytes(s => ResultsCsv.Write(record, s))).TrimEnd().Split("\r\n");

    private static byte[] Bytes(Action<Stream> write)
    {
        using var stream = new MemoryStream();
        write(stream);
        return stream.ToArray();
    }
}
