using RiskWorker.Domain.Books;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>Reads the text of <see cref="SnapshotLeaves"/>, each kind of row field by field as it is written there.</summary>
internal static class LeafText
{
    public static Book Book(CanonicalRow row) => new(row.Name(), row.Text(), row.Name(), row.Name());

    public static Factor Factor(CanonicalRow row) => new(
        row.Name(), row.Choice<FactorClass>(), row.Choice<ShockKind>(), row.Text(), row.Text(), row.Number(), row.Text(), row.Value<int>(), row.Text(), row.Number());

    public static Limit Limit(CanonicalRow row) => new(
        row.Name(), row.Name(), Measure(row), row.Amount(), row.Choice<LimitBasis>(), row.Text(), row.Amount(), row.Date(), row.Date(), row.Text(), row.Text());

    public static MeasureSpec Measure(CanonicalRow row) => new(row.Choice<MeasureKind>(), new(row.Whole<decimal>()), new(row.Whole<int>()));

    public static Holiday Holiday(CanonicalRow row) => new(row.Name(), row.Date()!.Value);

    public static Finding Warning(CanonicalRow row) => new(FindingSeverity.Warning, row.Name(), row.Name(), row.Name());

    public static CovarianceEntry Covariance(CanonicalRow row) => new(row.Name(), row.Name(), row.Amount());

    public static Observation Observation(DateOnly date, CanonicalRow row) => new(date, row.Name(), row.Amount());

    public static Adjustment Adjustment(DateOnly date, CanonicalRow row) => new(row.Name(), date, row.Amount(), row.Text());

    public static ProfitAndLoss Profit(DateOnly date, CanonicalRow row) => new(date, row.Name(), row.Number(), row.Number());

    public static Position Position(CanonicalRow row) => new(row.Name(), row.Name(), row.Amount(), row.Text(), row.Number());
}
