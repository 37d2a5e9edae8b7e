import { beforeEach, describe, expect, it } from "vitest";
import { collectSubtrees, copySubtrees, type NodeClipboard } from "~/components/model/copy-nodes";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { findModellingRule, findParent, findProperty, listMembers } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardType } from "~/domain/address-space/standard-ids";
import { BlockAllocator, type NodeIdAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import type { Edit } from "~/domain/editing/edit-draft";
import type { Result } from "~/domain/core/result";
import { getStandardLayer } from "../../../support/published-layers";

class Bench {
  space: AddressSpace;
  readonly context: NodeIdAllocator;

  constructor(uri: string) {
    this.space = AddressSpace.of([getStandardLayer()], buildLayer({ namespaceUris: [uri], models: [{ modelUri: uri, requiredModels: [] }] }, []));
    this.context = BlockAllocator.forModel(() => this.space, [{ from: 1000, to: 2000 }]);
  }

  run(make: (space: AddressSpace) => Result<Edit>): readonly NodeKey[] {
    const edit = make(this.space);
    if (!edit.ok) throw new Error(edit.problems.map((p) => p.code).join());
    const applied = applyOperations(this.space, edit.value.operations);
    if (!applied.ok) throw new Error(applied.problems.map((p) => p.code).join());
    this.space = applied.value;
    return edit.value.made;
  }

  copy(clipboard: NodeClipboard | undefined, parent?: NodeKey): NodeKey {
    return this.run((space) => copySubtrees(space, this.context, clipboard as NodeClipboard, parent))[0] as NodeKey;
  }
}

describe("a copy of nodes", () => {
  let bench: Bench;
  let type: NodeKey;
  let group: NodeKey;

  beforeEach(() => {
    bench = new Bench("http://example.test/UA/One/");
    const { context } = bench;
    type = bench.run((s) => addType(s, context, { supertype: StandardType.BaseObjectType, name: "PumpType" }))[0] as NodeKey;
    group = bench.run((s) => addObject(s, context, { parent: type, name: "Drive" }))[0] as NodeKey;
    bench.run((s) => addVariable(s, context, { parent: group, name: "Speed", typeDefinition: StandardType.AnalogUnitRangeType, dataType: "i=10" as NodeKey, range: { low: 0, high: 180 } }));
  });

  it("stands beside its original with the next free name, all below it and its rule", () => {
    const copy = bench.copy(collectSubtrees(bench.space, [group]));
    expect(bench.space.requireNode(copy).browseName.name).toBe("Drive2");
    expect(bench.space.requireNode(copy).displayName).toEqual([{ text: "Drive2" }]);
    expect(findParent(bench.space, copy)).toBe(type);
    expect(findModellingRule(bench.space, copy)).toBe(findModellingRule(bench.space, group));
    const [speed] = listMembers(bench.space, copy);
    expect(speed?.browseName.name).toBe("Speed");
    expect(findProperty(bench.space, speed?.key as NodeKey, "EURange")).toBeDefined();
  });

  it("gets NodeIds and names of the model that it is pasted into", () => {
    const other = new Bench("http://example.test/UA/Two/");
    const target = other.run((s) => addType(s, other.context, { supertype: StandardType.BaseObjectType, name: "FanType" }))[0] as NodeKey;
    const copy = other.copy(collectSubtrees(bench.space, [group]), target);
    const node = other.space.requireNode(copy);
    expect([node.nodeId.namespaceUri, node.browseName]).toEqual(["http://example.test/UA/Two/", { namespaceUri: "http://example.test/UA/Two/", name: "Drive" }]);
    expect(listMembers(other.space, copy)).toHaveLength(1);
  });

  it("of a type keeps the supertype", () => {
    const copy = bench.copy(collectSubtrees(bench.space, [type]));
    expect(bench.space.requireNode(copy).browseName.name).toBe("PumpType2");
    expect(bench.space.edgesTo(copy).map((edge) => edge.source)).toContain(StandardType.BaseObjectType);
    expect(listMembers(bench.space, copy).map((node) => node.browseName.name)).toEqual(["Drive"]);
  });

  it("of nodes that belong to a required model is nothing", () => {
    expect(collectSubtrees(bench.space, [StandardType.FolderType])).toBeUndefined();
  });
});
