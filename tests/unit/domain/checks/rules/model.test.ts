/** Conditions from OPC 10000-5 §6.3.13 and OPC 10000-6 Annex F, v1.05.06. */
import { describe, expect, test } from "vitest";
import { StandardReferenceType as R } from "~/domain/address-space/standard-ids";
import { runChecks } from "~/domain/checks/run-checks";
import { toReport } from "~/domain/checks/to-report";
import { problem } from "~/domain/core/result";
import { buildModel } from "../../../../support/model-builder";
import { describeRule } from "../../../../support/describe-rule";

describeRule("R181", {
  valid: {
    "another name of the object": (m) => m.set(m.metadata(), { browseName: m.name("About") }),
    "a file that defines no model": (m) => (m.withoutMetadata(), m.setHeader({ models: [] })),
  },
  invalid: {
    "a missing Property": (m) => m.metadata({ without: "StaticNodeIdTypes" }),
    "the URI of another model": (m) => (m.metadata({ uri: "http://example.org/UA/Other/" }), undefined),
    "warning: another version": (m) => {
      const key = m.metadata();
      m.setModel({ version: "2.0.0" });
      return key;
    },
    "hint: another time on the same day": (m) => {
      const key = m.metadata();
      m.setModel({ publicationDate: "2026-05-01T08:00:00Z" });
      return key;
    },
    "warning: another day": (m) => {
      const key = m.metadata();
      m.setModel({ publicationDate: "2026-05-02T00:00:00Z" });
      return key;
    },
    "warning: another place": (m) => {
      const key = m.metadata();
      m.removeReferences(key, R.HasComponent);
      return key;
    },
  },
});

describe("toReport", () => {
  const { space, made } = buildModel((m) =>
    m.objectType("PumpType", { set: { displayName: [], description: [{ text: "A pump." }] } }),
  );

  test("gives findings the places of their nodes, in the order of lines", () => {
    const report = toReport(runChecks(space), { file: "press.xml", lines: new Map([[made, { line: 7, column: 3 }]]) });
    expect(report.file).toBe("press.xml");
    expect(report.counts).toEqual({ error: 1, warning: 0, hint: 0 });
    expect(report.findings).toMatchObject([
      {
        rule: "R016",
        severity: "error",
        nodeId: "nsu=http://example.org/UA/Press/;i=1001",
        browseName: "PumpType",
        path: "PumpType",
        line: 7,
        column: 3,
      },
    ]);
    expect(Object.keys(report.findings[0] ?? {})).toEqual([
      "rule",
      "severity",
      "nodeId",
      "browseName",
      "path",
      "line",
      "column",
      "message",
      "clause",
      "facts",
      "attribute",
      "consequence",
    ]);
  });

  test("takes the lines of a writer too", () => {
    const report = toReport(runChecks(space), { file: "press.xml", lines: new Map([[made, 9]]) });
    expect(report.findings[0]).toMatchObject({ line: 9, column: 1 });
  });

  test("turns problems that break a rule into findings and keeps them as problems", () => {
    const twice = problem(
      "nodeset.duplicate-node-id",
      { nodeId: "nsu=http://example.org/UA/Press/;i=1", firstLine: 4 },
      { line: 12, column: 5 },
    );
    const report = toReport([], { file: "press.xml", lines: new Map(), problems: [twice] });
    expect(report.findings).toMatchObject([
      { rule: "R002", severity: "error", nodeId: "nsu=http://example.org/UA/Press/;i=1", line: 12, column: 5 },
    ]);
    expect(report.findings[0]?.facts).toContain("First line: 4");
    expect(report.problems).toMatchObject([{ code: "nodeset.duplicate-node-id", line: 12, column: 5 }]);
    expect(report.problems[0]?.message).toContain("i=1");
  });
});
