/** Find and replace in names and descriptions of own nodes: what would change, and the steps that change it. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { setText } from "~/domain/editing/commands/set-text";
import type { EditStep } from "./edit-steps";
import { toRenameStep } from "./rename-steps";

export type ReplaceField = "name" | "displayName" | "description";

export type ReplaceQuestion = {
  readonly find: string;
  readonly replacement: string;
  readonly isRegex: boolean;
  readonly matchesCase: boolean;
  readonly fields: ReadonlySet<ReplaceField>;
};

export type Replacement = {
  readonly key: NodeKey;
  readonly field: ReplaceField;
  /** Of a display name or description; undefined where the text names no language. */
  readonly locale: string | undefined;
  readonly before: string;
  readonly after: string;
};

export type ReplacementList =
  | { readonly ok: true; readonly replacements: readonly Replacement[]; readonly isCut: boolean }
  | { readonly ok: false; readonly reason: string };

const MOST = 2_000;
/** A pattern that takes this long has gone astray. */
const TIME_LIMIT_MS = 1_500;

/** In the order of the model. `$1` and `$&` stand for groups and the whole where a pattern is asked for. */
export function findReplacements(space: AddressSpace, question: ReplaceQuestion, now: () => number): ReplacementList {
  if (question.find === "") return { ok: true, replacements: [], isCut: false };
  const pattern = toPattern(question);
  if (!pattern) return { ok: false, reason: "This is no regular expression." };
  const replacements: Replacement[] = [];
  const end = now() + TIME_LIMIT_MS;
  const namespaceUri = getOwnNamespace(space.own.header);
  for (const node of space.listOwnNodes()) {
    if (now() > end) return { ok: false, reason: "This pattern takes too long; write a plainer one." };
    for (const text of listTexts(node, namespaceUri, question.fields)) {
      const after = question.isRegex ? text.before.replace(pattern, question.replacement) : text.before.replace(pattern, () => question.replacement);
      if (after === text.before) continue;
      if (replacements.length === MOST) return { ok: true, replacements, isCut: true };
      replacements.push({ ...text, key: node.key, after });
    }
  }
  return { ok: true, replacements, isCut: false };
}

function toPattern({ find, isRegex, matchesCase }: ReplaceQuestion): RegExp | undefined {
  const source = isRegex ? find : find.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  try {
    return new RegExp(source, matchesCase ? "gu" : "giu");
  } catch {
    return undefined;
  }
}

/** Names that another namespace defines (EURange and its like) stay what they are. */
function listTexts(node: Node, namespaceUri: string, fields: ReadonlySet<ReplaceField>): Omit<Replacement, "key" | "after">[] {
  const texts: Omit<Replacement, "key" | "after">[] = [];
  if (fields.has("name") && node.browseName.namespaceUri === namespaceUri) texts.push({ field: "name", locale: undefined, before: node.browseName.name });
  for (const field of ["displayName", "description"] as const) {
    if (!fields.has(field)) continue;
    for (const { locale, text } of node[field] ?? []) {
      if (field === "displayName" && fields.has("name") && text === node.browseName.name) continue;
      texts.push({ field, locale, before: text });
    }
  }
  return texts;
}

export function toReplaceSteps(replacements: readonly Replacement[]): EditStep[] {
  return replacements.map(({ key, field, locale, after }) =>
    field === "name"
      ? toRenameStep(key, after)
      : (space, context) => setText(space, context, { node: key, attribute: field, text: after, ...(locale === undefined ? {} : { locale }) }),
  );
}
