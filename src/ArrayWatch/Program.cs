using ArrayWatch.Commands;

return await CommandLine.RunAsync(args);
