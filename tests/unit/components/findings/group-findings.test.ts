import { describe, expect, it } from "vitest";
import { groupFindings, matchesText } from "~/components/findings/group-findings";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Finding, RuleId } from "~/domain/checks/finding";
import type { Severity } from "~/domain/core/result";

function finding(rule: RuleId, severity: Severity, path: string): Finding {
  const browseName = path.split("/").at(-1) ?? "";
  return {
    rule,
    severity,
    key: path as NodeKey,
    nodeId: path,
    browseName,
    path,
    message: `${rule} at ${path}`,
    clause: "OPC 10000-3",
    facts: [],
  };
}

const findings = [
  finding("R016", "hint", "PumpType/Speed"),
  finding("R023", "error", "PumpType"),
  finding("R016", "warning", "TankType/Level"),
];

describe("groupFindings", () => {
  it("puts groups with errors first and the severest finding of a group first", () => {
    const groups = groupFindings(findings, "rule");
    expect(groups.map((group) => group.id)).toEqual(["R023", "R016"]);
    expect(groups[1]?.severity).toBe("warning");
    expect(groups[1]?.findings.map((f) => f.severity)).toEqual(["warning", "hint"]);
  });

  it("groups by the type or object that owns the node", () => {
    const groups = groupFindings(findings, "place");
    expect(groups.map((group) => [group.title, group.findings.length])).toEqual([
      ["PumpType", 2],
      ["TankType", 1],
    ]);
  });

  it("names the model as a whole where a finding has no node", () => {
    const { key: _key, ...whole } = finding("R101", "warning", "");
    expect(groupFindings([whole], "place")[0]?.title).toBe("The model as a whole");
  });
});

describe("matchesText", () => {
  it("looks at rule, path, message and the rule's title", () => {
    const [first] = findings;
    if (!first) throw new RangeError("no finding");
    expect(matchesText(first, "r016")).toBe(true);
    expect(matchesText(first, "pumptype")).toBe(true);
    expect(matchesText(first, "displayname")).toBe(true);
    expect(matchesText(first, "tank")).toBe(false);
  });
});
