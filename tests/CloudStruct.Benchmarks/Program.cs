using CloudStruct.Benchmarks;

// Speed of the whole job, as a user meets it: files on disk to results on disk, in a process of its own.
//   dotnet run -c Release --project tests/CloudStruct.Benchmarks -- whole [MILLIONS OF POINTS] [RUNS]
if (args.Length is 0 or > 3 || args[0] != "whole")
{
    Console.Error.WriteLine("Name a benchmark: whole [MILLIONS OF POINTS] [RUNS]");
    return 2;
}

double millions = args.Length > 1 ? double.Parse(args[1], System.Globalization.CultureInfo.InvariantCulture) : 2;
int runs = args.Length > 2 ? int.Parse(args[2], System.Globalization.CultureInfo.InvariantCulture) : 1;
return WholeRun.Measure((int)(millions * 1e6), runs);
