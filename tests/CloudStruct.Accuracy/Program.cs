using CloudStruct.Accuracy;

// The deep studies: outcrops of known truth through the stages, scored. docs/accuracy.md names the commands.
//   dotnet run -c Release --project tests/CloudStruct.Accuracy -- STUDY [--plan NAME] [--seeds FROM-TO] [--points N]
if (args.Length == 0 || !Studies.All.TryGetValue(args[0], out IStudy? study))
{
    Console.Error.WriteLine($"Name a study: {string.Join(", ", Studies.All.Keys)}");
    return 2;
}

study.Run(StudyOptions.Parse(args.AsSpan(1)));
return 0;
