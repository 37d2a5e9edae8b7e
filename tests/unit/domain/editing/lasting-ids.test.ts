import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Node } from "~/domain/address-space/node";
import {
  formatNodeId,
  numericNodeId,
  standardKey,
  toNodeKey,
  type NodeId,
  type NodeKey,
} from "~/domain/address-space/node-id";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { checkIdPolicy, NUMBERS, type IdPolicy } from "~/domain/address-space/id-policy";
import { StandardDataType, StandardType } from "~/domain/address-space/standard-ids";
import { BlockAllocator, findFree, type IdBlock } from "~/domain/editing/allocate-node-id";
import { applyOperation } from "~/domain/editing/apply-operation";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { setIdPolicy } from "~/domain/editing/commands/set-id-policy";
import { renumberNodes } from "~/domain/editing/commands/renumber-nodes";
import { NodeIdLedger, PathAllocator } from "~/domain/editing/id-policies";
import { findRange, IdStock, type BlockFor } from "~/domain/editing/id-stock";
import { instantiate } from "~/domain/instantiation/instantiate";
import { planNodeIds, readNodeIdsCsv, writeNodeIdsCsv } from "~/domain/nodeset/node-ids-csv";
import { Workbench } from "../../../support/command-harness";
import { choice, makeOperation } from "../../../support/random-operations";
import { makeNode, makeSpace, TEST_NAMESPACE } from "../../../support/small-standard";

const id = (identifier: number): NodeId => numericNodeId(TEST_NAMESPACE, identifier);

describe("policies", () => {
  const stockOf = (policy: IdPolicy, blocks: readonly IdBlock[], given: readonly string[] = []): IdStock => {
    const space = makeSpace();
    return new IdStock(() => space.withHeader({ ...space.own.header, idPolicy: policy }), blocks, given);
  };
  const ranges: IdPolicy = {
    kind: "ranges",
    ranges: { Variable: { from: 6000, to: 6007 }, Method: { from: 7000, to: 7999 } },
  };

  it("number by class, each in its range", () => {
    const stock = stockOf(ranges, [
      { from: 1000, to: 1999 },
      { from: 6000, to: 6007, nodeClass: "Variable" },
      { from: 7000, to: 7099, nodeClass: "Method" },
    ]);
    const given = (["Object", "Variable", "Method", "Variable"] as const).map((c) => stock.allocate(c));
    expect(given.map((r) => r.ok && r.value.identifier)).toEqual([1000, 6000, 7000, 6001]);
  });

  it("ask for blocks of the ranges that run low, and say when a range is used up", () => {
    const stock = stockOf(ranges, [{ from: 1000, to: 1999 }]);
    const below = 400;
    expect(stock.findWanted(below)).toEqual({ for: "Variable" });
    stock.addBlock({ from: 6000, to: 6007, nodeClass: "Variable" });
    expect(stock.findWanted(below)).toEqual({ for: "Method" });
    stock.addBlock({ from: 7000, to: 7099, nodeClass: "Method" });
    expect(stock.findWanted(below)).toBeUndefined();
    for (let i = 0; i < 8; i++) expect(stock.allocate("Variable").ok).toBe(true);
    stock.markUsedUp("Variable");
    expect(stock.findWanted(below)).toBeUndefined();
    expect(stock.allocate("Variable").problems.map((found) => found.code)).toEqual(["node-id.range-used-up"]);
    expect(stock.allocate("Object").ok).toBe(true);
  });

  it("drop what was leased for a range that is another one by now", () => {
    let policy = ranges;
    const space = makeSpace();
    const stock = new IdStock(
      () => space.withHeader({ ...space.own.header, idPolicy: policy }),
      [{ from: 6000, to: 6007, nodeClass: "Variable" }],
    );
    policy = { kind: "ranges", ranges: { Variable: { from: 6007, to: 6999 } } };
    expect(stock.findWanted(0)).toEqual({ for: "Variable" });
    expect(stock.addBlock({ from: 6000, to: 6005, nodeClass: "Variable" })).toBe(false);
    const next = stock.allocate("Variable");
    expect(next.ok && next.value.identifier).toBe(6007);
  });

  it("are refused where they cannot be used", () => {
    const codes = (policy: IdPolicy): string[] => checkIdPolicy(policy).map((found) => found.code);
    expect(codes({ kind: "paths", pattern: "Hall2", separator: "." })).toEqual(["id-policy.pattern"]);
    expect(codes({ kind: "ranges", ranges: { Object: { from: 9, to: 3 } } })).toEqual(["id-policy.range"]);
    const overlapping = { Object: { from: 1, to: 9 }, Method: { from: 9, to: 12 } };
    expect(codes({ kind: "ranges", ranges: overlapping })).toEqual(["id-policy.overlap"]);
    const bench = new Workbench();
    bench.do(setIdPolicy, { policy: { kind: "paths", pattern: "Hall2.{path}", separator: "." } });
    expect(bench.space.own.header.idPolicy).toEqual({ kind: "paths", pattern: "Hall2.{path}", separator: "." });
    expect(bench.refuse(setIdPolicy, { policy: { kind: "paths", pattern: "", separator: "." } })).toEqual([
      "id-policy.pattern",
    ]);
  });

  it("give no path again that somebody gave up, and begin paths as the pattern says", () => {
    const paths: IdPolicy = { kind: "paths", pattern: "Hall2.{path}", separator: "/" };
    const stock = stockOf(paths, [{ from: 1000, to: 1999 }], [`nsu=${TEST_NAMESPACE};s=Hall2.B1`]);
    const place = { space: makeSpace(), parent: standardKey(85), name: "B1" };
    const second = stock.allocate("Object", place);
    expect(second.ok && second.value.identifier).toBe("Hall2.B1_2");
    const type = stock.allocate("ObjectType", { ...place, parent: standardKey(58) });
    expect(type.ok && type.value.identifier).toBe(1000);
  });

  it("name nodes of machines by path and number types and what stands in them", () => {
    const bench = new Workbench();
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "GearboxType" });
    bench.do(addVariable, { parent: type, name: "Vibration", dataType: StandardDataType.Float });
    const ledger = new NodeIdLedger();
    const paths = new PathAllocator(TEST_NAMESPACE, ledger, bench.context);
    const make = (name: string, parent: NodeKey): NodeKey => {
      const result = instantiate(bench.space, paths, { type, parent, name });
      if (!result.ok) throw new Error("refused");
      for (const operation of result.value.operations) {
        const applied = applyOperation(bench.space, operation);
        if (applied.ok) bench.space = applied.value;
      }
      return result.value.made[0] as NodeKey;
    };
    const machine = make("B1", standardKey(85));
    make("Gearbox", machine);
    const texts = bench.space
      .listOwnNodes()
      .map((n) => n.nodeId)
      .filter((n) => n.type === "s")
      .map((n) => n.identifier);
    expect(texts).toEqual(["B1", "B1.Vibration", "B1.Gearbox", "B1.Gearbox.Vibration"]);
    for (const node of bench.space.listOwnNodes()) ledger.add(node.nodeId);
    const again = paths.allocate("Object", { space: makeSpace(), parent: undefined, name: "B1" });
    expect(again.ok && again.value.identifier).toBe("B1_2");
  });
});

