import type { Node } from "../../address-space/node";
import { findInheritedMember } from "../members";
import { attributeFix } from "../fixes";
import { clause, type NodeRule } from "../rule";

const ATTRIBUTES = [
  "description",
  "arrayDimensions",
  "minimumSamplingInterval",
  "rolePermissions",
  "accessRestrictions",
] as const;

export const r085: NodeRule = {
  id: "R085",
  title: "Attributes of the inherited declaration stay provided",
  severity: "error",
  clause: clause(3, "§6.3.3.3"),
  priority: 2,
  concerns: ["Object", "Variable", "Method"],
  needs: ["member of type"],
  condition:
    "An override provides every optional attribute that the inherited declaration provides: Description, ArrayDimensions, MinimumSamplingInterval, RolePermissions, AccessRestrictions.",
  why: "Clients of the base type rely on the attribute; on the subtype it answers “attribute invalid”.",
  check(node, ctx, report) {
    for (const { source } of ctx.parentEdges(node.key)) {
      const owner = ctx.classOf(source);
      if (owner !== "ObjectType" && owner !== "VariableType") continue;
      const inherited = findInheritedMember(ctx, source, node.browseName)?.node;
      const base = inherited && inherited.key !== node.key ? ctx.node(inherited.key) : undefined;
      if (base?.nodeClass !== node.nodeClass) continue;
      for (const attribute of ATTRIBUTES) {
        if (!isGiven(base, attribute) || isGiven(node, attribute)) continue;
        report({
          attribute,
          message: `${node.browseName.name} overrides a declaration that has ${nameOf(attribute)} and has none.`,
          facts: [`Inherited: ${ctx.describe(base.key)} with ${nameOf(attribute)}`, `Here: no ${nameOf(attribute)}`],
          data: { base: base.key },
        });
      }
    }
  },
  fix: {
    label: "Copy the attribute from the inherited declaration",
    apply(space, finding, ids) {
      const attribute = ATTRIBUTES.find((a) => a === finding.attribute) ?? "description";
      const base = finding.data?.["base"];
      return attributeFix("", attribute, () =>
        typeof base === "string" ? valueOf(space.getNode(base as Node["key"]), attribute) : undefined,
      ).apply(space, finding, ids);
    },
  },
  examples: {
    good: {
      text: "The override has a Description too.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        const set = { description: [{ text: "Speed of the shaft." }] };
        m.variable("Speed", { parent: pump, rule: "Optional", set });
        m.variable("Speed", { parent: m.objectType("FastPumpType", { supertype: pump }), rule: "Mandatory", set });
        return undefined;
      },
    },
    bad: {
      text: "The override drops it.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", {
          parent: pump,
          rule: "Optional",
          set: { description: [{ text: "Speed of the shaft." }] },
        });
        return m.variable("Speed", { parent: m.objectType("FastPumpType", { supertype: pump }), rule: "Mandatory" });
      },
    },
  },
};

function valueOf(node: Node | undefined, attribute: (typeof ATTRIBUTES)[number]): unknown {
  return (node as Partial<Record<string, unknown>> | undefined)?.[attribute];
}

function isGiven(node: Node, attribute: (typeof ATTRIBUTES)[number]): boolean {
  const value = valueOf(node, attribute);
  return value !== undefined && value !== "" && !(Array.isArray(value) && value.length === 0);
}

function nameOf(attribute: string): string {
  return attribute.charAt(0).toUpperCase() + attribute.slice(1);
}
