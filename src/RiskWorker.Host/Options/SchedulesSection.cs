using System.Globalization;
using System.Text.RegularExpressions;
using Quartz;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>schedules</c>: when the service runs what.</summary>
public static partial class SchedulesSection
{
    private const string CronForm = "a cron expression 'second minute hour day-of-month month day-of-week [year]', such as '0 30 6 ? * MON-FRI'";
    private const string ZoneForm = "an IANA time zone known on this machine, such as 'Europe/Oslo'";
    private const string DeadlineForm = "a time of day as HH:mm";

    private static readonly Dictionary<string, int> s_verbs = new(StringComparer.Ordinal) { ["measure"] = 0 };

    /// <summary>Reads the schedules by name; faulty ones are left out.</summary>
    public static IReadOnlyList<ScheduleOptions> Read(SettingsValue? value) =>
        [.. (value?.Named() ?? []).Select(s => Schedule(s.Name, s.Value)).OfType<ScheduleOptions>().OrderBy(s => s.Name, StringComparer.Ordinal)];

    private static ScheduleOptions? Schedule(string name, SettingsValue value)
    {
        if (value.Section("cron", "timeZone", "calendar", "verb", "deadline") is not { } section) return null;
        var cron = Cron(section.Required("cron", CronForm));
        var zone = Zone(section.Required("timeZone", ZoneForm));
        var calendar = section["calendar"]?.Text("the name of a calendar of holidays.csv");
        section["verb"]?.Choice(s_verbs, "backtest", "tail", "load");
        var deadline = Deadline(section["deadline"]);
        return cron is null || zone is null ? null : new(name, cron, zone, calendar, "measure", deadline);
    }

    private static string? Cron(SettingsValue? value)
    {
        if (value?.Text(CronForm) is not { } text) return null;
        try
        {
            _ = CronExpression.Parse(text);
            if (!text.Split(' ', '\t').Where(f => f.Length > 0).Take(6).Any(f => BeyondAnyField().IsMatch(f))) return text;
            value.Value.Fault($"{CronForm} (no field but the year goes beyond 59)");
            return null;
        }
        catch (FormatException refusal)
        {
            value.Value.Fault($"{CronForm} ({Printable.Of(refusal.Message, 200)})");
            return null;
        }
    }

    /// <summary>The scheduler's parser takes 98 and 99, its own marks for '?' and '*', as numbers: a minute of 99 would fire every minute.</summary>
    [GeneratedRegex(@"(?<!\d)0*([6-9]\d|[1-9]\d{2,})(?!\d)")]
    private static partial Regex BeyondAnyField();

    private static TimeZoneInfo? Zone(SettingsValue? value)
    {
        if (value?.Text(ZoneForm) is not { } id) return null;
        if (TimeZoneInfo.TryFindSystemTimeZoneById(id, out var zone) && zone.HasIanaId) return zone;
        value.Value.Fault(ZoneForm);
        return null;
    }

    private static TimeOnly? Deadline(SettingsValue? value)
    {
        if (value?.Text(DeadlineForm) is not { } text) return null;
        if (TimeOnly.TryParseExact(text, "HH:mm", CultureInfo.InvariantCulture, DateTimeStyles.None, out var time)) return time;
        value.Value.Fault(DeadlineForm);
        return null;
    }
}
