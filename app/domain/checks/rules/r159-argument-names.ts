import { StandardDataType as D } from "../../address-space/standard-ids";
import { readArguments } from "../arguments";
import { argumentList } from "../example-values";
import { clause, type NodeRule } from "../rule";

export const r159: NodeRule = {
  id: "R159",
  title: "Argument names unique in a Method",
  severity: "error",
  clause: clause(3, "§5.7.1"),
  priority: 1,
  concerns: ["Method"],
  needs: ["children"],
  condition: "Input and output arguments of a Method together have different names.",
  why: "Generated code has one variable for both, and argument descriptions cannot say which they mean.",
  check(node, ctx, report) {
    const inputs = readArguments(ctx, node.key, "InputArguments").map((a) => a.name);
    const outputs = readArguments(ctx, node.key, "OutputArguments").map((a) => a.name);
    const names = [...inputs, ...outputs];
    for (const name of new Set(names.filter((n, i) => n !== "" && names.indexOf(n) !== i))) {
      report({
        message: `Two arguments of ${node.browseName.name} are named ${name}.`,
        facts: [`Inputs: ${inputs.join(", ") || "none"}`, `Outputs: ${outputs.join(", ") || "none"}`],
      });
    }
  },
  examples: {
    good: {
      text: "Two names.",
      build: (m) =>
        void m.property("0:InputArguments", {
          parent: m.method("Start", { parent: m.object("Pump1") }),
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: D.Double }, { name: "Ramp", dataType: D.Double }),
        }),
    },
    bad: {
      text: "An input and an output of one name.",
      build: (m) => {
        const parent = m.method("Start", { parent: m.object("Pump1") });
        const value = argumentList({ name: "Speed", dataType: D.Double });
        m.property("0:InputArguments", { parent, dataType: D.Argument, valueRank: 1, value });
        m.property("0:OutputArguments", { parent, dataType: D.Argument, valueRank: 1, value });
        return parent;
      },
    },
  },
};
