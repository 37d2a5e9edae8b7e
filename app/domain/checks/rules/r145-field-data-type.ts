import type { DataTypeField } from "../../address-space/node";
import { getDataType, isAbstract } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { isChainLoaded, listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { addStructure, isStructure } from "../structures";

/** Abstract types whose values carry their own type anyway. */
const SELF_DESCRIBING: readonly NodeKey[] = [D.BaseDataType, D.Structure, D.Number, D.Integer, D.UInteger];

export const r145: NodeRule = {
  id: "R145",
  title: "DataType of structure fields",
  severity: "error",
  clause: `${clause(3, "§8.51")}, ${clause(6, "§F.13, Table F.14")}`,
  priority: 1,
  concerns: ["DataType"],
  condition:
    "Each field names a DataType. With BaseDataType, Structure, Number, Integer, UInteger or a simple type AllowSubTypes is left out; with any other abstract type it is true.",
  why: "An abstract type has no encoding of its own: without the flag nobody can read the field.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || !isStructure(ctx, node.key)) return;
    for (const field of node.definition?.fields ?? []) {
      const trouble = findTrouble(field, ctx);
      if (!trouble) continue;
      report({
        attribute: "definition",
        message: `The field ${field.name} of ${node.browseName.name} ${trouble.text}.`,
        facts: [`DataType: ${ctx.describe(getDataType(field))}`, `AllowSubTypes: ${field.allowSubTypes === true}`],
        data: { field: field.name, flag: trouble.flag },
      });
    }
  },
  fix: {
    label: "Set or clear AllowSubTypes",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const flag = finding.data?.["flag"];
      if (node?.nodeClass !== "DataType" || !node.definition || (flag !== "set" && flag !== "clear"))
        return notPossible(finding);
      const fields = node.definition.fields.map((f) =>
        f.name === finding.data?.["field"] ? { ...f, allowSubTypes: flag === "set" } : f,
      );
      return ok([setAttribute(node.key, "definition", { ...node.definition, fields })]);
    },
  },
  examples: {
    good: {
      text: "A Double.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Speed", dataType: D.Double }]),
    },
    bad: {
      text: "An abstract Structure of one's own without the flag.",
      build: (m) => {
        const step = m.dataType("StepDataType", { isAbstract: true, definition: { fields: [] } });
        return addStructure(m, "RecipeDataType", [{ name: "First", dataType: step }]);
      },
    },
  },
};

function findTrouble(field: DataTypeField, ctx: CheckContext): { text: string; flag: string } | undefined {
  const key = getDataType(field);
  const type = ctx.node(key);
  if (!type) {
    const namespace = ctx.namespaceOf(key);
    const isMissing = namespace === undefined || ctx.isNamespaceLoaded(namespace);
    return isMissing ? { text: "names a DataType that does not exist", flag: "" } : undefined;
  }
  if (type.nodeClass !== "DataType")
    return { text: `names the ${type.nodeClass} ${type.browseName.name} as its DataType`, flag: "" };
  if (!isChainLoaded(ctx, key)) return undefined;
  const isSimple = !listSupertypes(ctx, key).includes(D.Structure);
  if (SELF_DESCRIBING.includes(key) || (isSimple && key !== D.BaseDataType && !isAbstract(type))) {
    return field.allowSubTypes === true
      ? { text: "has AllowSubTypes, which is left out here", flag: "clear" }
      : undefined;
  }
  return isAbstract(type) && !isSimple && field.allowSubTypes !== true
    ? { text: "is of an abstract DataType and does not allow subtypes", flag: "set" }
    : undefined;
}
