import type { DataTypeField, Node } from "../../address-space/node";
import { hasValueAttributes } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { findDataTypeOf, listFields } from "../data-types";
import { extensionObject } from "../example-values";
import { isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { findChild, type ValueElement } from "../value-element";
import { findBody, findTypeId, findValueRoot, listExtensionObjects } from "../value-xml";

const PLAIN = /^[A-Za-z]\w*$/;

export const r105: NodeRule = {
  id: "R105",
  title: "Fields of structures in values",
  severity: "error",
  clause: clause(6, "§5.3.5–§5.3.7, §5.1.13, §5.3.1.16"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["structure"],
  condition:
    "The body of a structure holds its fields by name in the order of the definition, inherited ones first; any may be left out. With optional fields an EncodingMask stands first, a Union has a SwitchField and one field.",
  why: "Readers take fields in order: one that is misspelt or out of place is lost, and what follows it too.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    for (const element of listExtensionObjects(findValueRoot(node.value))) {
      const body = findBody(element);
      const typeId = findTypeId(element);
      const dataType = typeId === undefined ? undefined : findDataTypeOf(ctx, typeId);
      if (!body || body.name === "ByteString" || dataType === undefined) continue;
      const trouble = findTrouble(body, dataType, ctx);
      if (trouble === undefined) continue;
      report({
        attribute: "value",
        message: `The ${ctx.nameOf(dataType)} in the Value of ${node.browseName.name} ${trouble}.`,
        facts: [
          `Elements: ${body.children.map((c) => c.name).join(", ") || "none"}`,
          `Fields of ${ctx.describe(dataType)}: ${listFields(ctx, dataType)
            .map((f) => f.name)
            .join(", ")}`,
        ],
      });
      return;
    }
  },
  examples: {
    good: {
      text: "Low before High.",
      build: (m) =>
        m.variable("Limits", {
          parent: m.object("Pump1"),
          dataType: D.Range,
          value: extensionObject("i=885", "<Range><Low>0</Low><High>1</High></Range>"),
        }),
    },
    bad: {
      text: "A field that Range does not have.",
      build: (m) =>
        m.variable("Limits", {
          parent: m.object("Pump1"),
          dataType: D.Range,
          value: extensionObject("i=885", "<Range><Low>0</Low><Top>1</Top></Range>"),
        }),
    },
  },
};

function findTrouble(body: ValueElement, dataType: NodeKey, ctx: CheckContext): string | undefined {
  const fields = listFields(ctx, dataType);
  const isDefined = isChainLoaded(ctx, dataType) && isKindOf(ctx, dataType, D.Structure) && fields.length > 0;
  // Names that XML cannot bear are transformed; these are not compared.
  if (!isDefined || fields.some((f) => !PLAIN.test(f.name)) || isKindOf(ctx, dataType, D.OptionSet)) return undefined;
  const node = ctx.node(dataType);
  if (isUnion(node)) return findUnionTrouble(body, fields);
  const hasOptional = fields.some((f) => f.isOptional);
  const elements = body.children.filter((c, i) => !(hasOptional && i === 0 && c.name === "EncodingMask"));
  let at = -1;
  for (const { name } of elements) {
    const index = fields.findIndex((f) => f.name === name);
    if (index < 0) return `has the unknown field ${name}`;
    if (index <= at) return `has the field ${name} out of order`;
    at = index;
  }
  return hasOptional ? findMaskTrouble(body, fields) : undefined;
}

function isUnion(node: Node | undefined): boolean {
  return node?.nodeClass === "DataType" && node.definition?.isUnion === true;
}

function findMaskTrouble(body: ValueElement, fields: readonly DataTypeField[]): string | undefined {
  const text = findChild(body, "EncodingMask")?.text.trim();
  const mask = Number(text ?? 0);
  const wrong = fields
    .filter((f) => f.isOptional)
    .find((f, bit) => (Math.floor(mask / 2 ** bit) % 2 === 1) !== body.children.some((c) => c.name === f.name));
  return wrong ? `has an EncodingMask that does not fit the optional field ${wrong.name}` : undefined;
}

function findUnionTrouble(body: ValueElement, fields: readonly DataTypeField[]): string | undefined {
  const chosen = Number(findChild(body, "SwitchField")?.text.trim() ?? 0);
  const present = body.children.filter((c) => c.name !== "SwitchField");
  const unknown = present.find((c) => !fields.some((f) => f.name === c.name));
  if (unknown) return `has the unknown field ${unknown.name}`;
  if (chosen === 0) return present.length > 0 ? "is a Union with a field but without SwitchField" : undefined;
  if (present.length === 1 && present[0]?.name === fields[chosen - 1]?.name) return undefined;
  return `is a Union whose SwitchField ${chosen} does not fit its fields`;
}