describe("NodeIdLedger", () => {
  it("never lets an id be given twice through additions, deletions, renumbering and imports", () => {
    fc.assert(
      fc.property(fc.array(choice, { maxLength: 40 }), fc.array(fc.nat(40), { maxLength: 10 }), (choices, imported) => {
        const ledger = new NodeIdLedger();
        let space = makeSpace([1, 2].map((n) => makeNode(n, "Object")));
        for (const node of space.own.nodes.values()) ledger.add(node.nodeId);
        const allocator = new BlockAllocator(TEST_NAMESPACE, [{ from: 0, to: 2000 }], (nodeId) => ledger.has(nodeId));
        const everGiven: string[] = [];
        for (const made of choices) {
          const operation = makeOperation(space, made);
          const result = applyOperation(space, operation);
          if (!result.ok) continue;
          space = result.value;
          ledger.record([operation]);
          const fresh = allocator.allocate("Object");
          if (fresh.ok) {
            expect(space.findByNodeId(fresh.value)).toBeUndefined();
            everGiven.push(formatNodeId(fresh.value));
            ledger.add(fresh.value);
          }
        }
        for (const number of imported) ledger.add(id(number));
        const last = allocator.allocate("Object");
        if (last.ok) {
          everGiven.push(formatNodeId(last.value));
          expect(imported).not.toContain(last.value.identifier);
        }
        expect(new Set(everGiven).size).toBe(everGiven.length);
        expect(new NodeIdLedger(ledger.list()).list()).toEqual(ledger.list());
      }),
      { numRuns: 100 },
    );
  });
});

/** A server that leases and remembers as the real one does, without a database. */
class IdServer {
  readonly leased: { from: number; to: number }[] = [];
  readonly given = new Set<string>();
  highest = 0;

