/** The command line for pipelines. No database; the exit codes are told by `help`. */
import { asBuilt } from "./as-built-command";
import { check } from "./check";
import { compare } from "./compare-command";
import { decode, device } from "./device-command";
import { helpText } from "./help-text";
import { map } from "./map-command";
import { parseCommandLine, UsageError } from "./parse-command-line";
import { roundtrip } from "./roundtrip";
import { rules } from "./rules-command";
import { verify } from "./verify-command";

async function run(args: readonly string[]): Promise<number> {
  const command = parseCommandLine(args);
  switch (command.name) {
    case "help":
      process.stdout.write(helpText);
      return 0;
    case "check":
      return check(command);
    case "rules":
      return rules(command);
    case "roundtrip":
      return roundtrip(command);
    case "compare":
      return compare(command);
    case "verify":
      return verify(command);
    case "device":
      return device(command);
    case "decode":
      return decode(command);
    case "map":
      return map(command);
    case "as-built":
      return asBuilt(command);
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
