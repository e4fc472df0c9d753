using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>SHA-256 over every number and name of a plan, in the plan's own order, numbers as little-endian bits.</summary>
internal sealed class PlanHash : IDisposable
{
    private readonly IncrementalHash _hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
    private readonly byte[] _buffer = new byte[1 << 13]; // a call a number would cost more than the hashing
    private int _pending;

    /// <summary>The hash as 64 lower-case hex digits; the plan's own hash field is left out.</summary>
    public static string Of(RevaluationPlan plan)
    {
        using var hash = new PlanHash();
        hash.Add((long)plan.Seed);
        hash.Add(plan.Moves);
        foreach (var number in plan.Law.Numbers()) hash.Add(number); // of the log-normal law there is none
        foreach (var horizon in plan.Horizons) hash.Add(horizon.Days);
        foreach (var currency in plan.Currencies) hash.Text(currency.Code).Add(currency.Factor).Add(currency.Rate);
        foreach (var group in plan.Groups) hash.Add(group, plan.Horizons.Count);
        foreach (var flow in plan.Flows) hash.Add(flow);
        foreach (var aged in plan.Aged) hash.Add(aged); // without ageing there is none
        foreach (var cell in plan.Cells) hash.Add(cell.Node).Add(cell.Currency).Add(cell.Value);
        foreach (var node in plan.Nodes) hash.Text(node.Book).Add(node.Parent).Add(node.Currency).Add(node.ValueRoot);
        foreach (var row in plan.Rows) hash.Add(row.Node).Add(row.Horizon).Add(row.InOwnCurrency ? 1 : 0);
        hash.Flush();
        return Convert.ToHexStringLower(hash._hash.GetHashAndReset());
    }

    public void Dispose() => _hash.Dispose();

    private void Flush()
    {
        _hash.AppendData(_buffer, 0, _pending);
        _pending = 0;
    }

    private void Add(FactorMoves moves)
    {
        Add(moves.Rank).Add(moves.Rows);
        foreach (var value in moves.Lower) Add(value);
        foreach (var row in moves.RowOf) Add(row);
        foreach (var law in moves.Factors) Add(law.Level).Add(law.Deviation).Add(law.Drift).Add(law.IsLognormal ? 1 : 0);
    }

    // Terms of plain options count once for every horizon, as they have since the first plans, which may be computed again.
    private void Add(UnderlyingGroup group, int horizons)
    {
        Key(group.Key).Add(group.Spot).Add(group.Linear.Count).Add(group.Options.Count);
        foreach (var holding in group.Linear) Add(holding.Cell).Add(holding.Units);
        foreach (var batch in group.Options)
        {
            Add(batch.VolatilityFactor).Add(batch.Items.Length);
            foreach (var item in batch.Items)
            {
                Add(item.Cell).Add(item.Quantity).Add(item.BaseValue);
            }
            for (var horizon = 0; horizon < horizons; horizon++)
            {
                foreach (var terms in batch.Terms) Add(terms);
            }
        }
        foreach (var batch in group.Formulas) Add(batch);
    }

    private void Add(AgedHoldings aged)
    {
        Add(aged.Certain.Count).Add(aged.Paths.Count).Add(aged.Fixings).Add(aged.Closes.Count);
        foreach (var certain in aged.Certain) Add(certain.Cell).Add(certain.Units);
        foreach (var path in aged.Paths) Add(path.State).Add(double.IsNaN(path.Return) ? 1 : 0);
        foreach (var close in aged.Closes) Add(close);
    }

    private void Add(DatedHoldings close)
    {
        Add(close.Day).Add(close.Groups.Count).Add(close.Flows.Count).Add(close.Looks.Count).Add(close.Paths.Count).Add(close.Fixings.Count).Add(close.Fixed.Count);
        foreach (var group in close.Groups) Add(group, 1);
        foreach (var flow in close.Flows) Add(flow);
        foreach (var look in close.Looks) Add(look.Path).Key(look.Underlying).Add((int)look.Kind).Add(look.Barrier).Add(look.Spot).Add(look.IsContinuous ? 1 : 0);
        foreach (var batch in close.Paths)
        {
            Key(batch.Underlying).Market(batch.Market).Add(batch.Items.Length);
            foreach (var item in batch.Items) Add(item.Cell).Add(item.Quantity).Add(item.BaseValue).Add(item.Path).Numbers(item.Formula.Numbers());
        }
        foreach (var fixing in close.Fixings) Add(fixing.Fixing).Form(fixing.Exponent);
        foreach (var flow in close.Fixed)
        {
            Add(flow.Fixing).Form(flow.Discount).Add(flow.Factor).Add(flow.Amounts.Count);
            foreach (var amount in flow.Amounts) Add(amount.Cell).Add(amount.Units);
        }
    }

    private void Add(FormulaBatch batch)
    {
        Market(batch.Market);
        Add(batch.Items.Length);
        foreach (var item in batch.Items)
        {
            Add(item.Cell).Add(item.Quantity).Add(item.BaseValue);
            Numbers(item.Formula.Numbers());
        }
    }

    private void Add(FlowBatch flow)
    {
        Form(flow.Exponent).Add(flow.Factor).Add(flow.Amounts.Count);
        foreach (var amount in flow.Amounts) Add(amount.Cell).Add(amount.Units);
    }

    private PlanHash Key(in Pricing.UnderlyingKey key) => Add(key.IsCross ? 1 : 0).Add(key.Factor).Add(key.Quote);

    private PlanHash Market(Pricing.MarketTerms market)
    {
        Form(market.Discount).Form(market.Carry).Add(market.Variance.Constant).Add(market.Variance.Terms.Count);
        foreach (var (factor, weight) in market.Variance.Terms) Add(factor).Add(weight);
        return this;
    }

    private PlanHash Numbers(IEnumerable<double> numbers)
    {
        foreach (var number in numbers) Add(number);
        return this;
    }

    private PlanHash Form(Pricing.Curves.LinearForm form)
    {
        Add(form.Constant).Add(form.Factors.Length);
        for (var i = 0; i < form.Factors.Length; i++) Add(form.Factors[i]).Add(form.Coefficients[i]);
        return this;
    }

    private void Add(in EuropeanOptionTerms terms)
    {
        Span<double> numbers = stackalloc double[EuropeanOptionTerms.NumberCount];
        terms.CopyTo(numbers);
        foreach (var number in numbers) Add(number);
    }

    private PlanHash Text(string text)
    {
        var bytes = Encoding.UTF8.GetBytes(text);
        Add(bytes.Length);
        Flush();
        _hash.AppendData(bytes);
        return this;
    }

    private PlanHash Add(double value) => Add(BitConverter.DoubleToInt64Bits(value));

    private PlanHash Add(long value)
    {
        if (_pending == _buffer.Length) Flush();
        BinaryPrimitives.WriteInt64LittleEndian(_buffer.AsSpan(_pending), value);
        _pending += sizeof(long);
        return this;
    }
}
