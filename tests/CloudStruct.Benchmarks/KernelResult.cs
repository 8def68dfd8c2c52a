namespace CloudStruct.Benchmarks;

/// <summary>One kernel on one file.</summary>
/// <param name="Kernel">Its name.</param>
/// <param name="Points">Points it worked on.</param>
/// <param name="Seconds">Shortest wall time of the runs.</param>
/// <param name="Median">Median wall time of the runs [s].</param>
/// <param name="Quality">Figures by name; empty when the file holds no truth.</param>
internal sealed record KernelResult(string Kernel, long Points, double Seconds, double Median, Dictionary<string, double> Quality);
