using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Full revaluation of single scenarios of single nodes: whatever the surfaces place near a tail or in it. Scenarios of a node
/// are gathered with the moves of the factors that it needs, and revalued side by side, its own positions only.
/// </summary>
internal sealed class ExactPass
{
    private const int MostLanes = 64;
    private const int Lanes = 8; // a full vector of lanes: odd ones would be valued one by one
    private const long MostNumbers = 8_000_000; // 64 MB a thread, however many nodes and factors a plan has
    private readonly RevaluationPlan _plan;
    private readonly PlanSlice[] _slices;
    private readonly int[][][] _rows;
    private readonly Queue[][] _queues;
    private readonly MarketLanes _market = new(MostLanes);
    private readonly int _capacity;
    private readonly LaneTable _cells = new();
    private readonly NodeProfits _nodes = new();
    private readonly double[] _losses = new double[MostLanes];

    /// <summary>Makes room for the nodes of <paramref name="plan"/>, whose slices are <paramref name="slices"/>.</summary>
    public ExactPass(RevaluationPlan plan, PlanSlice[] slices)
    {
        (_plan, _slices) = (plan, slices);
        var numbers = Math.Max(1, slices.Sum(s => (long)s.Factors.Length) * plan.Horizons.Count);
        _capacity = (int)Math.Clamp(MostNumbers / numbers / Lanes * Lanes, Lanes, MostLanes);
        _market.Serve(plan);
        _cells.Shape(plan.Cells.Count, MostLanes);
        _nodes.Serve(plan, MostLanes);
        _queues = [.. plan.Horizons.Select(_ => slices.Select(slice => new Queue(slice.Factors.Length, _capacity)).ToArray())];
        _rows = [.. plan.Horizons.Select((_, h) => slices.Select(s => RowsOf(plan, s.Node, h)).ToArray())];
    }

    /// <summary>Scenarios revalued so far, each counted once for every node and horizon.</summary>
    public long Revalued { get; private set; }

    /// <summary>The series of <paramref name="node"/> at <paramref name="horizon"/>.</summary>
    public int[] RowsOf(int node, int horizon) => _rows[horizon][node];

    /// <summary>Forgets what an evaluation that was stopped half-way has left.</summary>
    public void Begin()
    {
        foreach (var queues in _queues)
        {
            foreach (var queue in queues) queue.Count = 0;
        }
    }

    /// <summary>Puts a scenario of a node aside.</summary>
    /// <param name="node">The node.</param>
    /// <param name="horizon">The horizon.</param>
    /// <param name="moves">Moves of the tile that holds the scenario, a row a moving factor of the plan.</param>
    /// <param name="stride">Distance of those rows.</param>
    /// <param name="lane">Its lane there.</param>
    /// <param name="losses">The block's losses, where those by surface will be replaced.</param>
    /// <param name="place">Its place in a row of <paramref name="losses"/>.</param>
    public void Add(int node, int horizon, double[] moves, int stride, int lane, double[] losses, int place)
    {
        var (queue, slice) = (_queues[horizon][node], _slices[node]);
        for (var row = 0; row < slice.Factors.Length; row++)
            queue.Moves[(row * _capacity) + queue.Count] = moves[(_plan.Moves.RowOf[slice.Factors[row]] * stride) + lane];
        queue.Places[queue.Count++] = place;
        if (queue.Count == _capacity) Revalue(node, horizon, losses);
    }

    /// <summary>Revalues everything that has been put aside.</summary>
    public void Finish(double[] losses)
    {
        for (var horizon = 0; horizon < _queues.Length; horizon++)
        {
            for (var node = 0; node < _slices.Length; node++)
            {
                if (_queues[horizon][node].Count > 0) Revalue(node, horizon, losses);
            }
        }
    }

    private static int[] RowsOf(RevaluationPlan plan, int node, int horizon) =>
        [.. Enumerable.Range(0, plan.Rows.Count).Where(r => plan.Rows[r].Node == node && plan.Rows[r].Horizon == horizon)];

    private void Revalue(int node, int horizon, double[] losses)
    {
        var (queue, slice) = (_queues[horizon][node], _slices[node]);
        var width = (queue.Count + Lanes - 1) / Lanes * Lanes;
        for (var row = 0; row < slice.Factors.Length; row++)
        {
            var lanes = queue.Moves.AsSpan(row * _capacity, width);
            lanes[queue.Count..].Fill(lanes[queue.Count - 1]);
        }
        _market.Take(queue.Moves, slice.RowOf, _capacity, width, _plan.Law.GivesShocks);
        _market.MoveTo(horizon, slice);
        _cells.Width = width;
        _cells.Clear(slice.Cells.From, slice.Cells.To);
        HoldingProfits.Add(slice, _market, _cells);
        _nodes.Roll(slice, _market, _cells);
        foreach (var row in _rows[horizon][node])
        {
            _nodes.Losses(_plan.Rows[row], _market, _losses.AsSpan(0, width));
            for (var i = 0; i < queue.Count; i++) losses[(row * Blocks.Size) + queue.Places[i]] = _losses[i];
        }
        Revalued += queue.Count;
        queue.Count = 0;
    }

    private sealed class Queue(int factors, int capacity)
    {
        public double[] Moves { get; } = new double[factors * capacity];

        public int[] Places { get; } = new int[capacity];

        public int Count { get; set; }
    }
}
