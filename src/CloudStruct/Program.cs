using CloudStruct.Commands;

return new CommandLine(Console.Out, Console.Error).Run(args);
