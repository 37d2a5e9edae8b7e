import { useEffect, useRef } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import { useOpenModel, useView } from "./use-model";

/** The name of a node, and its field while it is being renamed: Enter keeps, Esc leaves. */
export function InlineName({ nodeKey, name }: { nodeKey: NodeKey; name: string }) {
  const isRenaming = useView((state) => state.renaming === nodeKey);
  return isRenaming ? <NameField nodeKey={nodeKey} name={name} /> : <>{name}</>;
}

function NameField({ nodeKey, name }: { nodeKey: NodeKey; name: string }) {
  const { actions, view, editor } = useOpenModel();
  const browseName = editor.getState().space.getNode(nodeKey)?.browseName.name ?? name;
  const field = useRef<HTMLInputElement>(null);
  const isDone = useRef(false);

  useEffect(() => {
    field.current?.focus();
    field.current?.select();
  }, []);

  function finish(text: string | undefined): void {
    if (isDone.current) return;
    isDone.current = true;
    const back = field.current?.closest<HTMLElement>("[data-keyboard]");
    view.stopRenaming();
    if (text !== undefined && text.trim() !== "" && text.trim() !== browseName) actions.rename(nodeKey, text.trim());
    back?.focus();
  }

  return (
    <input
      ref={field}
      className="inline-name nodrag nopan"
      aria-label={`New name of ${name}`}
      defaultValue={browseName}
      spellCheck={false}
      autoComplete="off"
      onPointerDown={(event) => event.stopPropagation()}
      onDoubleClick={(event) => event.stopPropagation()}
      onBlur={(event) => finish(event.currentTarget.value)}
      onKeyDown={(event) => {
        event.stopPropagation();
        if (event.key === "Enter") finish(event.currentTarget.value);
        else if (event.key === "Escape") finish(undefined);
      }}
    />
  );
}
