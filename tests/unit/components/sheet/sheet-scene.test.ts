import { describe, expect, it } from "vitest";
import { listDefaultCards } from "~/components/sheet/default-choice";
import { reuseScene } from "~/components/sheet/reuse-scene";
import { buildScene } from "~/components/sheet/sheet-scene";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardType } from "~/domain/address-space/standard-ids";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import type { Edit } from "~/domain/editing/edit-draft";
import type { Result } from "~/domain/core/result";
import { getStandardLayer } from "../../../support/published-layers";
import { TEST_NAMESPACE } from "../../../support/small-standard";

/** A pump with a group, a unit and a state, built by the commands that the screens use. */
function buildPump(): { space: AddressSpace; type: NodeKey; group: NodeKey; state: NodeKey; speed: NodeKey } {
  let space = AddressSpace.of([getStandardLayer()], buildLayer({ namespaceUris: [TEST_NAMESPACE], models: [{ modelUri: TEST_NAMESPACE, requiredModels: [] }] }, []));
  const context = BlockAllocator.forModel(() => space, [{ from: 1000, to: 2000 }]);
  const run = (make: (current: AddressSpace) => Result<Edit>): NodeKey => {
    const edit = make(space);
    if (!edit.ok) throw new Error(edit.problems.map((p) => p.code).join());
    const applied = applyOperations(space, edit.value.operations);
    if (!applied.ok) throw new Error(applied.problems.map((p) => p.code).join());
    space = applied.value;
    return edit.value.made[0] as NodeKey;
  };
  const type = run((s) => addType(s, context, { supertype: StandardType.BaseObjectType, name: "PumpType" }));
  const group = run((s) => addObject(s, context, { parent: type, name: "Drive" }));
  const speed = run((s) =>
    addVariable(s, context, {
      parent: group,
      name: "Speed",
      typeDefinition: StandardType.AnalogUnitRangeType,
      dataType: "i=10" as NodeKey,
      unit: { namespaceUri: "http://www.opcfoundation.org/UA/units/un/cefact", unitId: 5394509, displayName: { text: "r/min" }, description: { text: "revolutions per minute" } },
      range: { low: 0, high: 180 },
    }),
  );
  const state = run((s) => addEnumeration(s, context, { name: "PumpState", fields: [{ name: "Off", value: 0 }] }));
  run((s) => addVariable(s, context, { parent: group, name: "State", dataType: state }));
  return { space, type, group, state, speed };
}

describe("a sheet of a types model", () => {
  it("shows own types, their supertypes, groups and enumerations by itself", () => {
    const { space, type, group, state } = buildPump();
    expect(listDefaultCards(space)).toEqual([type, StandardType.BaseObjectType, group, state]);
  });

  it("draws members as rows with DataType, unit and cardinality, and no member twice", () => {
    const { space, type, group } = buildPump();
    const scene = buildScene(space, { shown: listDefaultCards(space), unfolded: new Set() });
    const cardOf = (k: NodeKey) => scene.cards.find((card) => card.key === k);
    expect(cardOf(type)?.rows).toEqual([]);
    expect(cardOf(type)?.drawn).toBe(1);
    expect(cardOf(group)?.rows[0]).toMatchObject({ name: "Speed", dataType: "Float", unit: "r/min", cardinality: "1" });
  });

  it("ends lines as OPC 10000-3 Table C.2 says and leads a dotted leader to the DataType", () => {
    const { space, type, group, state } = buildPump();
    const scene = buildScene(space, { shown: listDefaultCards(space), unfolded: new Set() });
    const found = scene.lines.map((line) => [line.end, line.from, line.to]);
    expect(found).toContainEqual(["subtype", type, StandardType.BaseObjectType]);
    expect(found).toContainEqual(["component", type, group]);
    expect(found).toContainEqual(["leader", group, state]);
    expect(found).toHaveLength(3);
  });

  it("keeps the objects of cards that an edit did not touch", () => {
    const { space } = buildPump();
    const shown = listDefaultCards(space);
    const first = buildScene(space, { shown, unfolded: new Set() });
    const second = reuseScene(first, buildScene(space, { shown, unfolded: new Set() }));
    expect(second.cards.every((card, i) => card === first.cards[i])).toBe(true);
    expect(second.lines.every((line, i) => line === first.lines[i])).toBe(true);
  });
});
