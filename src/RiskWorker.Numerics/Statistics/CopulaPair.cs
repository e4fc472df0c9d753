namespace RiskWorker.Numerics.Statistics;

/// <summary>Two different factors and their correlation, strictly between -1 and 1.</summary>
/// <param name="First">Row of the one.</param>
/// <param name="Second">Row of the other.</param>
/// <param name="Correlation">Of the two.</param>
public readonly record struct CopulaPair(int First, int Second, double Correlation);
