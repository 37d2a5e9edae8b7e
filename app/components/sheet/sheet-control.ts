import type { NodeKey } from "~/domain/address-space/node-id";
import type { AddRequest } from "../model/add-request";
import type { Point } from "./sheet-geometry";
import type { SheetLayout } from "./sheet-layout";
import type { ConnectRequest } from "./use-connect-drag";

/** What can be done to a sheet, handed to its canvas, menus, keys and foot. */
export type SheetControl = {
  readonly show: (keys: readonly NodeKey[]) => void;
  readonly hide: (keys: readonly NodeKey[]) => void;
  readonly toggleFold: (key: NodeKey) => void;
  readonly place: (places: ReadonlyMap<NodeKey, Point>) => void;
  readonly arrange: () => void;
  readonly connect: (request: ConnectRequest) => void;
  /** `at`: where on the drawing the card of what is added shall lie. */
  readonly add: (request: AddRequest, at?: Point) => void;
  readonly move: (keys: readonly NodeKey[]) => void;
  /** Leaves hand-placed cards to the layout again. */
  readonly release: (keys: readonly NodeKey[]) => void;
  readonly byHand: ReadonlySet<NodeKey>;
  /** Looks at one node with what lies around it; undefined looks at the sheet again. */
  readonly focusOn: (key: NodeKey | undefined) => void;
  readonly changeLayout: (make: (layout: SheetLayout) => SheetLayout) => void;
};
