import type { NodeKey } from "~/domain/address-space/node-id";
import type { GlyphKind } from "../notation/node-class-glyph";

/** The wish to add a node, answered by the add panel: of which kind, below which node, from which type. */
export type AddRequest = {
  readonly id: number;
  readonly kind: GlyphKind;
  readonly parent?: NodeKey;
  /** Supertype of a new type, type definition of a new instance. */
  readonly base?: NodeKey;
};

/** What each form of the add panel gets; it tells the name of what it added. */
export type AddFormProps = { readonly request: AddRequest; readonly onDone: (name: string, closes: boolean) => void };

let nextId = 1;

export function makeAddRequest(kind: GlyphKind, more: Omit<AddRequest, "id" | "kind"> = {}): AddRequest {
  return { id: nextId++, kind, ...more };
}
