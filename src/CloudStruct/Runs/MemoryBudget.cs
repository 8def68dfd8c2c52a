using static System.FormattableString;

namespace CloudStruct.Runs;

/// <summary>What a run will need, against what it may take; settled before work starts.</summary>
internal static class MemoryBudget
{
    private const double Gib = 1L << 30;

    // Measured over whole runs of the demonstration survey at 1 and 2 million points: see docs/performance.md.
    private const double BaseGib = 0.30;
    private const double BytesPerPoint = 560;

    /// <summary>Sets the collector's limit and gives the budget and the estimate [GiB].</summary>
    /// <param name="wantedGib">From the command line; null: 60 % of the machine.</param>
    /// <param name="points">Declared input points.</param>
    /// <exception cref="MachineException">The budget is too small; the figure needed is named.</exception>
    public static (double BudgetGib, double EstimateGib) Settle(double? wantedGib, long points)
    {
        double machineGib = GC.GetGCMemoryInfo().TotalAvailableMemoryBytes / Gib;
        double budget = wantedGib ?? (0.6 * machineGib);
        double estimate = BaseGib + (BytesPerPoint * points / Gib);
        if (estimate > budget)
        {
            throw new MachineException(Invariant(
                $"memory: a survey of {points} points needs about {estimate:0.0} GiB, and the budget is {budget:0.0} GiB ({(wantedGib is null ? "60 % of this machine" : "--memory-gib")}). ") +
                (wantedGib is null ? Invariant($"Give --memory-gib {Math.Ceiling(estimate)} if the machine has it, or set thin.spacing_m larger and measure fewer tiles at a time.") : Invariant($"Give --memory-gib {Math.Ceiling(estimate * 10) / 10} or more.")));
        }

        if (wantedGib is not null)
        {
            AppContext.SetData("GCHeapHardLimit", (ulong)(budget * Gib));
            GC.RefreshMemoryLimit();
        }

        return (budget, estimate);
    }
}
