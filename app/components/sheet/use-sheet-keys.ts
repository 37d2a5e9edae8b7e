import { useReactFlow } from "@xyflow/react";
import type { KeyboardEvent } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";
import { makeAddRequest } from "../model/add-request";
import { findMemberOwner } from "../model/member-owner";
import { useOpenModel } from "../model/use-model";
import { listNeighbours, listUsers } from "./neighbours";
import type { SheetControl } from "./sheet-control";
import { LEGIBLE, type Point, type Rect } from "./sheet-geometry";
import type { Scene } from "./sheet-scene";
import { findNextNode, type WalkKey } from "./walk-cards";

type Inputs = {
  space: AddressSpace;
  scene: Scene;
  rects: ReadonlyMap<NodeKey, Rect>;
  control: SheetControl;
  print: () => void;
  selectedLine: string | undefined;
  selectedCaption: string | undefined;
  clearLine: () => void;
};

const NUDGE = 8;
const ARROWS: Readonly<Record<string, Point>> = {
  ArrowUp: { x: 0, y: -1 },
  ArrowDown: { x: 0, y: 1 },
  ArrowLeft: { x: -1, y: 0 },
  ArrowRight: { x: 1, y: 0 },
};

/** The keys of the drawing. Everything that the mouse does can be done with them. */
export function useSheetKeys({ space, scene, rects, control, print, selectedLine, selectedCaption, clearLine }: Inputs) {
  const { view, actions } = useOpenModel();
  const { fitView, getZoom, zoomIn, zoomOut } = useReactFlow();

  function walk(event: KeyboardEvent): void {
    const at = view.getState().selection.at(-1);
    const next = findNextNode(scene, rects, at, event.key as WalkKey);
    if (next === undefined) return;
    if (event.shiftKey && at !== undefined) view.select([...view.getState().selection.filter((key) => key !== next), next]);
    else view.reveal(next);
  }

  function nudge(event: KeyboardEvent): void {
    const step = ARROWS[event.key];
    if (!step) return;
    const places = new Map<NodeKey, Point>();
    for (const key of view.getState().selection) {
      const rect = rects.get(key);
      if (rect) places.set(key, { x: rect.x + step.x * NUDGE, y: rect.y + step.y * NUDGE });
    }
    if (places.size > 0) control.place(places);
  }

  function remove(): void {
    const line = selectedLine === undefined ? undefined : scene.lines.find((l) => l.id === selectedLine);
    if (line) {
      if (actions.removeReference(line.edge)) clearLine();
    } else if (selectedCaption !== undefined) {
      control.changeLayout((old) => ({ ...old, captions: old.captions.filter((c) => c.id !== selectedCaption) }));
    } else actions.remove(view.getState().selection);
  }

  function addNext(): void {
    const parent = findMemberOwner(space, view.getState().selection.at(-1));
    if (parent !== undefined && actions.canEdit) control.add(makeAddRequest("Variable", { parent }));
  }

  function showAround(list: (key: NodeKey) => readonly NodeKey[]): void {
    const found = view.getState().selection.flatMap(list);
    if (found.length > 0) control.show(found);
  }

  const plain: Readonly<Record<string, () => void>> = {
    F2: () => {
      const key = view.getState().selection.at(-1);
      if (key === undefined || !actions.mayChange(key)) return;
      // From afar a name is no field; the view comes near first.
      if (getZoom() < LEGIBLE) view.reveal(key);
      view.startRenaming(key);
    },
    Delete: remove,
    Backspace: remove,
    Enter: addNext,
    Insert: addNext,
    a: () => document.getElementById("say-what-it-carries")?.focus(),
    c: () => {
      const source = view.getState().selection.at(-1);
      if (source !== undefined && actions.canEdit) control.connect({ source });
    },
    h: () => control.hide(view.getState().selection.filter((key) => rects.has(key))),
    d: () => control.show(view.getState().selection),
    o: () => {
      const key = view.getState().selection.at(-1);
      if (key !== undefined) control.focusOn(key);
    },
    n: () => showAround((key) => listNeighbours(space, key)),
    u: () => showAround((key) => listUsers(space, key)),
    s: () => showAround((key) => listSupertypes(space, key)),
    f: () => void fitView({ duration: 180, padding: 0.08, maxZoom: 1 }),
    "+": () => void zoomIn({ duration: 90 }),
    "-": () => void zoomOut({ duration: 90 }),
    Escape: () => {
      clearLine();
      view.select([]);
    },
  };

  const commands: Readonly<Record<string, () => void>> = {
    a: () => view.select(scene.cards.map((card) => card.key)),
    c: () => actions.copyNodes(view.getState().selection),
    v: () => actions.paste(findMemberOwner(space, view.getState().selection.at(-1))),
    d: () => actions.duplicate(view.getState().selection),
    p: print,
  };

  return function onKeyDown(event: KeyboardEvent): void {
    if ((event.target as Element).closest("input, textarea, select, button, a")) return;
    const isCommand = event.ctrlKey || event.metaKey;
    if (event.key in ARROWS) {
      event.preventDefault();
      if (event.altKey) nudge(event);
      else walk(event);
      return;
    }
    if (event.altKey) return;
    const act = isCommand ? commands[event.key.toLowerCase()] : plain[event.key];
    if (!act) return;
    event.preventDefault();
    act();
  };
}
