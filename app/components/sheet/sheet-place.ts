import type { NodeKey } from "~/domain/address-space/node-id";
import type { SheetSummary } from "~/presenters/sheets.server";
import type { SheetsControl } from "./use-sheets";

/** Where the drawing stands among the sheets of its model, and the ways from it to others. */
export type SheetPlace = {
  readonly sheet: SheetSummary;
  readonly sheets: SheetsControl;
  readonly open: (id: string) => void;
  /** The node that is looked at alone. */
  readonly focus: NodeKey | undefined;
  readonly focusOn: (key: NodeKey | undefined) => void;
};
