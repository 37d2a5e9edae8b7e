import { NodeResizer, type Node as FlowNode, type NodeProps } from "@xyflow/react";
import { memo } from "react";
import { cx } from "../ui/cx";
import type { Caption } from "./sheet-layout";

export type CaptionFlowNode = FlowNode<{ caption: Caption; onChange: (caption: Caption | undefined, id: string) => void }, "caption">;

/** A dashed frame with a title in a tab on its upper edge: layout only. An empty title takes the frame away. */
export const CaptionNode = memo(function CaptionNode({ data: { caption, onChange }, selected }: NodeProps<CaptionFlowNode>) {
  return (
    <div className={cx("sheet-caption", selected && "is-selected")}>
      <NodeResizer isVisible={selected} minWidth={120} minHeight={60} onResizeEnd={(_event, { x, y, width, height }) => onChange({ ...caption, x, y, width, height }, caption.id)} />
      <input
        className="sheet-caption-title nodrag"
        aria-label="Title of the caption frame"
        defaultValue={caption.text}
        size={Math.max(8, caption.text.length)}
        onKeyDown={(event) => {
          event.stopPropagation();
          if (event.key === "Enter" || event.key === "Escape") event.currentTarget.blur();
        }}
        onBlur={(event) => {
          const text = event.currentTarget.value.trim();
          if (text === "") onChange(undefined, caption.id);
          else if (text !== caption.text) onChange({ ...caption, text }, caption.id);
        }}
      />
    </div>
  );
});
