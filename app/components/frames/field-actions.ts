import type { DragEvent } from "react";
import type { FrameField } from "./frame-fields";

export type FieldActions = {
  /** Enter or a click takes a field; what that means, the page says. */
  readonly onPick?: ((field: FrameField) => void) | undefined;
  readonly onDragStart?: ((field: FrameField, event: DragEvent) => void) | undefined;
  readonly onDragEnd?: (() => void) | undefined;
};
