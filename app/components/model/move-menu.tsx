import { useEffect, useMemo, useRef, useState } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import { Combobox } from "../ui/combobox";
import { listParents, type ParentChoice } from "./list-parents";
import { getNodeName } from "./member-facts";
import { useOpenModel, useSpace } from "./use-model";
import { rankText } from "../palette/rank-entries";

type Props = { keys: readonly NodeKey[]; onClose: () => void };

const MOST = 30;

/** Asks for the node to which nodes are moved. */
export function MoveMenu({ keys, onClose }: Props) {
  const { actions } = useOpenModel();
  const space = useSpace();
  const [query, setQuery] = useState("");
  const panel = useRef<HTMLDivElement>(null);
  const parents = useMemo(() => listParents(space).filter((parent) => !keys.includes(parent.key)), [space, keys]);
  const hits = query.trim() === "" ? parents.slice(0, MOST) : parents.filter((parent) => rankText(parent.label, query.trim()) > 0).slice(0, MOST);
  const what = keys.length === 1 ? getNodeName(space, keys[0]) : `${keys.length} nodes`;

  useEffect(() => () => document.querySelector<HTMLElement>("[data-keyboard]")?.focus({ preventScroll: true }), []);

  return (
    <div ref={panel} role="dialog" aria-label={`Move ${what}`} className="connect-menu top-1/4 left-1/2 -translate-x-1/2" onKeyDown={(event) => event.stopPropagation()}>
      <div className="grid gap-1 p-2.5">
        <span className="text-small">
          Move <b className="font-semibold">{what}</b> to
        </span>
        <Combobox<ParentChoice>
          label="New owner"
          size="small"
          autoFocus
          query={query}
          onQuery={setQuery}
          items={hits}
          itemKey={(parent) => parent.key}
          renderItem={(parent) => parent.label}
          onPick={(parent) => {
            onClose();
            actions.move(keys, parent.key);
          }}
          onCancel={onClose}
          placeholder="Type or Object"
        />
      </div>
    </div>
  );
}