  lease(space: AddressSpace, wanted: BlockFor): IdBlock | undefined {
    const range = wanted && findRange(space.own.header.idPolicy ?? NUMBERS, wanted);
    const ids = [...this.given].flatMap((id) => Number(/;i=(\d+)$/.exec(id)?.[1] ?? []));
    const free = range
      ? findFree(range, [...this.leased, ...ids.map((number) => ({ from: number, to: number }))], 5)
      : { from: this.highest + 1, to: this.highest + 5 };
    if (!free) return undefined;
    this.highest = Math.max(this.highest, free.to);
    this.leased.push(free);
    return wanted ? { ...free, nodeClass: wanted } : free;
  }

  listPaths(): string[] {
    return [...this.given].filter((id) => /;s=/.test(id));
  }
}

describe("allocation", () => {
  const policies: readonly IdPolicy[] = [
    NUMBERS,
    { kind: "paths", pattern: "{path}", separator: "." },
    { kind: "ranges", ranges: { Object: { from: 3, to: 30 }, Variable: { from: 31, to: 60 } } },
    { kind: "ranges", ranges: { Object: { from: 20, to: 50 }, Method: { from: 1, to: 19 } } },
  ];
  const step = fc.record({
    what: fc.constantFrom("add", "add", "add", "fail", "remove", "import", "policy", "reload"),
    window: fc.nat(2),
    number: fc.nat(100),
    nodeClass: fc.constantFrom("Object" as const, "Variable" as const, "Method" as const),
    name: fc.constantFrom("B1", "B2", "Speed"),
  });

  it("never gives a NodeId twice: three windows, every policy, failed edits, deletions, imports, reloads", () => {
    fc.assert(
      fc.property(fc.array(step, { maxLength: 80 }), (steps) => {
        const server = new IdServer();
        let space = makeSpace();
        const open = (): IdStock => new IdStock(() => space, [], server.listPaths());
        const windows = [open(), open(), open()];
        const everGiven: string[] = [];
        const commit = (node: Node): void => {
          everGiven.push(formatNodeId(node.nodeId));
          server.given.add(formatNodeId(node.nodeId));
          const operation = { kind: "addNode" as const, node };
          const applied = applyOperation(space, operation);
          if (!applied.ok) throw new Error(JSON.stringify(applied.problems));
          space = applied.value;
          for (const stock of windows) stock.record([operation]);
        };
        for (const { what, window, number, nodeClass, name } of steps) {
          const stock = windows[window] ?? open();
          for (let wanted = stock.findWanted(3), i = 0; wanted && i < 20; wanted = stock.findWanted(3), i++) {
            const block = server.lease(space, wanted.for);
            if (block) stock.addBlock(block);
            else stock.markUsedUp(wanted.for);
          }
          if (what === "policy")
            space = space.withHeader({ ...space.own.header, idPolicy: policies[number % 4] ?? NUMBERS });
          if (what === "reload") windows[window] = open();
          const [first] = space.listOwnNodes();
          if (what === "remove" && first) space = space.withoutNode(first.key);
          const imported = makeNode(number + 1, "Object");
          const isFree = !server.given.has(formatNodeId(imported.nodeId));
          const isLeased = server.leased.some(({ from, to }) => number + 1 >= from && number + 1 <= to);
          if (what === "import" && isFree && !isLeased) {
            commit(imported);
            server.highest = Math.max(server.highest, number + 1);
          }
          if (what !== "add" && what !== "fail") continue;
          const nodeId = stock.allocate(nodeClass, { space, parent: standardKey(85), name });
          if (!nodeId.ok || what === "fail") continue;
          const key = toNodeKey(nodeId.value);
          commit({ ...makeNode(0, nodeClass), key, nodeId: nodeId.value, order: everGiven.length } as Node);
        }
        expect(new Set(everGiven).size).toBe(everGiven.length);
      }),
      { numRuns: 300 },
    );
  });
});

