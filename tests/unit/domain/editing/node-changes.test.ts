import { describe, expect, it } from "vitest";
import { StandardDataType, StandardReferenceType, StandardType } from "~/domain/address-space/standard-ids";
import { getValue, ok } from "~/domain/core/result";
import { addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import { renumberNodes } from "~/domain/editing/commands/renumber-nodes";
import { setText } from "~/domain/editing/commands/set-text";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import { listNodeChanges } from "~/domain/editing/node-changes";
import { numericNodeId } from "~/domain/address-space/node-id";
import type { CommandContext, Edit } from "~/domain/editing/edit-draft";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Result } from "~/domain/core/result";
import { Workbench } from "../../../support/command-harness";
import { TEST_NAMESPACE } from "../../../support/small-standard";

const bench = new Workbench();
const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "PumpType" });

type Command<I> = (space: AddressSpace, context: CommandContext, intent: I) => Result<Edit>;

/** One transaction as the server stores it. */
function transact<I>(command: Command<I>, intent: I) {
  const { operations } = getValue(command(bench.space, bench.context, intent));
  const { inverse } = getValue(applyWithInverse(bench.space, operations));
  bench.do(() => ok({ operations, made: [] }), intent);
  return { operations, inverse };
}

describe("what a transaction did to a node", () => {
  it("is told for it and for the node that it refers to", () => {
    const made = transact(addVariable, { parent: type, name: "Speed", dataType: StandardDataType.Double });
    const speed = bench.at(type, "Speed").key;
    expect(listNodeChanges(made, speed)[0]).toEqual({ kind: "created" });
    expect(listNodeChanges(made, type)).toEqual([
      { kind: "reference-added", type: StandardReferenceType.HasComponent, other: speed, isForward: true },
    ]);
  });

  it("tells what stood in an attribute before", () => {
    const speed = bench.at(type, "Speed").key;
    const named = transact(setText, { node: speed, attribute: "description", text: "How fast" });
    expect(listNodeChanges(named, speed)).toEqual([
      { kind: "attribute", attribute: "description", to: [{ text: "How fast" }] },
    ]);
    const renamed = transact(setText, { node: speed, attribute: "description", text: "Speed" });
    expect(listNodeChanges(renamed, speed)).toEqual([
      { kind: "attribute", attribute: "description", from: [{ text: "How fast" }], to: [{ text: "Speed" }] },
    ]);
    expect(listNodeChanges(renamed, type)).toEqual([]);
  });

  it("tells the NodeId before and after", () => {
    const before = bench.node(type).nodeId;
    const to = numericNodeId(TEST_NAMESPACE, 77);
    const numbered = transact(renumberNodes, { changes: [{ node: type, nodeId: to }] });
    expect(listNodeChanges(numbered, type)).toEqual([{ kind: "attribute", attribute: "nodeId", from: before, to }]);
  });
});
