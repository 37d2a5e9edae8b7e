/** Members, levels and required fields: OASIS SARIF 2.1.0, errata 01, sarif-schema-2.1.0.json. */
import { Ajv } from "ajv";
import { describe, expect, test } from "vitest";
import { runChecks } from "~/domain/checks/run-checks";
import { toReport } from "~/domain/checks/to-report";
import { toSarif } from "~/domain/checks/to-sarif";
import { problem } from "~/domain/core/result";
import { buildModel } from "../../../support/model-builder";
import { SARIF_PROFILE } from "../../../support/sarif-schema";

type Log = {
  version: string;
  runs: {
    tool: { driver: { name: string; rules: { id: string; defaultConfiguration: { level: string } }[] } };
    columnKind: string;
    results: {
      ruleId: string;
      ruleIndex: number;
      level: string;
      message: { text: string };
      locations: {
        physicalLocation: { artifactLocation: { uri: string }; region: { startLine: number; startColumn: number } };
      }[];
      suppressions?: { kind: string; status: string; justification: string }[];
      partialFingerprints?: Record<string, string>;
    }[];
    invocations: { executionSuccessful: boolean; toolExecutionNotifications: { descriptor: { id: string } }[] }[];
  }[];
};

describe("toSarif", () => {
  const { space, made } = buildModel((m) => m.objectType("Pump", { set: { displayName: [] } }));
  const problems = [problem.warning("encoding.line-ends", undefined, { line: 1, column: 1 })];
  const report = toReport(runChecks(space), {
    file: "models/my press.xml",
    lines: new Map([[made, { line: 7, column: 3 }]]),
    problems,
  });
  const log = toSarif([report], { version: "0.1.0", digest: (text) => `d${text.length}` }) as Log;
  const [run] = log.runs;

  test("has no member and no value that the standard does not know", () => {
    const isValid = new Ajv({ strict: false }).compile(SARIF_PROFILE);
    const [finding] = report.findings;
    if (!finding) throw new Error("no finding");
    const waiver = {
      rule: finding.rule,
      nodeId: "",
      reason: "Known",
      person: "Ines",
      date: "2026-05-04",
      fingerprint: "",
    };
    const logs = [
      log,
      toSarif([report], { version: "0.1.0", waived: [{ finding, waiver }] }),
      toSarif([report], { version: "0.1.0", isChecked: false }),
    ];
    for (const each of logs) {
      isValid(each);
      expect(isValid.errors ?? []).toEqual([]);
    }
  });

  test("says of a file that could not be checked that nothing is known", () => {
    const refused = toSarif([{ ...report, findings: [] }], { version: "0.1.0", isChecked: false }) as Log;
    expect(refused.runs[0]?.invocations[0]?.executionSuccessful).toBe(false);
    expect(refused.runs[0]).not.toHaveProperty("results");
  });

  test("has version, tool and one result a finding", () => {
    expect(log.version).toBe("2.1.0");
    expect(run?.tool.driver.name).toBe("Ferrule");
    expect(run?.results).toHaveLength(report.findings.length);
  });

  test("writes hints as notes and points each result at its rule", () => {
    const levels = new Map(run?.results.map((r) => [r.ruleId, r.level] as const));
    expect(levels.get("R016")).toBe("error");
    expect(levels.get("R013")).toBe("note");
    for (const result of run?.results ?? []) expect(run?.tool.driver.rules[result.ruleIndex]?.id).toBe(result.ruleId);
  });

  test("encodes the file and gives lines and columns from 1", () => {
    const place = run?.results.find((r) => r.ruleId === "R016")?.locations[0]?.physicalLocation;
    expect(place?.artifactLocation.uri).toBe("models/my%20press.xml");
    expect(place?.region).toEqual({ startLine: 7, startColumn: 3 });
  });

  test("tells problems of reading as notifications", () => {
    expect(run?.invocations[0]?.toolExecutionNotifications.map((n) => n.descriptor.id)).toEqual(["encoding.line-ends"]);
  });

  test("keeps waived findings with their level and says who accepted them", () => {
    const [finding] = report.findings;
    if (!finding) throw new Error("no finding");
    const waiver = {
      rule: finding.rule,
      nodeId: finding.nodeId,
      reason: "Known",
      person: "Ines",
      date: "2026-05-04",
      fingerprint: "",
    };
    const waived = toSarif([{ ...report, findings: [] }], { version: "0.1.0", waived: [{ finding, waiver }] }) as Log;
    expect(waived.runs[0]?.results[0]?.suppressions).toEqual([
      { kind: "external", status: "accepted", justification: "Known (Ines, 2026-05-04)" },
    ]);
  });
});
