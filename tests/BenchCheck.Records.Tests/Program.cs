using BenchCheck.Records.Tests;
using Xunit.Runner.InProc.SystemConsole;

// The tests of several writers start this program as one writer of many.
if (args is [Writer.Verb, var place, var name, var count]) return Writer.Run(place, name, int.Parse(count, System.Globalization.CultureInfo.InvariantCulture));
return await ConsoleRunner.Run(args).ConfigureAwait(false);
