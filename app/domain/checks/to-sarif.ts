/**
 * Findings as SARIF 2.1.0 (OASIS, errata 01), for code-scanning tools. Of optional members only those that carry facts are
 * written; nothing in it depends on the time of the run.
 */
import type { Severity } from "../core/result";
import type { ReportedFinding, CheckReport } from "./to-report";
import { FILE_RULES } from "./file-rules";
import { RULES } from "./registry";
import type { Waiver } from "./waivers";

export const SARIF_SCHEMA = "https://json.schemastore.org/sarif-2.1.0.json";

const LEVELS: Readonly<Record<Severity, "error" | "warning" | "note">> = {
  error: "error",
  warning: "warning",
  hint: "note",
};

export type SarifOptions = {
  readonly version: string;
  /** False when the file could not be checked: its log then says so, and that nothing is known of results. */
  readonly isChecked?: boolean;
  /** Accepted findings; they stay in the log with their level and say who accepted them. */
  readonly waived?: readonly { readonly finding: ReportedFinding; readonly waiver: Waiver }[];
  /** A digest of a text as hexadecimal digits, which the domain cannot make; without it there are no fingerprints. */
  readonly digest?: (text: string) => string;
};

/** One log with one run. Problems of reading appear as notifications of an unsuccessful run. */
export function toSarif(reports: readonly CheckReport[], options: SarifOptions): object {
  const used = new Set(reports.flatMap((r) => r.findings.map((f) => f.rule)));
  for (const { finding } of options.waived ?? []) used.add(finding.rule);
  const rules = [...RULES, ...FILE_RULES].filter((rule) => used.has(rule.id));
  const { isChecked = true } = options;
  const indexOf = new Map(rules.map((rule, i) => [rule.id as string, i] as const));
  const uris = reports.map((r) => toUri(r.file));
  const results = reports.flatMap((report, at) => [
    ...report.findings.map((f) => toResult(f, indexOf, { uri: uris[at] ?? "", index: at }, options)),
    ...(options.waived ?? []).map(({ finding, waiver }) => ({
      ...toResult(finding, indexOf, { uri: uris[at] ?? "", index: at }, options),
      suppressions: [
        { kind: "external", status: "accepted", justification: `${waiver.reason} (${waiver.person}, ${waiver.date})` },
      ],
    })),
  ]);
  const notes = reports.flatMap((report, at) => report.problems.map((p) => ({ ...p, uri: uris[at] ?? "" })));
  return {
    $schema: SARIF_SCHEMA,
    version: "2.1.0",
    runs: [
      {
        tool: {
          driver: {
            name: "Ferrule",
            semanticVersion: options.version,
            rules: rules.map((rule) => ({
              id: rule.id,
              name: toPascalCase(rule.title),
              shortDescription: { text: rule.title },
              fullDescription: { text: rule.condition },
              help: { text: `${rule.why}\n\n${rule.clause}` },
              defaultConfiguration: { level: LEVELS[rule.severity] },
            })),
          },
        },
        columnKind: "utf16CodeUnits",
        artifacts: uris.map((uri) => ({ location: { uri, uriBaseId: "SRCROOT" }, mimeType: "application/xml" })),
        ...(isChecked ? { results } : {}),
        invocations: [
          {
            executionSuccessful: isChecked,
            toolExecutionNotifications: notes.map(({ code, message, line, column, uri }) => ({
              level: "warning",
              descriptor: { id: code },
              message: { text: message },
              locations: [
                {
                  physicalLocation: {
                    artifactLocation: { uri, uriBaseId: "SRCROOT" },
                    region: { startLine: line, startColumn: column },
                  },
                },
              ],
            })),
          },
        ],
      },
    ],
  };
}

function toResult(
  finding: ReportedFinding,
  indexOf: ReadonlyMap<string, number>,
  artifact: { readonly uri: string; readonly index: number },
  { digest }: SarifOptions,
): object {
  const { rule, severity, message, line, column, browseName, path, nodeId, facts, clause } = finding;
  const ruleIndex = indexOf.get(rule);
  return {
    ruleId: rule,
    ...(ruleIndex === undefined ? {} : { ruleIndex }),
    level: LEVELS[severity],
    message: { text: [message, ...facts, clause].join("\n") },
    locations: [
      {
        physicalLocation: {
          artifactLocation: { uri: artifact.uri, uriBaseId: "SRCROOT", index: artifact.index },
          region: { startLine: line, startColumn: column },
        },
        ...(nodeId === ""
          ? {}
          : {
              logicalLocations: [{ name: browseName, fullyQualifiedName: path, decoratedName: nodeId, kind: "member" }],
            }),
      },
    ],
    ...(digest ? { partialFingerprints: { "ruleNode/v1": digest(`${rule}\n${nodeId}\n${message}`) } } : {}),
  };
}

/** A relative path with forward slashes, percent-encoded. */
function toUri(file: string): string {
  return file.replace(/\\/g, "/").split("/").map(encodeURIComponent).join("/");
}

function toPascalCase(title: string): string {
  return title
    .split(/[^A-Za-z0-9]+/)
    .filter((word) => word !== "")
    .map((word) => word.charAt(0).toUpperCase() + word.slice(1))
    .join("");
}
