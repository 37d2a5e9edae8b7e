import { getDataType, hasValueAttributes, type VariableNode, type VariableTypeNode } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findChild, type ValueElement } from "../value-element";
import { isBuiltInText } from "../built-in-text";
import type { CheckContext } from "../check-context";
import { findAllowedBuiltIns, findDataTypeOf } from "../data-types";
import { scalar } from "../example-values";
import type { ReportFunction } from "../finding";
import { isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { either } from "../texts";
import { findTypeId, findValueRoot, isNil, listItemType } from "../value-xml";

export const r103: NodeRule = {
  id: "R103",
  title: "Value has the type of its DataType",
  severity: "error",
  clause: `${clause(3, "§5.6.2, §5.8.2, §5.8.3")}, ${clause(6, "§5.1.2, Table 1, §5.3.1.3, Table 33, §5.3.1.16, §5.3.1.19, §5.3.2, §5.3.3")}`,
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition:
    "The element is named after the built-in type of the DataType: Int32 for enumerations, ExtensionObject for structures with a TypeId of the DataType or a subtype; its text is a value of that type.",
  why: "Servers refuse the file or serve a value of another type than they declare, which clients decode wrongly or not at all.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const root = findValueRoot(node.value);
    if (!root || isNil(root)) return;
    const allowed = findAllowedBuiltIns(ctx, getDataType(node));
    if (allowed === undefined) return;
    const elements = listElements(root);
    const wrong =
      allowed === "any"
        ? undefined
        : elements.find((e) => !allowed.has(e.name) && !(e.name === "Variant" && allowed.size > 1));
    if (wrong && allowed !== "any") {
      const dataType = ctx.nameOf(getDataType(node));
      report({
        attribute: "value",
        message: `The Value of ${node.browseName.name} is ${wrong.name}, but values of ${dataType} are ${either([...allowed])}.`,
        facts: [
          `DataType: ${ctx.describe(getDataType(node))}`,
          `Element in Value: ${root.name}`,
          `Built-in type of the DataType: ${either([...allowed])}`,
        ],
        data: { found: wrong.name },
      });
      return;
    }
    const broken = elements.find((e) => !isNil(e) && !isBuiltInText(e));
    if (broken) {
      report({
        attribute: "value",
        message: `“${broken.text.trim().slice(0, 60)}” is no ${broken.name}, in the Value of ${node.browseName.name}.`,
        facts: [`Element: ${broken.name}`, `Text: “${broken.text.trim().slice(0, 200)}”`],
      });
    }
    checkTypeIds(node, elements, ctx, report);
  },
  examples: {
    good: {
      text: "A Double for Double.",
      build: (m) =>
        m.variable("Speed", { parent: m.object("Pump1"), dataType: D.Double, value: scalar("Double", 1.5) }),
    },
    bad: {
      text: "A text for Double.",
      build: (m) =>
        m.variable("Speed", { parent: m.object("Pump1"), dataType: D.Double, value: scalar("String", "1.5") }),
    },
  },
};

/** The single values: the element itself, the items of a list, the elements of a Matrix. An empty list has a type too. */
function listElements(root: ValueElement): readonly ValueElement[] {
  if (root.name === "Matrix") return findChild(root, "Elements")?.children ?? [];
  const item = listItemType(root);
  if (item === undefined) return [root];
  return root.children.length > 0 ? root.children : [];
}

function checkTypeIds(
  node: VariableNode | VariableTypeNode,
  elements: readonly ValueElement[],
  ctx: CheckContext,
  report: ReportFunction,
): void {
  const dataType = getDataType(node);
  if (dataType === D.BaseDataType || !isKindOf(ctx, dataType, D.Structure)) return;
  const seen = new Set<string>();
  for (const element of elements) {
    const text = findTypeId(element);
    if (text === undefined || seen.has(text)) continue;
    seen.add(text);
    const found = findDataTypeOf(ctx, text);
    if (found === undefined || !isChainLoaded(ctx, found) || isKindOf(ctx, found, dataType)) continue;
    report({
      attribute: "value",
      message: `The Value of ${node.browseName.name} holds a ${ctx.nameOf(found)}, but its DataType is ${ctx.nameOf(dataType)}.`,
      facts: [`TypeId: ${text}, which stands for ${ctx.describe(found)}`, `DataType: ${ctx.describe(dataType)}`],
    });
  }
}
