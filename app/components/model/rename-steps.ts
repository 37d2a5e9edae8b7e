/** Renaming as people mean it: where the DisplayName says the BrowseName in words, it says the new one in words. Pure. */
import type { NodeKey } from "~/domain/address-space/node-id";
import { renameNode } from "~/domain/editing/commands/rename-node";
import { setText } from "~/domain/editing/commands/set-text";
import type { EditStep } from "./edit-steps";

export function toRenameStep(key: NodeKey, name: string): EditStep {
  return (space, context) => {
    const node = space.getNode(key);
    const told = node?.displayName.find((text) => text.text !== node.browseName.name && squeeze(text.text) === squeeze(node.browseName.name));
    const renamed = renameNode(space, context, { node: key, name });
    if (!renamed.ok || !told) return renamed;
    const spoken = setText(space, context, { node: key, attribute: "displayName", text: toWords(name), ...(told.locale === undefined ? {} : { locale: told.locale }) });
    if (!spoken.ok) return spoken;
    // The rename leaves this text alone, since it does not repeat the BrowseName letter by letter.
    return { ...renamed, value: { operations: [...renamed.value.operations, ...spoken.value.operations], made: [] } };
  };
}

function squeeze(text: string): string {
  return text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, "");
}

/** `GearboxTemperature` → `Gearbox temperature`; abbreviations in capitals stay. */
export function toWords(name: string): string {
  const words = name.split(/(?<=[\p{Ll}\p{N}])(?=\p{Lu})|(?<=\p{Lu})(?=\p{Lu}\p{Ll})|[\s_-]+/u).filter((word) => word !== "");
  return words.map((word, index) => (index === 0 || /^\p{Lu}{2,}/u.test(word) ? word : word.toLowerCase())).join(" ");
}
