namespace CloudStruct.Products.Plots;

/// <summary>A plot as it was written, kept for the report.</summary>
/// <param name="Name">File stem.</param>
/// <param name="Title">Title.</param>
/// <param name="Words">What it shows.</param>
/// <param name="Svg">Empty for a view.</param>
/// <param name="Png">Picture; of a view a smaller one than the file.</param>
internal sealed record DrawnPlot(string Name, string Title, string Words, byte[] Svg, byte[] Png);
