import { standardKey, type NodeKey } from "../../address-space/node-id";
import { formatQualifiedName } from "../../address-space/qualified-name";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { findModellingRule, listSupertypes } from "../lookups";
import { getChildren, getMembers } from "../members";
import { clause, type NodeRule } from "../rule";
import type { NodeHead } from "../views";
import { StandardNode } from "../standard-nodes";

export const r083: NodeRule = {
  id: "R083",
  title: "An override goes through its direct parent",
  severity: "error",
  clause: clause(3, "§6.3.3.3"),
  priority: 2,
  concerns: ["ObjectType", "VariableType"],
  condition:
    "A nested declaration of a supertype is overridden only where the declarations on the way to it are overridden too.",
  why: "A node that a subtype hangs below the supertype's own declaration changes the supertype for everybody.",
  check(node, ctx, report) {
    const above = listSupertypes(ctx, node.key);
    if (above.length === 0) return;
    const inherited = new Set(above.flatMap((type) => [...getMembers(ctx, type).values()].map((m) => m.node.key)));
    for (const { target } of ctx.childEdges(node.key)) {
      // The subtype refers to the supertype's declaration itself and hangs own nodes below it.
      if (!inherited.has(target) || ctx.isOwn(target)) continue;
      const stray = findOwnChild(target, ctx);
      if (!stray) continue;
      report({
        key: stray.key,
        attribute: "references",
        message: `${stray.browseName.name} hangs below ${ctx.nameOf(target)} of a supertype, which ${node.browseName.name} does not override.`,
        facts: [
          `Parent: ${ctx.describe(target)}, declared by a supertype`,
          `Name looked for below ${node.browseName.name}: ${formatQualifiedName(stray.browseName)}`,
        ],
      });
    }
  },
  examples: {
    good: {
      text: "Parent and child overridden.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: m.object("Drive", { parent: pump, rule: "Mandatory" }), rule: "Optional" });
        const fast = m.objectType("FastPumpType", { supertype: pump });
        m.variable("Speed", { parent: m.object("Drive", { parent: fast, rule: "Mandatory" }), rule: "Mandatory" });
        return undefined;
      },
    },
    bad: {
      text: "A child of the standard's declaration.",
      build: (m) => {
        const type = m.objectType("PressStateMachineType", { supertype: STATE_MACHINE });
        m.reference(type, R.HasComponent, CURRENT_STATE);
        return m.property("Since", { parent: CURRENT_STATE, rule: "Optional" });
      },
    },
  },
};

function findOwnChild(parent: NodeKey, ctx: CheckContext): NodeHead | undefined {
  for (const same of getChildren(ctx, parent).values()) {
    const own = same.find((child) => ctx.isOwn(child.key) && findModellingRule(ctx, child.key) !== undefined);
    if (own) return own;
  }
  return undefined;
}

/** StateMachineType and its CurrentState in namespace 0. */
const STATE_MACHINE = StandardNode.StateMachineType;
const CURRENT_STATE = standardKey(2769);