describe("renumberNodes", () => {
  const bench = new Workbench();
  const state = bench.do(addEnumeration, { name: "StateEnum", fields: [{ name: "Off", value: 0 }] });
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "MachineType" });
  const method = bench.do(addMethod, {
    parent: type,
    name: "SetState",
    inputArguments: [{ name: "State", dataType: state }],
  });

  it("rewrites the uses inside values and keeps keys and references", () => {
    const argumentsKey = bench.at(method, "InputArguments").key;
    const textOf = (): string => (bench.node(argumentsKey) as { value: { xml: string } }).value.xml;
    const old = formatNodeId(bench.node(state).nodeId);
    expect(textOf()).toContain(`<Identifier>${old}</Identifier>`);
    bench.do(renumberNodes, {
      changes: [
        { node: state, nodeId: id(3002) },
        { node: type, nodeId: id(1002) },
      ],
    });
    expect(textOf()).toContain(`<Identifier>nsu=${TEST_NAMESPACE};i=3002</Identifier>`);
    expect(textOf()).not.toContain(old);
    expect(bench.space.findByNodeId(id(1002))?.key).toBe(type);
    expect(bench.space.edgesFrom(type).map((e) => e.target)).toContain(method);
  });

  it("lets nodes exchange ids and pass them on in a circle, with the values that hold them, and takes it back", () => {
    const before = bench.space;
    const [first, second, third] = [state, type, method].map((key) => bench.node(key).nodeId);
    if (!first || !second || !third) throw new Error("No nodes");
    const argumentsKey = bench.at(method, "InputArguments").key;
    const textOf = (): string => (bench.node(argumentsKey) as { value: { xml: string } }).value.xml;
    bench.do(renumberNodes, {
      changes: [
        { node: state, nodeId: second },
        { node: type, nodeId: third },
        { node: method, nodeId: first },
      ],
    });
    expect([first, second, third].map((one) => bench.space.findByNodeId(one)?.key)).toEqual([method, state, type]);
    expect(textOf()).toContain(`<Identifier>${formatNodeId(second)}</Identifier>`);
    bench.do(renumberNodes, {
      changes: [
        { node: state, nodeId: first },
        { node: type, nodeId: second },
        { node: method, nodeId: third },
      ],
    });
    expect(bench.space.listOwnNodes()).toEqual(before.listOwnNodes());
  });

  it("refuses ids that are or were given, and other namespaces", () => {
    expect(bench.refuse(renumberNodes, { changes: [{ node: method, nodeId: id(1002) }] })).toEqual([
      "operation.node-id-taken",
    ]);
    const former = Number(String(type).split("i=")[1]);
    expect(bench.refuse(renumberNodes, { changes: [{ node: method, nodeId: id(former) }] })).toEqual([
      "operation.node-id-taken",
    ]);
    expect(bench.refuse(renumberNodes, { changes: [{ node: method, nodeId: numericNodeId("urn:x", 1) }] })).toEqual([
      "renumber.namespace",
    ]);
  });
});

describe("NodeIds CSV", () => {
  it("writes symbol, identifier and class, and brings the ids back into another model of the same structure", () => {
    const build = (bench: Workbench): void => {
      const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "MachineType" });
      const group = bench.do(addObject, { parent: type, name: "Process data" });
      bench.do(addVariable, { parent: group, name: "Speed", dataType: StandardDataType.Float });
      bench.do(addStructure, { name: "PointType", fields: [{ name: "X", dataType: StandardDataType.Double }] });
    };
    const one = new Workbench();
    build(one);
    const csv = writeNodeIdsCsv(one.space);
    // The form of the published lists, e.g. `Argument_Encoding_DefaultXml,297,Object` (OPC 10000-6 §A.3).
    expect(csv).toMatch(/^MachineType,\d+,ObjectType$/m);
    expect(csv).toMatch(/^MachineType_Process_data_Speed,\d+,Variable$/m);
    expect(csv).toMatch(/^PointType_Encoding_DefaultXml,\d+,Object$/m);
    const two = new Workbench();
    for (let i = 0; i < 4000; i++) two.context.allocate("Object");
    build(two);
    const rows = readNodeIdsCsv(csv, TEST_NAMESPACE);
    if (!rows.ok) throw new Error("not read");
    expect(rows.problems).toEqual([]);
    const plan = planNodeIds(two.space, rows.value);
    expect(plan.unknown).toEqual([]);
    expect(plan.unnamed).toEqual([]);
    two.do(renumberNodes, { changes: plan.changes });
    expect(writeNodeIdsCsv(two.space)).toBe(csv);
  });

  it("tells lines that it cannot use", () => {
    const text = 'A,1,Object\nB,2\n"C ""x""",s=a,Variable\nD,4294967296,Object\nE,5,Thing\nF,1,Object\n';
    const result = readNodeIdsCsv(text, TEST_NAMESPACE);
    if (!result.ok) throw new Error("not read");
    expect(result.value.map((r) => [r.symbol, r.nodeId.identifier, r.line])).toEqual([
      ["A", 1, 1],
      ['C "x"', "a", 3],
      ["F", 1, 6],
    ]);
    expect(result.problems.map((p) => [p.code, p.at?.line])).toEqual([
      ["node-ids.columns", 2],
      ["node-id.numeric-range", 4],
      ["node-ids.class", 5],
      ["node-ids.twice", 6],
    ]);
  });
});
