import { useEffect, useMemo, useRef, useState, type KeyboardEvent } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { hasValueAttributes } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatProblem } from "~/domain/core/problem-texts";
import { listLawfulReferences, type ReferenceChoice } from "~/domain/editing/lawful-references";
import { getNodeName } from "../model/member-facts";
import { NodeSearch } from "../model/node-search";
import { useOpenModel } from "../model/use-model";
import { LineEndSample } from "../notation/line-ends";
import { cx } from "../ui/cx";
import { getLineEnd } from "./sheet-scene";
import type { ConnectRequest } from "./use-connect-drag";

type Props = { space: AddressSpace; request: ConnectRequest; onClose: () => void };

/** Which reference shall it be: only those that the standard allows between the two, the usual first; else the reasons. */
export function ConnectMenu({ space, request, onClose }: Props) {
  const [target, setTarget] = useState(request.target);
  const panel = useRef<HTMLDivElement>(null);
  const place = getPlace(request);

  useEffect(() => {
    const onPointerDown = (event: PointerEvent): void => {
      const hit = event.target as Element;
      if (!panel.current?.contains(hit) && !hit.closest("[role=listbox]")) onClose();
    };
    window.addEventListener("pointerdown", onPointerDown, true);
    return () => {
      window.removeEventListener("pointerdown", onPointerDown, true);
      document.querySelector<HTMLElement>("[data-keyboard]")?.focus({ preventScroll: true });
    };
  }, [onClose]);

  return (
    <div
      ref={panel}
      role="dialog"
      aria-label={`Connect ${getNodeName(space, request.source)}`}
      className="connect-menu"
      style={place}
      onKeyDown={(event) => {
        event.stopPropagation();
        if (event.key === "Escape") onClose();
      }}
    >
      {target === undefined ? (
        <div className="grid gap-1 p-2.5">
          <span className="text-small">
            Connect <b className="font-semibold">{getNodeName(space, request.source)}</b> to
          </span>
          <NodeSearch label="Target of the reference" space={space} onPick={setTarget} onCancel={onClose} />
        </div>
      ) : (
        <Choices space={space} source={request.source} target={target} onClose={onClose} />
      )}
    </div>
  );
}

/** A reference, or the DataType of a Variable, which is an attribute and drawn as a dotted leader. */
type ChoiceRow = Omit<ReferenceChoice, "type"> & { readonly type: NodeKey | undefined; readonly source: NodeKey; readonly target: NodeKey; readonly isReversed: boolean };

const FEW = 6;

function Choices({ space, source, target, onClose }: { space: AddressSpace; source: NodeKey; target: NodeKey; onClose: () => void }) {
  const { actions } = useOpenModel();
  const [showsAll, setShowsAll] = useState(false);
  const [active, setActive] = useState(0);
  const list = useRef<HTMLUListElement>(null);
  const { rows, reasons } = useMemo(() => listChoices(space, source, target), [space, source, target]);
  const shown = showsAll ? rows : rows.slice(0, FEW);

  useEffect(() => {
    list.current?.focus();
  }, []);
  useEffect(() => {
    list.current?.querySelector('[aria-selected="true"]')?.scrollIntoView({ block: "nearest" });
  }, [active, showsAll]);

  function pick(row: ChoiceRow | undefined): void {
    if (!row) return;
    onClose();
    if (row.type === undefined) actions.setDataType([row.source], row.target);
    else actions.connect({ source: row.source, type: row.type, target: row.target });
  }

  function onKeyDown(event: KeyboardEvent): void {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step !== undefined) {
      event.preventDefault();
      if (active + step >= shown.length && !showsAll) setShowsAll(true);
      setActive(Math.max(0, Math.min(rows.length - 1, active + step)));
    } else if (event.key === "Enter") {
      event.preventDefault();
      pick(rows[active]);
    }
  }

  return (
    <>
      <p className="border-b border-hair px-3 py-1.5 text-small">
        <b className="font-semibold">{getNodeName(space, source)}</b> <span className="text-ink-3">and</span> <b className="font-semibold">{getNodeName(space, target)}</b>
      </p>
      {rows.length === 0 ? (
        <div className="px-3 py-2 text-small">
          <p className="font-medium">No reference is lawful between these two.</p>
          <ul className="mt-1 grid gap-1 text-note text-ink-2">
            {reasons.map((reason) => (
              <li key={reason}>{reason}</li>
            ))}
          </ul>
        </div>
      ) : (
        <ul ref={list} role="listbox" aria-label="Reference types" tabIndex={0} className="max-h-80 overflow-auto py-1 outline-none" onKeyDown={onKeyDown}>
          {shown.map((row, index) => (
            <li
              key={`${row.name} ${row.type ?? ""} ${row.isReversed}`}
              role="option"
              aria-selected={index === active}
              onMouseMove={() => setActive(index)}
              onClick={() => pick(row)}
              className={cx("flex h-7 cursor-pointer items-center gap-2.5 px-3 text-small", index === active && "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]")}
            >
              {row.type === undefined ? <i className="w-10 border-t-[1.5px] border-dotted border-ink-3" /> : <LineEndSample end={getLineEnd(space, row.type)} width={40} />}
              <span className={cx("shrink-0", row.isUsual && "font-medium")}>{row.name}</span>
              <span className="ml-auto truncate pl-3 text-note text-ink-3">
                {row.isReversed ? "from" : "to"} {getNodeName(space, target)}
              </span>
            </li>
          ))}
          {rows.length > shown.length ? (
            <li role="presentation" className="px-3 pt-1">
              <button type="button" className="text-note text-ink-3 hover:text-copper" onClick={() => setShowsAll(true)}>
                {rows.length - shown.length} more reference types
              </button>
            </li>
          ) : null}
        </ul>
      )}
    </>
  );
}

/** Usual types in the drawn direction, then usual ones against it, then the rest. */
function listChoices(space: AddressSpace, source: NodeKey, target: NodeKey): { rows: ChoiceRow[]; reasons: string[] } {
  const forward = listLawfulReferences(space, source, target);
  const backward = listLawfulReferences(space, target, source);
  const rows: ChoiceRow[] = [
    ...listDataTypeChoice(space, source, target, false),
    ...listDataTypeChoice(space, target, source, true),
    ...forward.choices.map((choice) => ({ ...choice, source, target, isReversed: false })),
    ...backward.choices.map((choice) => ({ ...choice, source: target, target: source, isReversed: true })),
  ];
  return { rows: [...rows.filter((row) => row.isUsual), ...rows.filter((row) => !row.isUsual)], reasons: [...new Set(forward.refusals.map(formatProblem))].slice(0, 5) };
}

function listDataTypeChoice(space: AddressSpace, variable: NodeKey, dataType: NodeKey, isReversed: boolean): ChoiceRow[] {
  const node = space.getNode(variable);
  const isFit = node !== undefined && hasValueAttributes(node) && space.isOwn(variable) && space.getNode(dataType)?.nodeClass === "DataType";
  return isFit ? [{ type: undefined, name: "DataType", isUsual: true, source: variable, target: dataType, isReversed }] : [];
}

const WIDTH = 380;

function getPlace({ at }: ConnectRequest): { left: number; top: number } {
  if (!at) return { left: Math.max(16, window.innerWidth / 2 - WIDTH / 2), top: window.innerHeight / 4 };
  return { left: Math.min(at.x + 6, window.innerWidth - WIDTH - 16), top: Math.min(at.y + 6, window.innerHeight - 300) };
}
