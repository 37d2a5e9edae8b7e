import type { NodeKey } from "~/domain/address-space/node-id";

/** A column of the register that an edit may change, and the text that it shall show. An empty text takes the thing away. */
export type CellColumn = "name" | "type" | "dataType" | "rank" | "unit" | "range" | "rule" | "access" | "value" | "description" | "nodeId" | "finding";

export type CellChange = { readonly key: NodeKey; readonly column: CellColumn; readonly text: string };
