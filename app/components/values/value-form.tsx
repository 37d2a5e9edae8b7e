/** What all controls of one value form share. */
import { createContext, useContext, type ComponentType } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { DataTypeLookup } from "~/domain/nodeset/values/data-type-shapes";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import type { Draft, DraftItem } from "./value-draft";

export type LeafProps = {
  /** The accessible name. */
  label: string;
  id?: string;
  item: DraftItem;
  onChange: (item: DraftItem) => void;
  autoFocus?: boolean;
};

export type ItemProps = LeafProps & {
  type: BuiltInType;
  /** Names enumerations and bits, and bounds the choice of concrete structures. */
  dataType?: NodeKey | undefined;
  /** The structure is of exactly this DataType and is never null. */
  isFixed?: boolean;
};

export type DraftProps = {
  label: string;
  id?: string;
  draft: Draft;
  onChange: (draft: Draft) => void;
  dataType?: NodeKey | undefined;
  valueRank: number;
  isFixed?: boolean;
  autoFocus?: boolean;
};

export type TypedDraftProps = DraftProps & { readonly allowed: readonly BuiltInType[] };

export type ValueForm = {
  readonly space: AddressSpace;
  readonly types: DataTypeLookup;
  readonly readOnly: boolean;
  /** The editors of items and of whole values, for values that hold values. */
  readonly Item: ComponentType<ItemProps>;
  readonly Draft: ComponentType<DraftProps>;
  readonly TypedDraft: ComponentType<TypedDraftProps>;
};

export const ValueFormContext = createContext<ValueForm | undefined>(undefined);

export function useValueForm(): ValueForm {
  const form = useContext(ValueFormContext);
  if (!form) throw new RangeError("Used outside of a value form");
  return form;
}
