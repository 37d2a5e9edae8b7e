import { isAbstract } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { readArguments, toKey, type ArgumentValue } from "../arguments";
import type { CheckContext } from "../check-context";
import type { ExampleModel } from "../example-model";
import { argumentList } from "../example-values";
import { isKindOf, ofType } from "../lookups";
import { findInheritedMember, isPlaceholder } from "../members";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r162: NodeRule = {
  id: "R162",
  title: "An overridden Method keeps its arguments",
  severity: "error",
  clause: clause(3, "§6.3.3.3, §6.2.4, §6.4.4.4.4, §6.4.4.4.5"),
  priority: 1,
  concerns: ["Method"],
  condition:
    "A Method of a subtype has the arguments of the inherited one in order; abstract DataTypes may become special, optional arguments may be added.",
  why: "Clients call with the arguments of the base type and are refused.",
  check(node, ctx, report) {
    for (const { source } of ctx.parentEdges(node.key)) {
      if (ctx.classOf(source) !== "ObjectType") continue;
      const base = findInheritedMember(ctx, source, node.browseName);
      if (!base || base.node.key === node.key || base.node.nodeClass !== "Method" || isPlaceholder(base.rule)) continue;
      for (const property of ["InputArguments", "OutputArguments"] as const) {
        const before = readArguments(ctx, base.node.key, property);
        const after = readArguments(ctx, node.key, property);
        const trouble = findTrouble(before, after, listOptional(ctx, node.key), ctx);
        if (trouble === undefined) continue;
        report({
          message: `${property} of ${node.browseName.name} do not fit the inherited Method: ${trouble}.`,
          facts: [`Inherited: ${describeAll(before)}, ${ctx.describe(base.node.key)}`, `Here: ${describeAll(after)}`],
        });
      }
    }
  },
  examples: {
    good: { text: "The same argument.", build: (m) => void addMethods(m, ["Speed"], ["Speed"]) },
    bad: { text: "One more that is not optional.", build: (m) => addMethods(m, ["Speed"], ["Speed", "Ramp"]) },
  },
};

function addMethods(m: ExampleModel, before: readonly string[], after: readonly string[]): NodeKey {
  const pump = m.objectType("PumpType");
  const add = (type: NodeKey, names: readonly string[]): NodeKey => {
    const parent = m.method("Start", { parent: type, rule: "Mandatory" });
    const value = argumentList(...names.map((name) => ({ name, dataType: D.Double })));
    m.property("0:InputArguments", {
      parent,
      dataType: D.Argument,
      valueRank: 1,
      arrayDimensions: "0",
      value,
      rule: "Mandatory",
    });
    return parent;
  };
  add(pump, before);
  return add(m.objectType("FastPumpType", { supertype: pump }), after);
}

function listOptional(ctx: CheckContext, method: NodeKey): Set<string> {
  const edges = ofType(
    ctx,
    [...ctx.childEdges(method), ...ctx.otherEdges(method)],
    N.HasOptionalInputArgumentDescription,
  );
  return new Set(edges.map((e) => ctx.nameOf(e.target)));
}

function findTrouble(
  before: readonly ArgumentValue[],
  after: readonly ArgumentValue[],
  optional: ReadonlySet<string>,
  ctx: CheckContext,
): string | undefined {
  for (const [i, argument] of before.entries()) {
    const own = after[i];
    if (!own) return `${argument.name} is missing`;
    if (own.name !== argument.name) return `${argument.name} became ${own.name}`;
    const [wide, narrow] = [toKey(ctx, argument.dataType), toKey(ctx, own.dataType)];
    if (wide === undefined || narrow === undefined || wide === narrow) continue;
    const type = ctx.node(wide);
    if (!type || !isAbstract(type) || !isKindOf(ctx, narrow, wide)) return `${argument.name} has another DataType`;
  }
  const added = after.slice(before.length).find((a) => !optional.has(a.name));
  return added && `${added.name} was added and is not optional`;
}

function describeAll(list: readonly ArgumentValue[]): string {
  return list.map((a) => `${a.name} ${a.dataType}`).join(", ") || "none";
}
