import { getDataType } from "../../address-space/node";
import { StandardDataType as D, StandardModellingRule as M } from "../../address-space/standard-ids";
import { readArguments, toKey } from "../arguments";
import { edgesDeclaredAt } from "../edges";
import { argumentList } from "../example-values";
import { findModellingRule, isInstanceDeclaration } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r060: NodeRule = {
  id: "R060",
  title: "Argument descriptions fit their arguments",
  severity: "error",
  clause: clause(3, "§5.7.1, Table 15, §5.7.2"),
  priority: 2,
  concerns: ALL_CLASSES,
  declares: N.HasArgumentDescription,
  condition:
    "HasArgumentDescription leads from a Method to a Variable that is named like one of its arguments and has its DataType, one for each argument; on declarations it is Mandatory.",
  why: "The description tells unit and range of an argument; one that fits no argument, or another, misleads whoever calls the Method.",
  check(node, ctx, report) {
    for (const { source, target } of edgesDeclaredAt(node, ctx, N.HasArgumentDescription)) {
      const method = ctx.node(source);
      const variable = ctx.node(target);
      if (!method || !variable) continue;
      const facts = [`HasArgumentDescription from ${ctx.describe(source)} to ${ctx.describe(target)}`];
      const name = variable.browseName.name;
      if (method.nodeClass !== "Method" || variable.nodeClass !== "Variable") {
        report({
          attribute: "references",
          message: `HasArgumentDescription joins the ${method.nodeClass} ${method.browseName.name} with the ${variable.nodeClass} ${name}.`,
          facts: [...facts, "Allowed: from a Method to a Variable"],
        });
        continue;
      }
      const found = [
        ...readArguments(ctx, source, "InputArguments"),
        ...readArguments(ctx, source, "OutputArguments"),
      ].filter((a) => a.name === name);
      const [argument] = found;
      if (!argument) {
        report({
          attribute: "references",
          message: `${method.browseName.name} has no argument ${name} to describe.`,
          facts: [...facts, "Arguments with this name: 0"],
        });
      } else if (
        argument.dataType !== "" &&
        toKey(ctx, argument.dataType) !== undefined &&
        toKey(ctx, argument.dataType) !== getDataType(variable)
      ) {
        report({
          attribute: "references",
          message: `The description of ${name} has another DataType than the argument.`,
          facts: [...facts, `Argument: ${argument.dataType}`, `Description: ${ctx.describe(getDataType(variable))}`],
        });
      }
      if (isInstanceDeclaration(ctx, target) && findModellingRule(ctx, target) !== M.Mandatory) {
        report({
          attribute: "references",
          message: `The description of ${name} is not Mandatory.`,
          facts: [...facts, "On instance declarations argument descriptions are Mandatory."],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Name and DataType of the argument.",
      build: (m) => {
        const parent = m.method("Start", { parent: m.object("Pump1") });
        m.property("0:InputArguments", {
          parent,
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: D.Double }),
        });
        m.variable("Speed", { parent, reference: N.HasArgumentDescription, dataType: D.Double });
        return undefined;
      },
    },
    bad: {
      text: "A name that no argument has.",
      build: (m) => {
        const parent = m.method("Start", { parent: m.object("Pump1") });
        m.property("0:InputArguments", {
          parent,
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: D.Double }),
        });
        return m.variable("Velocity", { parent, reference: N.HasArgumentDescription, dataType: D.Double });
      },
    },
  },
};
