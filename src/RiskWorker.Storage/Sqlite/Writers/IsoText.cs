using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>Dates as text; rows of one date mostly follow each other, so the last text is kept.</summary>
internal sealed class IsoText
{
    private DateOnly _date;
    private string _text = Iso.Of(default(DateOnly));

    public string Of(DateOnly date)
    {
        if (date != _date) (_date, _text) = (date, Iso.Of(date));
        return _text;
    }
}
