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
        foreach (var group in plan.Groups) hash.Add(group);
        foreach (var flow in plan.Flows) hash.Add(flow);
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

    private void Add(UnderlyingGroup group)
    {
        Add(group.Key.IsCross ? 1 : 0).Add(group.Key.Factor).Add(group.Key.Quote).Add(group.Spot).Add(group.Linear.Count).Add(group.Options.Count);
        foreach (var holding in group.Linear) Add(holding.Cell).Add(holding.Units);
        foreach (var batch in group.Options)
        {
            Add(batch.VolatilityFactor).Add(batch.Items.Length);
            foreach (var item in batch.Items)
            {
                Add(item.Cell).Add(item.Quantity).Add(item.BaseValue);
            }
            foreach (var terms in batch.Terms.SelectMany(t => t)) Add(terms);
        }
        foreach (var batch in group.Formulas) Add(batch);
    }

    private void Add(FormulaBatch batch)
    {
        Form(batch.Market.Discount).Form(batch.Market.Carry).Add(batch.Market.Variance.Constant).Add(batch.Market.Variance.Terms.Count);
        foreach (var (factor, weight) in batch.Market.Variance.Terms) Add(factor).Add(weight);
        Add(batch.Items.Length);
        foreach (var item in batch.Items)
        {
            Add(item.Cell).Add(item.Quantity).Add(item.BaseValue);
            foreach (var number in item.Formula.Numbers()) Add(number);
        }
    }

    private void Add(FlowBatch flow)
    {
        Form(flow.Exponent).Add(flow.Factor).Add(flow.Amounts.Count);
        foreach (var amount in flow.Amounts) Add(amount.Cell).Add(amount.Units);
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
