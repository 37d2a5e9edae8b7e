/** `setText`: one locale of DisplayName, Description or InverseName (OPC 10000-3 §8.5; OPC 10000-6 §F.3). */
import type { AddressSpace } from "../../address-space/address-space";
import type { NodeKey } from "../../address-space/node-id";
import type { LocalizedText } from "../../address-space/qualified-name";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

export type SetTextIntent = {
  readonly node: NodeKey;
  readonly attribute: "displayName" | "description" | "inverseName";
  /** "" or absent: the text without locale. */
  readonly locale?: string;
  /** Empty takes the text of this locale away. */
  readonly text: string;
};

/** Problems: `text.last-display-name`, `text.locale`, `operation.*`. */
export function setText(space: AddressSpace, context: CommandContext, intent: SetTextIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const locale = intent.locale ?? "";
  if (locale !== "" && !/^[A-Za-z]{2,8}(?:-[A-Za-z0-9]{1,8})*$/.test(locale))
    draft.fail(problem("text.locale", { locale }));
  const node = space.getNode(intent.node);
  const known = node?.[intent.attribute as "displayName"] ?? [];
  const texts = withText(known, locale, intent.text);
  if (texts.length === 0 && intent.attribute === "displayName")
    draft.fail(problem("text.last-display-name", undefined, { node: intent.node }));
  if (!draft.hasFailed) draft.set(intent.node, intent.attribute, texts.length === 0 ? undefined : texts);
  return draft.finish();
}

/** The list with the text of one locale set, in its place; empty text takes it away. */
export function withText(texts: readonly LocalizedText[], locale: string, text: string): readonly LocalizedText[] {
  const isIt = (t: LocalizedText): boolean => (t.locale ?? "") === locale;
  if (text === "") return texts.filter((t) => !isIt(t));
  if (texts.some(isIt)) return texts.map((t) => (isIt(t) ? { ...t, text } : t));
  return [...texts, { ...(locale === "" ? {} : { locale }), text }];
}
