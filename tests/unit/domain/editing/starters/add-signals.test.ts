import { describe, expect, it } from "vitest";
import { findMember, findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardType } from "~/domain/address-space/standard-ids";
import { getValue } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { addSignals } from "~/domain/editing/starters/add-signals";
import { readCsv } from "~/utils/read-csv";
import { guessColumns, readSignalList } from "~/domain/editing/starters/read-signal-list";
import { buildModel } from "../../../../support/model-builder";

const list = `group,name,type,unit,low,high
Process,Speed,REAL,rpm,0,180
Process,Distance,REAL,mm,,
Process,Level,REAL,,0,100
,Running,BOOL,,,`;

function readSignals() {
  const table = getValue(readCsv(list));
  return readSignalList(table, guessColumns(table.rows[0]?.fields ?? [])).signals;
}

describe("addSignals", () => {
  it("makes the type, its groups and Variables of the type that unit and range ask for (OPC 10000-8 §5.3.2)", () => {
    const { space: before, model } = buildModel(() => undefined);
    const ids = new BlockAllocator(model.uri, [{ from: 5000, to: 5999 }]);
    const edit = getValue(addSignals(before, ids, { type: { name: "PressType" }, signals: readSignals() }));
    const space = getValue(applyOperations(before, edit.operations));
    const type = edit.made[0] as NodeKey;
    expect(listMembers(space, type).map((node) => node.browseName.name)).toEqual(["Process", "Running"]);
    const group = findMember(space, type, "Process", model.uri);
    const members = group ? listMembers(space, group.key) : [];
    expect(members.map((node) => [node.browseName.name, findTypeDefinition(space, node.key)])).toEqual([
      ["Speed", StandardType.AnalogUnitRangeType],
      ["Distance", StandardType.AnalogUnitType],
      ["Level", StandardType.AnalogItemType],
    ]);
  });

  it("fills a group that the type has already, and refuses a name that is taken without half an edit", () => {
    const { space, made, model } = buildModel((m) => {
      const type = m.objectType("PressType");
      m.variable("Speed", { parent: m.object("Process", { parent: type, rule: "Mandatory" }), rule: "Mandatory" });
      return type;
    });
    const ids = new BlockAllocator(model.uri, [{ from: 5000, to: 5999 }]);
    const [speed, ...others] = readSignals();
    const filled = getValue(addSignals(space, ids, { type: { key: made }, signals: others }));
    const after = getValue(applyOperations(space, filled.operations));
    expect(listMembers(after, made).map((node) => node.browseName.name)).toEqual(["Process", "Running"]);
    const refused = addSignals(space, ids, { type: { key: made }, signals: speed ? [speed] : [] });
    expect(!refused.ok && refused.problems.map((p) => p.code)).toEqual(["name.taken"]);
  });
});
