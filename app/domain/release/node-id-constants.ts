/**
 * The NodeIds of a model as constants for programs. Names are the symbols of the NodeIds list (OPC 10000-6 §A.3), so that
 * both files name a node alike; values are NodeIds with the namespace's URI, since an index holds for one session only.
 */
import type { AddressSpace } from "../address-space/address-space";
import { formatNodeId } from "../address-space/node-id";
import { listSymbols } from "../nodeset/node-ids-csv";

type Constant = { readonly name: string; readonly nodeId: string };

function listConstants(space: AddressSpace): Constant[] {
  const taken = new Set<string>();
  return [...listSymbols(space)].map(([key, symbol]) => {
    const base = /^\d/.test(symbol) ? `_${symbol}` : symbol.replace(/[^A-Za-z0-9_]/g, "_") || "_";
    let name = base;
    for (let n = 2; taken.has(name); n++) name = `${base}_${n}`;
    taken.add(name);
    return { name, nodeId: formatNodeId(space.requireNode(key).nodeId) };
  });
}

/** Words that cannot be names of Python variables (The Python Language Reference §2.3.1). */
const PYTHON_KEYWORDS: ReadonlySet<string> = new Set(
  "False None True and as assert async await break class continue def del elif else except finally for from global if import in is lambda nonlocal not or pass raise return try while with yield".split(
    " ",
  ),
);

export function writeTypeScriptConstants(space: AddressSpace, title: string): string {
  const uri = space.own.header.models[0]?.modelUri ?? "";
  const lines = listConstants(space).map(({ name, nodeId }) => `  ${name}: ${JSON.stringify(nodeId)},`);
  return `/** NodeIds of ${toComment(title)}. */
export const NAMESPACE_URI = ${JSON.stringify(uri)};

export const NodeIds = {
${lines.join("\n")}
} as const;

/** The NodeId text for a session: the URI replaced by the index that the server gave it. */
export function toSessionNodeId(nodeId: string, namespaceArray: readonly string[]): string {
  const match = /^nsu=([^;]*);(.*)$/.exec(nodeId);
  if (!match) return nodeId;
  const index = namespaceArray.indexOf((match[1] ?? "").replace(/%3B/gi, ";").replace(/%25/g, "%"));
  if (index < 0) throw new RangeError(\`The server does not know the namespace of \${nodeId}\`);
  return \`ns=\${index};\${match[2]}\`;
}
`;
}

export function writePythonConstants(space: AddressSpace, title: string): string {
  const uri = space.own.header.models[0]?.modelUri ?? "";
  const lines = listConstants(space).map(
    ({ name, nodeId }) => `    ${PYTHON_KEYWORDS.has(name) ? `${name}_` : name} = ${JSON.stringify(nodeId)}`,
  );
  return `"""NodeIds of ${toComment(title).replace(/["\\]/g, "'")}."""

NAMESPACE_URI = ${JSON.stringify(uri)}


class NodeIds:
${lines.join("\n") || "    pass"}


def to_session_node_id(node_id, namespace_array):
    """The NodeId text for a session: the URI replaced by the index that the server gave it."""
    if not node_id.startswith("nsu="):
        return node_id
    uri, local = node_id[4:].split(";", 1)
    uri = uri.replace("%3B", ";").replace("%3b", ";").replace("%25", "%")
    return f"ns={list(namespace_array).index(uri)};{local}"
`;
}

function toComment(text: string): string {
  return text.replace(/\*\//g, "* /").replace(/\s+/g, " ");
}
