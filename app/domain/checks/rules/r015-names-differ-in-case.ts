import type { Node } from "../../address-space/node";
import { ALL_CLASSES } from "../node-classes";
import { type NodeRule } from "../rule";
import { isSameQualifiedName } from "../../address-space/qualified-name";

export const r015: NodeRule = {
  id: "R015",
  title: "Names equal except for letter case",
  severity: "hint",
  clause: "common practice, no source (OPC 10000-3 v1.05.06 §5.2.4 says only that case counts)",
  priority: 2,
  concerns: ALL_CLASSES,
  condition: "No two siblings and no two fields of a DataType differ in letter case only.",
  why: "People read them as one name, and tools without regard to case overwrite one with the other.",
  check(node, ctx, report) {
    const edges = ctx.childEdges(node.key);
    const seen = new Map<string, Node>();
    for (const { target } of edges.length < 2 ? [] : edges) {
      const child = ctx.node(target);
      if (!child) continue;
      const folded = child.browseName.name.toLowerCase();
      const twin = seen.get(folded);
      if (!twin) seen.set(folded, child);
      else if (
        twin.key !== child.key &&
        twin.browseName.name !== child.browseName.name &&
        !isSameQualifiedName(twin.browseName, child.browseName)
      ) {
        report({
          message: `${node.browseName.name} has the children ${twin.browseName.name} and ${child.browseName.name}, which differ in letter case only.`,
          facts: [`One: ${ctx.describe(twin.key)}`, `The other: ${ctx.describe(child.key)}`],
        });
      }
    }
    if (node.nodeClass !== "DataType") return;
    const fields = new Map<string, string>();
    for (const { name } of node.definition?.fields ?? []) {
      const twin = fields.get(name.toLowerCase());
      if (twin === undefined) fields.set(name.toLowerCase(), name);
      else if (twin !== name) {
        report({
          attribute: "definition",
          message: `${node.browseName.name} has the fields ${twin} and ${name}, which differ in letter case only.`,
          facts: [`Fields: ${twin}, ${name}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Two names that differ.",
      build: (m) => {
        const parent = m.object("Pump1");
        m.variable("Speed", { parent });
        m.variable("SpeedReference", { parent });
        return undefined;
      },
    },
    bad: {
      text: "speed and Speed.",
      build: (m) => {
        const parent = m.object("Pump1");
        m.variable("Speed", { parent });
        m.variable("speed", { parent });
        return parent;
      },
    },
  },
};
