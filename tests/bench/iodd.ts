/** A device description of 5 MB against the XML parser that reads it (saxes), which then makes nothing of it. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { SaxesParser } from "saxes";
import { getValue } from "~/domain/core/result";
import { readIodd } from "~/domain/iodd/read-iodd";
import { findProjectRoot } from "~/utils/project-root.server";
import { compare, median, type BenchResult } from "./result";

const SIZE = 5_000_000;
const ROUNDS = 7;

export function measureIodd(): Promise<BenchResult[]> {
  const text = makeLargeIodd();
  const read = time(() => getValue(readIodd(text)).variables.length);
  const parsed = time(() => parseOnly(text));
  return Promise.resolve([compare("read a device description of 5 MB, the XML parser alone as reference", "ms", read, parsed, 3)]);
}

/** The demo's description with as many further parameters as 5 MB hold, each with its texts. */
function makeLargeIodd(): string {
  const source = readFileSync(join(findProjectRoot(), "nodesets/demo/iodd/Quillon-QS-U30-20261102-IODD1.1.xml"), "utf8");
  const variables: string[] = [];
  const texts: string[] = [];
  let size = source.length;
  for (let i = 0; size < SIZE; i++) {
    variables.push(`<Variable id="V_Bench${i}" index="${1_000 + (i % 15_000)}" accessRights="rw" defaultValue="0"><Datatype xsi:type="IntegerT" bitLength="16"><ValueRange lowerValue="-1000" upperValue="1000"/><SingleValue value="1001"><Name textId="TN_B${i}"/></SingleValue></Datatype><Name textId="TN_B${i}"/><Description textId="TD_B${i}"/></Variable>`);
    texts.push(`<Text id="TN_B${i}" value="Parameter ${i} of the bench"/><Text id="TD_B${i}" value="Says nothing, takes room: ${"words ".repeat(8)}"/>`);
    size += (variables.at(-1)?.length ?? 0) + (texts.at(-1)?.length ?? 0);
  }
  return source
    .replace("</VariableCollection>", `${variables.join("")}</VariableCollection>`)
    .replace("</PrimaryLanguage>", `${texts.join("")}</PrimaryLanguage>`);
}

function parseOnly(text: string): number {
  const parser = new SaxesParser({ xmlns: true });
  let elements = 0;
  parser.on("opentag", () => elements++);
  parser.write(text).close();
  return elements;
}

function time(run: () => number): number {
  run();
  return median(
    Array.from({ length: ROUNDS }, () => {
      const start = performance.now();
      if (run() === 0) throw new Error("Nothing was read");
      return performance.now() - start;
    }),
  );
}
