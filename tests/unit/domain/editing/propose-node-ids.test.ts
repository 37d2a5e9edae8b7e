import { describe, expect, it } from "vitest";
import { formatNodeId, numericNodeId, type NodeId } from "~/domain/address-space/node-id";
import { StandardDataType, StandardType } from "~/domain/address-space/standard-ids";
import { addMethod, addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { setMethodArguments } from "~/domain/editing/commands/set-method-arguments";
import { renumberNodes } from "~/domain/editing/commands/renumber-nodes";
import { checkProposals, listNodeIdUses, proposeNodeIds, type ProposalRule } from "~/domain/editing/propose-node-ids";
import { StandardObject } from "~/domain/address-space/standard-ids";
import { Workbench } from "../../../support/command-harness";
import { TEST_NAMESPACE } from "../../../support/small-standard";

const bench = new Workbench();
const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "PumpType" });
const speed = bench.do(addVariable, { parent: type, name: "Speed", dataType: StandardDataType.Double });
const point = bench.do(addStructure, { name: "PointType", fields: [{ name: "X", dataType: StandardDataType.Double }] });
const move = bench.do(addMethod, { parent: type, name: "Move" });
bench.do(setMethodArguments, { method: move, input: [{ name: "To", dataType: point }], output: [] });
const pump = bench.do(addObject, { parent: StandardObject.ObjectsFolder, name: "B1", typeDefinition: type });

const propose = (rule: ProposalRule) =>
  new Map([...proposeNodeIds(bench.space, bench.space.listOwnNodes(), rule)].map(([k, id]) => [k, formatNodeId(id)]));
const nsu = (local: string) => `nsu=${TEST_NAMESPACE};${local}`;
const number = (n: number): NodeId => numericNodeId(TEST_NAMESPACE, n);

describe("proposals of NodeIds", () => {
  it("number on from the first, each number once", () => {
    const ids = [...propose({ kind: "numbers", from: 1 }).values()];
    expect(ids).toEqual(bench.space.listOwnNodes().map((_, i) => nsu(`i=${i + 1}`)));
  });

  it("leave the NodeIds of nodes that stay alone", () => {
    const taken = bench.node(speed).nodeId.identifier as number;
    const proposed = proposeNodeIds(bench.space, [bench.node(type)], { kind: "numbers", from: taken });
    expect(proposed.get(type)).not.toEqual(number(taken));
  });

  it("take each class from its own range and end with it", () => {
    const ids = propose({
      kind: "ranges",
      ranges: { Variable: { from: 6000, to: 6000 }, ObjectType: { from: 1, to: 9 } },
    });
    expect(ids.get(type)).toBe(nsu("i=1"));
    expect([...ids.values()].filter((id) => id.includes("=6"))).toEqual([nsu("i=6000")]);
  });

  it("follow the names of machines and leave types alone", () => {
    const ids = propose({ kind: "paths", separator: "." });
    expect(ids.get(pump)).toBe(nsu("s=B1"));
    expect([...ids.values()]).toContain(nsu("s=B1.Speed"));
    expect(ids.has(type)).toBe(false);
    expect(ids.has(speed)).toBe(false);
  });

  it("are checked against each other and against the nodes that stay", () => {
    const taken = bench.node(speed).nodeId;
    const codes = (changes: ReadonlyMap<typeof type, NodeId>) =>
      [...checkProposals(bench.space, changes)].map(([key, problem]) => [key, problem.code]);
    expect(codes(new Map([[type, taken]]))).toEqual([[type, "operation.node-id-taken"]]);
    expect(
      codes(
        new Map([
          [type, number(77)],
          [pump, number(77)],
        ]),
      ),
    ).toEqual([[pump, "renumber.twice"]]);
    expect(
      codes(
        new Map([
          [type, taken],
          [speed, bench.node(type).nodeId],
        ]),
      ),
    ).toEqual([]);
    expect(codes(new Map([[type, { namespaceUri: TEST_NAMESPACE, type: "s", identifier: "" }]]))).toEqual([
      [type, "renumber.null"],
    ]);
  });

  it("know the values that name a node, which renumbering rewrites", () => {
    const users = listNodeIdUses(bench.space, [point]).get(point) ?? [];
    const [user] = users;
    expect(user && bench.node(user).browseName.name).toBe("InputArguments");
    expect(listNodeIdUses(bench.space, [move]).size).toBe(0);
    bench.do(renumberNodes, { changes: [{ node: point, nodeId: number(31) }] });
    const value = user && bench.node(user);
    expect(value && "value" in value && value.value?.xml).toContain(nsu("i=31"));
    expect(listNodeIdUses(bench.space, [point]).get(point)).toEqual(users);
  });
});
