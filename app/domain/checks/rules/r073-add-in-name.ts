import { getDataType } from "../../address-space/node";
import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D, StandardReferenceType as R } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { edgesDeclaredAt } from "../edges";
import { findModellingRule, findStandardProperty, findTypeDefinition, isChainLoaded, listSupertypes } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { findValueRoot, textOf } from "../value-xml";

export const r073: NodeRule = {
  id: "R073",
  title: "The type of an AddIn carries its default name",
  severity: "error",
  clause: clause(3, "§4.10.3, §5.5.2, Table 12"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasAddIn,
  condition:
    "The type of a HasAddIn target, or a supertype, has the Property 0:DefaultInstanceBrowseName of DataType QualifiedName without modelling rule; for a type of another model a warning. The AddIn should bear that name.",
  why: "Clients find an AddIn by its default name; without one they do not know what to look for.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasAddIn)) {
      const addIn = ctx.node(edge.target);
      const type = findTypeDefinition(ctx, edge.target);
      if (addIn?.nodeClass !== "Object" || type === undefined || !isChainLoaded(ctx, type)) continue;
      const facts = [
        `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
        `Type: ${ctx.describe(type)}`,
      ];
      const property = findDefaultName(ctx, type);
      const severity = ctx.isOwn(type) ? "error" : "warning";
      if (!property) {
        report({
          severity,
          message: `${ctx.nameOf(type)}, the type of the AddIn ${addIn.browseName.name}, has no DefaultInstanceBrowseName.`,
          facts,
        });
        continue;
      }
      if (
        ctx.isOwn(property.key) &&
        (findModellingRule(ctx, property.key) !== undefined ||
          (property.nodeClass === "Variable" && getDataType(property) !== D.QualifiedName))
      ) {
        report({
          message: `DefaultInstanceBrowseName of ${ctx.nameOf(type)} is not a QualifiedName without modelling rule.`,
          facts: [...facts, `Property: ${ctx.describe(property.key)}`],
        });
      }
      const wanted = property.nodeClass === "Variable" ? textOf(findValueRoot(property.value), "Name") : "";
      if (wanted !== "" && wanted !== addIn.browseName.name && ctx.isOwn(addIn.key)) {
        report({
          severity: "warning",
          message: `The AddIn ${addIn.browseName.name} does not bear the default name ${wanted}.`,
          facts: [...facts, `DefaultInstanceBrowseName: ${wanted}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "The type names its instances.",
      build: (m) => {
        const type = m.objectType("LubricationType");
        m.property("0:DefaultInstanceBrowseName", { parent: type, dataType: D.QualifiedName });
        m.object("Lubrication", { parent: m.object("Pump1"), reference: R.HasAddIn, type });
        return undefined;
      },
    },
    bad: {
      text: "The type does not.",
      build: (m) =>
        m.object("Lubrication", {
          parent: m.object("Pump1"),
          reference: R.HasAddIn,
          type: m.objectType("LubricationType"),
        }),
    },
  },
};

function findDefaultName(ctx: CheckContext, type: NodeKey): Node | undefined {
  for (const at of [type, ...listSupertypes(ctx, type)]) {
    const property = findStandardProperty(ctx, at, "DefaultInstanceBrowseName");
    if (property) return property;
  }
  return undefined;
}
