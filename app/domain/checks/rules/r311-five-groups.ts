import type { ObjectNode } from "../../address-space/node";
import { numericNodeId, toNodeKey, type NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import type { ExampleModel } from "../example-model";
import type { NodeRule } from "../rule";

/** The Machines object of OPC 40001-1, which organises the machines of a server. */
const MACHINES = toNodeKey(numericNodeId("http://opcfoundation.org/UA/Machinery/", 1001));

/** Words by which the five groups go; a group is an Object of the machine. */
const GROUPS: readonly (readonly [name: string, words: RegExp])[] = [
  ["process data", /process|production/i],
  ["environment", /environment|ambient/i],
  ["configuration", /configuration|settings|parameter/i],
  ["energy consumption", /energy|power|consumption/i],
  ["present status", /status|state/i],
];

export const r311: NodeRule = {
  id: "R311",
  title: "A machine publishes the five groups",
  severity: "hint",
  clause: "common practice, no source",
  priority: 2,
  concerns: ["Object"],
  condition:
    "A machine below the Machines object has groups for process data, environment, configuration, energy consumption and present status.",
  why: "Energy boards, maintenance planners and trend pages ask every machine for the same groups, and miss this one in theirs.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Object" || !isMachine(node, ctx)) return;
    const names = ctx.childEdges(node.key).flatMap(({ target }) => {
      const child = ctx.node(target);
      return child?.nodeClass === "Object" ? [child.browseName.name] : [];
    });
    const missing = GROUPS.filter(([, words]) => !names.some((name) => words.test(name))).map(([name]) => name);
    if (missing.length === 0) return;
    report({
      message: `The machine ${node.browseName.name} has no group for ${missing.join(", ")}.`,
      facts: [
        `Its Objects: ${names.join(", ") || "none"}`,
        "The five groups: process data, environment, configuration, energy consumption, present status",
      ],
    });
  },
  examples: {
    good: {
      text: "All five.",
      build: (m) => addMachine(m, ["Process", "Environment", "Configuration", "Energy", "Status"]),
    },
    bad: { text: "Two of five.", build: (m) => addMachine(m, ["Process", "Status"]) },
  },
};

function addMachine(m: ExampleModel, groups: readonly string[]): NodeKey {
  const machine = m.object("Press1", { parent: MACHINES, reference: R.Organizes });
  for (const name of groups) m.object(name, { parent: machine });
  return machine;
}

function isMachine(node: ObjectNode, ctx: CheckContext): boolean {
  const types = ctx.closure(R.Organizes);
  return ctx
    .parentEdges(node.key)
    .some((e) => e.source === MACHINES && (types.has(e.type) || ctx.closure(R.HasComponent).has(e.type)));
}
