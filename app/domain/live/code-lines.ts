/**
 * Lines that read a node's value with general-purpose client libraries. The index of a namespace is the server's own matter,
 * so each line asks the server for it. JavaScript after the declarations of node-opcua; Python after asyncua, from memory.
 */
import { formatNodeIdWithIndex, OPC_UA_NAMESPACE, parseNodeId } from "../address-space/node-id";

export type CodeLine = { readonly language: "JavaScript" | "Python"; readonly text: string };

/** Stands for the index until the line is made; no server has as many namespaces. */
const PLACE = 65_535;

/** Lines for a NodeId text with `nsu=`; none when the text is no NodeId. */
export function makeCodeLines(nodeId: string): CodeLine[] {
  const parsed = parseNodeId(nodeId, []);
  if (!parsed.ok) return [];
  const { namespaceUri } = parsed.value;
  const uri = JSON.stringify(namespaceUri);
  const isBase = namespaceUri === OPC_UA_NAMESPACE;
  const text = JSON.stringify(formatNodeIdWithIndex(parsed.value, () => (isBase ? 0 : PLACE)));
  const ask = (open: string, close: string, index: string): string => text.replace(`ns=${PLACE};`, () => `ns=${open}${index}${close};`);
  const script = isBase ? text : ask('" + ', ' + "', `(await session.readNamespaceArray()).indexOf(${uri})`);
  const python = isBase ? text : `f${ask("{", "}", `await client.get_namespace_index('${namespaceUri}')`)}`;
  return [
    { language: "JavaScript", text: `(await session.read({ nodeId: ${script}, attributeId: 13 })).value.value` },
    { language: "Python", text: `await client.get_node(${python}).read_value()` },
  ];
}
