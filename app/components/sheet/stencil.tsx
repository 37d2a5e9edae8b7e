import { useReactFlow } from "@xyflow/react";
import { useRef, type PointerEvent } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { makeAddRequest } from "../model/add-request";
import { SayInput } from "../model/say-input";
import { findMemberOwner } from "../model/member-owner";
import { useOpenModel } from "../model/use-model";
import { NodeClassGlyph, type GlyphKind } from "../notation/node-class-glyph";
import { cx } from "../ui/cx";
import type { SheetControl } from "./sheet-control";
import { findKeyElement } from "./use-connect-drag";

type Kind = GlyphKind | "Caption";

const MEMBERS: readonly Kind[] = ["Object", "Variable", "Property", "Method"];
const TYPES: readonly Kind[] = ["ObjectType", "VariableType", "DataType", "ReferenceType"];

/** Cut-out shapes of the notation: pressed, they add to what is selected; dragged, to where they are let go. */
export function Stencil({ space, control }: { space: AddressSpace; control: SheetControl }) {
  const { view } = useOpenModel();
  const { screenToFlowPosition } = useReactFlow();

  function add(kind: Kind, at?: { x: number; y: number }): void {
    const under = at ? (findKeyElement(at.x, at.y)?.dataset.key as NodeKey | undefined) : view.getState().selection.at(-1);
    if (kind === "Caption") {
      const corner = screenToFlowPosition(at ?? { x: window.innerWidth / 2 - 160, y: window.innerHeight / 3 });
      const caption = { id: `caption-${crypto.randomUUID()}`, text: "Caption", ...corner, width: 320, height: 200 };
      control.changeLayout((old) => ({ ...old, captions: [...old.captions, caption] }));
      return;
    }
    const parent = MEMBERS.includes(kind) ? findMemberOwner(space, under) : undefined;
    control.add(makeAddRequest(kind, parent === undefined ? {} : { parent }), at && screenToFlowPosition(at));
  }

  return (
    <>
      <span className="stencil-title" aria-hidden="true">
        Stencil
      </span>
      {MEMBERS.map((kind) => (
        <StencilItem key={kind} kind={kind} onAdd={add} />
      ))}
      <i className="stencil-rule" />
      {TYPES.map((kind) => (
        <StencilItem key={kind} kind={kind} onAdd={add} />
      ))}
      <i className="stencil-rule" />
      <StencilItem kind="Caption" onAdd={add} />
      <div className="stencil-say">
        <SayInput space={space} />
      </div>
    </>
  );
}

const DRAG_DISTANCE = 5;

function StencilItem({ kind, onAdd }: { kind: Kind; onAdd: (kind: Kind, at?: { x: number; y: number }) => void }) {
  const drag = useRef<{ x: number; y: number; ghost?: HTMLElement }>(undefined);

  function onPointerDown(event: PointerEvent<HTMLButtonElement>): void {
    if (event.button !== 0) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    drag.current = { x: event.clientX, y: event.clientY };
  }

  function onPointerMove(event: PointerEvent<HTMLButtonElement>): void {
    const start = drag.current;
    if (!start) return;
    if (!start.ghost && Math.hypot(event.clientX - start.x, event.clientY - start.y) > DRAG_DISTANCE) start.ghost = makeGhost(event.currentTarget);
    if (start.ghost) start.ghost.style.transform = `translate(${event.clientX - 17}px, ${event.clientY - 12}px)`;
  }

  function onPointerUp(event: PointerEvent<HTMLButtonElement>): void {
    const start = drag.current;
    drag.current = undefined;
    start?.ghost?.remove();
    if (start?.ghost && findCanvas(event.clientX, event.clientY)) onAdd(kind, { x: event.clientX, y: event.clientY });
    if (start?.ghost) event.currentTarget.dataset.dragged = "true";
  }

  return (
    <button
      type="button"
      className={cx("stencil-item", TYPES.includes(kind) && "is-type")}
      aria-label={`Add ${kind}`}
      onPointerDown={onPointerDown}
      onPointerMove={onPointerMove}
      onPointerUp={onPointerUp}
      onPointerCancel={onPointerUp}
      onClick={(event) => {
        if (event.currentTarget.dataset.dragged === undefined) onAdd(kind);
        delete event.currentTarget.dataset.dragged;
      }}
    >
      {kind === "Caption" ? <CaptionGlyph /> : <NodeClassGlyph kind={kind} width={34} />}
      <span>{kind}</span>
    </button>
  );
}

function CaptionGlyph() {
  return (
    <svg viewBox="0 0 20 14" width="34" height="24" fill="none" stroke="currentColor" aria-hidden="true">
      <path d="M2 3h16v9H2z" strokeDasharray="2 1.5" />
      <path d="M2 3h7" strokeWidth="2.5" />
    </svg>
  );
}

/** A copy of the shape that follows the pointer. */
function makeGhost(button: HTMLElement): HTMLElement {
  const ghost = document.createElement("div");
  ghost.style.cssText = "position:fixed;left:0;top:0;pointer-events:none;z-index:60;color:var(--copper)";
  const shape = button.querySelector("svg")?.cloneNode(true);
  if (shape) ghost.append(shape);
  document.body.append(ghost);
  return ghost;
}

function findCanvas(x: number, y: number): Element | null | undefined {
  return document.elementFromPoint(x, y)?.closest(".sheet-canvas");
}
