import { addEnumeration, findVariable, isEnumeration, listEnumValues, valueOf } from "../enumerations";
import { clause, type NodeRule } from "../rule";

const LOW = -2147483648;
const HIGH = 2147483647;

export const r142: NodeRule = {
  id: "R142",
  title: "Enumeration values unique and Int32",
  severity: "error",
  clause: clause(3, "§8.39, §8.52"),
  priority: 1,
  concerns: ["DataType"],
  condition:
    "Values and names of an enumeration's fields are unique, the values in EnumValues too, and all are 32-bit integers.",
  why: "Two names for one value cannot be told apart; a larger value does not fit into the encoding.",
  check(node, ctx, report) {
    const fields = node.nodeClass === "DataType" ? (node.definition?.fields ?? []) : [];
    if (!isEnumeration(ctx, node.key)) return;
    const name = node.browseName.name;
    const values = fields.map(valueOf);
    const property = findVariable(ctx, node.key, "EnumValues");
    const listed = property ? listEnumValues(property).map((p) => p.value) : [];
    const twice = values.find((v, i) => values.indexOf(v) !== i);
    const attribute = "definition";
    if (twice !== undefined)
      report({
        attribute,
        message: `The value ${twice} stands twice in ${name}.`,
        facts: fields.filter((f) => valueOf(f) === twice).map((f) => `${f.name}: ${twice}`),
      });
    const names = fields.map((f) => f.name);
    const double = names.find((n, i) => names.indexOf(n) !== i);
    if (double !== undefined)
      report({
        attribute,
        message: `The name ${double} stands twice in ${name}.`,
        facts: [`Names: ${names.join(", ")}`],
      });
    const twiceListed = listed.find((v, i) => listed.indexOf(v) !== i);
    if (twiceListed !== undefined)
      report({
        attribute: "value",
        message: `The value ${twiceListed} stands twice in EnumValues of ${name}.`,
        facts: [`EnumValues: ${listed.join(", ")}`],
      });
    const large = [...values, ...listed.map(Number)].find((v) => !Number.isInteger(v) || v < LOW || v > HIGH);
    if (large !== undefined)
      report({
        attribute,
        message: `The value ${large} of ${name} is no 32-bit integer.`,
        facts: [`Value: ${large}`, "Allowed: −2147483648 … 2147483647"],
      });
  },
  examples: {
    good: {
      text: "0 and 1.",
      build: (m) =>
        addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "On", value: 1 },
        ]),
    },
    bad: {
      text: "0 twice.",
      build: (m) =>
        addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "On", value: 0 },
        ]),
    },
  },
};
