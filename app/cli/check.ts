/** `check`: the findings of one file, as text, JSON or SARIF. */
import { createHash } from "node:crypto";
import { readFile } from "node:fs/promises";
import type { ZodType } from "zod";
import { AddressSpace, buildLayer } from "../domain/address-space/address-space";
import { getOwnNamespace } from "../domain/address-space/model-header";
import { conventionsSchema, makeConventionRules, type Conventions } from "../domain/checks/conventions";
import { RULES } from "../domain/checks/registry";
import { formatReport } from "../domain/checks/format-report";
import type { Rule } from "../domain/checks/rule";
import { runChecks } from "../domain/checks/run-checks";
import { toSchemaFindings } from "../domain/checks/schema-findings";
import { isAtLeast, keepFrom, toReport, type CheckReport, type ReportedFinding } from "../domain/checks/to-report";
import { toSarif } from "../domain/checks/to-sarif";
import { waiverFileSchema } from "../domain/checks/waiver-file";
import { applyWaivers, type Waiver } from "../domain/checks/waivers";
import type { Wiring } from "../domain/checks/wiring";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";
import { listRequired } from "../library/describe-nodeset.server";
import { getLibrary } from "../library/library.server";
import { validateXsd } from "../library/validate-xsd.server";
import { resolvePath, type CheckCommand } from "./parse-command-line";
import { readFolders, readInput } from "./read-input";
import { makeDocumentWiring, readMappingFile } from "./read-mapping";

type Checked = {
  readonly report: CheckReport;
  readonly waived: readonly { finding: ReportedFinding; waiver: Waiver }[];
};

const NOTHING = new Map<never, never>();

export async function check(command: CheckCommand): Promise<number> {
  const { file } = command;
  const refuse = (problems: readonly Problem[]): number =>
    print(command, { report: toReport([], { file, lines: NOTHING, problems }), waived: [] }, 2);
  const content = await readInput(file);
  if (!content.ok) return refuse(content.problems);
  const waivers = await readJson(command.waivers, waiverFileSchema, { waivers: [] });
  if (!waivers.ok) return refuse(waivers.problems);
  const conventions = await readJson<Conventions>(command.conventions, conventionsSchema, {});
  if (!conventions.ok) return refuse(conventions.problems);
  const folders = await readFolders(command.folders);
  const problems = [...content.problems, ...folders.problems];
  if (!folders.ok) return refuse(problems);
  const { header } = content.value;
  const layers = await getLibrary().resolve(listRequired(header), {
    extra: folders.value,
    requiredBy: getOwnNamespace(header),
  });
  problems.push(...layers.problems.map((found) => withPlace(found, content.value)));
  const isComplete = layers.ok && layers.problems.every((found) => found.severity !== "error");
  if (!isComplete) return refuse(problems);
  const mapping = command.mapping === undefined ? undefined : await readMappingFile(command.mapping);
  if (mapping && !mapping.ok) return refuse(mapping.problems.map((found) => ({ ...found, at: { ...found.at, file: command.mapping ?? "" } })));
  const space = AddressSpace.of(layers.value, buildLayer(content.value.header, content.value.nodes));
  const wiring = mapping ? makeDocumentWiring(space, mapping.value) : undefined;
  if (wiring && !wiring.ok) return refuse(wiring.problems);
  const checked = checkContent(command, content.value, space, problems, {
    waivers: waivers.value.waivers,
    rules: [...RULES, ...makeConventionRules(conventions.value)],
    faults: await validateXsd(await readFile(resolvePath(file))),
    wiring: wiring?.value,
  });
  const counted = checked.report.findings.some((f) => isAtLeast(f.severity, command.severity ?? "error"));
  const hasErrors = counted || problems.some((found) => found.severity === "error");
  return print(command, checked, hasErrors ? 1 : 0);
}

/** A problem of a required model stands where the file names that model, else at the file's own model. */
function withPlace(found: Problem, { header, modelPlaces }: NodeSetContent): Problem {
  const at = modelPlaces.get(String(found.data?.modelUri)) ?? modelPlaces.get(getOwnNamespace(header));
  return found.at || !at ? found : { ...found, at };
}

type Asked = {
  readonly waivers: readonly Waiver[];
  readonly rules: readonly Rule[];
  /** What is not valid against the schema. */
  readonly faults: readonly Problem[];
  readonly wiring: Wiring | undefined;
};

function checkContent(
  { file, severity }: CheckCommand,
  content: NodeSetContent,
  space: AddressSpace,
  problems: readonly Problem[],
  { waivers, rules, faults, wiring }: Asked,
): Checked {
  const { lines } = content;
  const { open, waived } = applyWaivers(space, runChecks(space, { rules, ...(wiring ? { wiring } : {}) }), waivers);
  const ofText = applyWaivers(space, toSchemaFindings(space, faults, lines), waivers);
  const sources = { file, lines, problems, ofText: ofText.open };
  const listed = [...waived, ...ofText.waived].map(({ finding, waiver }) => {
    const [reported] = toReport([finding], { file, lines }).findings;
    return reported ? [{ finding: reported, waiver }] : [];
  });
  return { report: keepFrom(toReport(open, sources), severity), waived: listed.flat() };
}

/** Reads a JSON file of a known form. Problem: `check-file.unreadable`. */
async function readJson<T>(file: string | undefined, schema: ZodType<T>, absent: T): Promise<Result<T>> {
  if (file === undefined) return ok(absent);
  try {
    const parsed = schema.safeParse(JSON.parse(await readFile(resolvePath(file), "utf8")));
    if (parsed.success) return ok(parsed.data);
    const [issue] = parsed.error.issues;
    return fail(
      problem("check-file.unreadable", { file, detail: `${issue?.path.join(".") ?? ""}: ${issue?.message ?? ""}` }),
    );
  } catch (error) {
    return fail(
      problem("check-file.unreadable", { file, detail: error instanceof Error ? error.message : String(error) }),
    );
  }
}

function print({ format }: CheckCommand, { report, waived }: Checked, code: number): number {
  process.stdout.write(toText(format, report, waived, code !== 2));
  return code;
}

function toText(
  format: CheckCommand["format"],
  report: CheckReport,
  waived: Checked["waived"],
  isChecked: boolean,
): string {
  if (format === "text") return formatReport(report, isChecked);
  const digest = (text: string): string => createHash("sha256").update(text).digest("hex");
  const document = format === "json" ? report : toSarif([report], { version: "0.1.0", waived, digest, isChecked });
  return `${JSON.stringify(document, null, 2)}\n`;
}
