/** The command line for pipelines: `check`, `roundtrip`, `help`. No database; exit codes 0, 1, 2. */
import { check } from "./check";
import { helpText } from "./help-text";
import { parseCommandLine, UsageError } from "./parse-command-line";
import { roundtrip } from "./roundtrip";

async function run(args: readonly string[]): Promise<number> {
  const command = parseCommandLine(args);
  switch (command.name) {
    case "help":
      process.stdout.write(helpText);
      return 0;
    case "check":
      return check(command);
    case "roundtrip":
      return roundtrip(command);
  }
}

run(process.argv.slice(2)).then(
  (code) => {
    process.exitCode = code;
  },
  (error: unknown) => {
    if (error instanceof UsageError) process.stderr.write(`${error.message}\n\n${helpText}`);
    else process.stderr.write(`ferrule: ${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 2;
  },
);
