using System.Globalization;
using CloudStruct.Benchmarks;

// Speed of the whole job, as a user meets it: files on disk to results on disk, in a process of its own; and of single kernels on one
// file, so that other libraries can be run on the same.
//   dotnet run -c Release --project tests/CloudStruct.Benchmarks -- whole [MILLIONS OF POINTS] [RUNS]
//   dotnet run -c Release --project tests/CloudStruct.Benchmarks -- make FILE.ply [MILLIONS OF POINTS]
//   dotnet run -c Release --project tests/CloudStruct.Benchmarks -- kernels FILE.ply [--threads N] [--runs N] [--json]
//   blocky FILE.ply [MILLIONS], ours FILE.ply FOLDER and compare FILE.ply FOLDER are called by against-libraries/run.sh
double Number(int at, double otherwise) => args.Length > at ? double.Parse(args[at], CultureInfo.InvariantCulture) : otherwise;
int Option(string name, int otherwise) =>
    Array.IndexOf(args, name) is int at and >= 0 && at + 1 < args.Length ? int.Parse(args[at + 1], CultureInfo.InvariantCulture) : otherwise;
switch (args)
{
    case ["whole", ..] when args.Length <= 3:
        return WholeRun.Measure((int)(Number(1, 2) * 1e6), (int)Number(2, 1));
    case ["make", string file, ..] when args.Length <= 3:
        KernelFile.Write(file, (int)(Number(2, 1) * 1e6));
        return 0;
    case ["kernels", string file, ..]:
        new KernelsRun(file, Option("--threads", Environment.ProcessorCount), Option("--runs", 3)).Measure(args.Contains("--json"));
        return 0;
    case ["blocky", string file, ..] when args.Length <= 3:
        BlockyCloud.Write(file, (int)(Number(2, 1) * 1e6));
        return 0;
    case ["ours", string file, string folder]:
        new OursOnBlocky(file, folder).Run();
        return 0;
    case ["compare", string file, string folder]:
        return AgainstLibraries.Compare(file, folder);
    default:
        Console.Error.WriteLine("Name a benchmark: whole [MILLIONS] [RUNS], make FILE.ply [MILLIONS], or kernels FILE.ply [--threads N] [--runs N] [--json]");
        return 2;
}
