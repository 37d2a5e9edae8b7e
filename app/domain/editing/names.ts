/** Rules for names that the user types (OPC 10000-3 §8.3: at most 512 characters; §4.6.4, §5.5.2: siblings differ). */
import type { AddressSpace } from "../address-space/address-space";
import { listChildren } from "../address-space/browse";
import { isTypeNode } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { isSameQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { problem, type Problem } from "../core/result";

const MAX_NAME = 512;

/** Problems: `name.empty`, `name.too-long`, `name.control-character`. */
export function checkName(name: string): Problem | undefined {
  if (name.trim() === "") return problem("name.empty");
  if (name.length > MAX_NAME) return problem("name.too-long", { length: name.length, limit: MAX_NAME });
  if (hasControlCharacter(name)) return problem("name.control-character", { name });
  return undefined;
}

function hasControlCharacter(text: string): boolean {
  return [...text].some((c) => (c.codePointAt(0) as number) < 0x20);
}

/** Problem `name.taken` when another child of the parent has the BrowseName; `except` is the node that is renamed. */
export function checkSiblingName(
  space: AddressSpace,
  parent: NodeKey,
  browseName: QualifiedName,
  except?: NodeKey,
): Problem | undefined {
  const holder = listChildren(space, parent).find(
    (n) => n.key !== except && isSameQualifiedName(n.browseName, browseName),
  );
  return holder && problem("name.taken", { name: browseName.name }, { node: holder.key });
}

/** Problem `name.taken` when another own type of any class has the BrowseName (§5.2.4, §5.3.2). */
export function checkTypeName(space: AddressSpace, browseName: QualifiedName, except?: NodeKey): Problem | undefined {
  for (const node of space.own.nodes.values()) {
    if (!isTypeNode(node) || node.key === except || !isSameQualifiedName(node.browseName, browseName)) continue;
    return problem("name.taken", { name: browseName.name }, { node: node.key });
  }
  return undefined;
}
