import { StandardDataType as D } from "../../address-space/standard-ids";
import { readArguments } from "../arguments";
import { argumentList } from "../example-values";
import { ofType } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r061: NodeRule = {
  id: "R061",
  title: "Optional arguments come last",
  severity: "error",
  clause: clause(3, "§5.7.3"),
  priority: 2,
  concerns: ["Method"],
  needs: ["children"],
  condition: "Input arguments that HasOptionalInputArgumentDescription describes stand behind all others.",
  why: "A caller leaves arguments out at the end only; one in the middle cannot be left out.",
  check(node, ctx, report) {
    const described = ofType(
      ctx,
      [...ctx.childEdges(node.key), ...ctx.otherEdges(node.key)],
      N.HasOptionalInputArgumentDescription,
    );
    if (described.length === 0) return;
    const optional = new Set(described.map((e) => ctx.node(e.target)?.browseName.name));
    const names = readArguments(ctx, node.key, "InputArguments").map((a) => a.name);
    const first = names.findIndex((name) => optional.has(name));
    const late = first < 0 ? undefined : names.slice(first).find((name) => !optional.has(name));
    if (late === undefined) return;
    report({
      message: `The argument ${late} of ${node.browseName.name} stands behind an optional one.`,
      facts: [`Order: ${names.map((name) => (optional.has(name) ? `${name} (optional)` : name)).join(", ")}`],
    });
  },
  examples: {
    good: {
      text: "The optional one is last.",
      build: (m) => {
        const parent = m.method("Start", { parent: m.object("Pump1") });
        const value = argumentList({ name: "Speed", dataType: D.Double }, { name: "Ramp", dataType: D.Double });
        m.property("0:InputArguments", { parent, dataType: D.Argument, valueRank: 1, value });
        m.variable("Ramp", { parent, reference: N.HasOptionalInputArgumentDescription, dataType: D.Double });
        return undefined;
      },
    },
    bad: {
      text: "The optional one is first.",
      build: (m) => {
        const parent = m.method("Start", { parent: m.object("Pump1") });
        const value = argumentList({ name: "Ramp", dataType: D.Double }, { name: "Speed", dataType: D.Double });
        m.property("0:InputArguments", { parent, dataType: D.Argument, valueRank: 1, value });
        m.variable("Ramp", { parent, reference: N.HasOptionalInputArgumentDescription, dataType: D.Double });
        return parent;
      },
    },
  },
};
