import { getDataType, getValueRank, hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { listFields } from "../data-types";
import { edgesDeclaredAt } from "../edges";
import { isChainLoaded, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r062: NodeRule = {
  id: "R062",
  title: "Components of a structured Variable",
  severity: "error",
  clause: clause(3, "§7.22.1"),
  priority: 2,
  concerns: ALL_CLASSES,
  declares: N.HasStructuredComponent,
  condition:
    "HasStructuredComponent leads from a Variable of a Structure to Variables named like its fields, with their DataType and ValueRank; below an array they are named like the parent with the index in brackets.",
  why: "Clients take the component for the field of its name and read another value.",
  check(node, ctx, report) {
    for (const { source, target } of edgesDeclaredAt(node, ctx, N.HasStructuredComponent)) {
      const parent = ctx.node(source);
      const child = ctx.node(target);
      if (!parent || child?.nodeClass !== "Variable") continue;
      const facts = [`HasStructuredComponent from ${ctx.describe(source)} to ${ctx.describe(target)}`];
      const name = child.browseName.name;
      if (
        !hasValueAttributes(parent) ||
        (isChainLoaded(ctx, getDataType(parent)) && !isKindOf(ctx, getDataType(parent), D.Structure))
      ) {
        report({ attribute: "references", message: `${parent.browseName.name} is no Variable of a Structure.`, facts });
        continue;
      }
      if (getValueRank(parent) >= 0) {
        if (name.startsWith(`${parent.browseName.name}[`)) continue;
        report({
          attribute: "references",
          message: `${name} should be named ${parent.browseName.name} with an index in brackets.`,
          facts: [...facts, `ValueRank of the parent: ${getValueRank(parent)}`],
        });
        continue;
      }
      const field = listFields(ctx, getDataType(parent)).find((f) => f.name === name);
      if (!field && isChainLoaded(ctx, getDataType(parent))) {
        report({
          attribute: "references",
          message: `${ctx.nameOf(getDataType(parent))} has no field ${name}.`,
          facts: [
            ...facts,
            `Fields: ${
              listFields(ctx, getDataType(parent))
                .map((f) => f.name)
                .join(", ") || "none"
            }`,
          ],
        });
      } else if (
        field &&
        (!isKindOf(ctx, getDataType(child), getDataType(field)) || getValueRank(field) !== getValueRank(child))
      ) {
        report({
          attribute: "references",
          message: `${name} has another DataType or ValueRank than the field.`,
          facts: [
            ...facts,
            `Field: ${ctx.nameOf(getDataType(field))}, rank ${getValueRank(field)}`,
            `Variable: ${ctx.nameOf(getDataType(child))}, rank ${getValueRank(child)}`,
          ],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Low of a Range.",
      build: (m) =>
        m.variable("Low", {
          parent: m.variable("Limits", { parent: m.object("Pump1"), dataType: D.Range }),
          reference: N.HasStructuredComponent,
        }),
    },
    bad: {
      text: "A name that no field has.",
      build: (m) =>
        m.variable("Limits_Low", {
          parent: m.variable("Limits", { parent: m.object("Pump1"), dataType: D.Range }),
          reference: N.HasStructuredComponent,
        }),
    },
  },
};
