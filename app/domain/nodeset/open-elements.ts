/** Makes the drafts of elements with attributes: nodes, definitions and their fields, models. */
import type { NodeClass } from "../address-space/node";
import { OPC_UA_NAMESPACE } from "../address-space/node-id";
import { problem } from "../core/result";
import { DEFINITION_ATTRIBUTES, FIELD_ATTRIBUTES, MODEL_ATTRIBUTES, NODE_ATTRIBUTES } from "./attribute-tables";
import { NodeBuilder, type DefinitionDraft, type FieldDraft } from "./node-builder";
import type { ReadContext } from "./read-context";
import type { Attributes } from "./xml/scan-xml";

const NODE_HANDLED: readonly string[] = ["NodeId", "BrowseName"];
const NAME_HANDLED: readonly string[] = ["Name"];
const MODEL_HANDLED: readonly string[] = ["ModelUri"];

/**
 * Opens a node. Undefined when it has no usable NodeId, or one that `findOffset` knows already: it cannot be kept then,
 * which is reported.
 */
export function openNode(
  context: ReadContext,
  element: {
    readonly name: string;
    readonly nodeClass: NodeClass;
    readonly attributes: Attributes;
    readonly start: number;
  },
  order: number,
  findOffset: (node: NodeBuilder) => number | undefined,
): NodeBuilder | undefined {
  const { name: elementName, nodeClass, attributes, start } = element;
  context.node = undefined;
  const idText = attributes["NodeId"];
  if (idText === undefined) context.reportMissing(elementName, "NodeId", start);
  const nodeId = idText === undefined ? undefined : context.take(context.ids.parseOwn(idText), start, "NodeId");
  const nameText = attributes["BrowseName"];
  if (nameText === undefined) context.reportMissing(elementName, "BrowseName", start);
  const name = context.take(context.ids.parseName(nameText ?? ""), start, "BrowseName");
  if (nodeId === undefined) return undefined;
  const browseName = name ?? { namespaceUri: OPC_UA_NAMESPACE, name: nameText ?? "" };
  const node = new NodeBuilder(nodeClass, nodeId, browseName, order);
  const known = findOffset(node);
  if (known !== undefined || node.isNull()) {
    const data = { nodeId: node.nodeIdText, firstLine: known === undefined ? 0 : context.at(known).line };
    const code = known === undefined ? "nodeset.null-node-id" : "nodeset.duplicate-node-id";
    context.report(problem(code, data), start, "NodeId");
    return undefined;
  }
  context.node = node;
  if (isDigit(browseName.name.charCodeAt(0)) && /^\d+:/.test(browseName.name)) {
    context.report(problem.warning("nodeset.browse-name-prefix", { name: browseName.name }), start, "BrowseName");
  }
  const others = context.readInto(node.fields, attributes, NODE_ATTRIBUTES[nodeClass], NODE_HANDLED, start);
  if (others) node.fields.otherAttributes = others;
  return node;
}

export function openDefinition(context: ReadContext, attributes: Attributes, start: number): void {
  const text = attributes["Name"];
  if (text === undefined) context.reportMissing("Definition", "Name", start);
  const name = context.take(context.ids.parseName(text ?? ""), start, "Name");
  const definition: DefinitionDraft = {
    name: name ?? { namespaceUri: OPC_UA_NAMESPACE, name: text ?? "" },
    fields: [],
  };
  const others = context.readInto(definition, attributes, DEFINITION_ATTRIBUTES, NAME_HANDLED, start);
  if (others) definition.otherAttributes = others;
  context.definition = definition;
}

export function openField(context: ReadContext, attributes: Attributes, start: number): void {
  if (attributes["Name"] === undefined) context.reportMissing("Field", "Name", start);
  const field: FieldDraft = { name: attributes["Name"] ?? "" };
  const others = context.readInto(field, attributes, FIELD_ATTRIBUTES, NAME_HANDLED, start);
  if (others) field.otherAttributes = others;
  context.field = field;
  context.definition?.fields.push(field);
}

export function openModel(context: ReadContext, element: string, attributes: Attributes, start: number): void {
  const fields: Record<string, unknown> = {};
  const otherAttributes = context.readInto(fields, attributes, MODEL_ATTRIBUTES, MODEL_HANDLED, start);
  const modelUri = attributes["ModelUri"];
  if (modelUri === undefined) context.reportMissing(element, "ModelUri", start);
  context.models.push({
    fields,
    modelUri: modelUri ?? "",
    offset: start,
    requiredModels: [],
    otherAttributes,
    roles: undefined,
    otherElements: undefined,
  });
}

function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}
