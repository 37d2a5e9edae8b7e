import { ReactFlow, SelectionMode, useStore, ViewportPortal, type NodeChange, type NodeTypes, type ReactFlowState } from "@xyflow/react";
import { useEffect, useMemo, useRef, useState, type MouseEvent, type PointerEvent, type RefObject } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { useOpenModel, useSelection } from "../model/use-model";
import { cx } from "../ui/cx";
import { Empty } from "../ui/empty";
import { Button } from "../ui/button";
import { CaptionNode, type CaptionFlowNode } from "./caption-node";
import { CardNode, type CardFlowNode } from "./card-node";
import { FarContext } from "./far-context";
import type { SheetControl } from "./sheet-control";
import { ConnectingLine, SheetLines } from "./sheet-lines";
import type { Point, Rect } from "./sheet-geometry";
import type { Caption } from "./sheet-layout";
import type { Scene } from "./sheet-scene";
import { useConnectDrag } from "./use-connect-drag";
import { useReveal } from "./use-reveal";
import { useSheetKeys } from "./use-sheet-keys";
import { makeAddRequest } from "../model/add-request";

type SheetFlowNode = CardFlowNode | CaptionFlowNode;

type Props = {
  ref: RefObject<HTMLDivElement | null>;
  space: AddressSpace;
  scene: Scene;
  rects: ReadonlyMap<NodeKey, Rect>;
  captions: readonly Caption[];
  control: SheetControl;
  print: () => void;
  onMove: (moved: ReadonlyMap<NodeKey, Point>) => void;
  /** Wishes to bring a node into sight that were answered before this sheet was opened. */
  seen: number;
};

const NODE_TYPES: NodeTypes = { card: CardNode, caption: CaptionNode };
const FAR = 0.42;
const FIT = { padding: 0.06, maxZoom: 1, minZoom: 0.35 };
const isFar = (state: ReactFlowState): boolean => state.transform[2] < FAR;

/** The canvas: xyflow moves cards and view, everything else on it is ours. */
export function SheetCanvas({ ref, space, scene, rects, captions, control, print, onMove, seen }: Props) {
  const { view, actions } = useOpenModel();
  const selection = useSelection();
  const far = useStore(isFar);
  const [selectedLine, setSelectedLine] = useState<string>();
  const { connecting, start } = useConnectDrag(control.connect);
  const [selectedCaption, setSelectedCaption] = useState<string>();
  const nodes = useFlowNodes(scene, rects, captions, selection, selectedCaption, control);
  const moving = useRef(new Map<NodeKey, Point>());
  const onKeyDown = useSheetKeys({ space, scene, rects, control, print, selectedLine, selectedCaption, clearLine: () => setSelectedLine(undefined) });
  useReveal(space, scene, rects, control, seen);

  // Who comes by keyboard can begin at once; a field that has the focus keeps it.
  useEffect(() => {
    if (document.activeElement === document.body) ref.current?.focus({ preventScroll: true });
  }, [ref]);

  function onNodesChange(changes: NodeChange<SheetFlowNode>[]): void {
    let selected: Set<NodeKey> | undefined;
    const movedCaptions = new Map<string, Point>();
    for (const change of changes) {
      const caption = "id" in change ? captions.find((c) => c.id === change.id) : undefined;
      if (change.type === "position" && change.position) {
        if (caption) movedCaptions.set(caption.id, change.position);
        else moving.current.set(change.id as NodeKey, change.position);
      } else if (change.type === "select") {
        if (caption) setSelectedCaption(change.selected ? caption.id : undefined);
        else {
          selected ??= new Set(view.getState().selection.filter((key) => rects.has(key)));
          if (change.selected) selected.add(change.id as NodeKey);
          else selected.delete(change.id as NodeKey);
        }
      }
    }
    if (selected) view.select([...selected]);
    if (moving.current.size > 0) onMove(new Map(moving.current));
    if (movedCaptions.size > 0) {
      control.changeLayout((old) => ({
        ...old,
        captions: old.captions.map((c) => ({ ...c, ...movedCaptions.get(c.id) })),
      }));
    }
  }

  function finishMove(): void {
    if (moving.current.size === 0) return;
    control.place(moving.current);
    moving.current = new Map();
  }

  function onClick(event: MouseEvent): void {
    const target = event.target as Element;
    const fold = target.closest<HTMLElement>("[data-unfold]");
    if (fold) {
      control.toggleFold(fold.dataset.unfold as NodeKey);
      return;
    }
    const key = target.closest<HTMLElement>("[data-key]")?.dataset.key as NodeKey | undefined;
    if (key === undefined || target.closest("input")) return;
    setSelectedLine(undefined);
    if (event.shiftKey || event.ctrlKey || event.metaKey) view.toggle(key);
    else view.select([key]);
    view.setDrawerOpen(true);
  }

  function onDoubleClick(event: MouseEvent): void {
    const key = (event.target as Element).closest<HTMLElement>("[data-key]")?.dataset.key as NodeKey | undefined;
    if (key !== undefined && space.isOwn(key) && actions.canEdit) view.startRenaming(key);
  }

  function onPointerDown(event: PointerEvent): void {
    if (!(event.target as Element).closest("input, button")) ref.current?.focus({ preventScroll: true });
    if (actions.canEdit) start(event);
  }

  return (
    <div
      ref={ref}
      className={cx("sheet-canvas", far && "is-far")}
      data-keyboard
      role="application"
      aria-label="Drawing"
      aria-describedby="sheet-keys"
      tabIndex={0}
      onKeyDown={onKeyDown}
      onClick={onClick}
      onDoubleClick={onDoubleClick}
      onPointerDownCapture={onPointerDown}
    >
      <p id="sheet-keys" className="sr-only">
        Arrow keys move through cards and members, F2 renames, Enter adds the next member, C connects, Delete removes. The register
        holds the same members as a table.
      </p>
      <FarContext value={far}>
      <ReactFlow<SheetFlowNode>
        nodes={nodes}
        edges={NO_EDGES}
        nodeTypes={NODE_TYPES}
        onNodesChange={onNodesChange}
        onNodeDragStop={finishMove}
        onSelectionDragStop={finishMove}
        onPaneClick={() => {
          view.select([]);
          setSelectedLine(undefined);
        }}
        minZoom={0.02}
        maxZoom={2.5}
        fitView
        fitViewOptions={FIT}
        panOnScroll
        zoomOnDoubleClick={false}
        selectionMode={SelectionMode.Partial}
        multiSelectionKeyCode={MULTI_SELECT_KEYS}
        deleteKeyCode={null}
        nodesConnectable={false}
        nodesFocusable={false}
        edgesFocusable={false}
        disableKeyboardA11y
        nodeDragThreshold={3}
        proOptions={PRO_OPTIONS}
        onlyRenderVisibleElements={scene.cards.length > 150}
      >
        <ViewportPortal>
          <SheetLines
            scene={scene}
            space={space}
            rects={rects}
            selectedLine={selectedLine}
            onSelectLine={(id) => {
              view.select([]);
              setSelectedLine(id);
              ref.current?.focus({ preventScroll: true });
            }}
          />
          {connecting ? <ConnectingLine from={connecting.from} to={connecting.to} /> : null}
        </ViewportPortal>
      </ReactFlow>
      </FarContext>
      {scene.cards.length === 0 ? <EmptySheet control={control} canEdit={actions.canEdit} /> : null}
    </div>
  );
}

const NO_EDGES: never[] = [];
const MULTI_SELECT_KEYS = ["Control", "Meta"];
const PRO_OPTIONS = { hideAttribution: true };

function EmptySheet({ control, canEdit }: { control: SheetControl; canEdit: boolean }) {
  return (
    <div className="sheet-empty">
      <Empty
        title="Nothing is drawn yet"
        {...(canEdit ? { action: <Button tone="main" onClick={() => control.add(makeAddRequest("ObjectType"))}>Draw the first type</Button> } : {})}
      >
        A model begins with an ObjectType: the kind of machine that it describes.
      </Empty>
    </div>
  );
}

/** Flow nodes keep their identity while their card, place and selection stay the same. */
function useFlowNodes(
  scene: Scene,
  rects: ReadonlyMap<NodeKey, Rect>,
  captions: readonly Caption[],
  selection: readonly NodeKey[],
  selectedCaption: string | undefined,
  control: SheetControl,
): SheetFlowNode[] {
  const kept = useRef(new Map<string, CardFlowNode>());
  return useMemo(() => {
    const selected = new Set(selection);
    const next = new Map<string, CardFlowNode>();
    for (const card of scene.cards) {
      const rect = rects.get(card.key);
      if (!rect) continue;
      const old = kept.current.get(card.key);
      const isSelected = selected.has(card.key);
      const isSame = old && old.data.card === card && old.position.x === rect.x && old.position.y === rect.y && old.selected === isSelected;
      next.set(card.key, isSame ? old : toFlowNode(card, rect, isSelected));
    }
    kept.current = next;
    const frames = captions.map((caption) => toCaptionNode(caption, caption.id === selectedCaption, control));
    return [...frames, ...next.values()];
  }, [scene.cards, rects, captions, selection, selectedCaption, control]);
}

function toFlowNode(card: Scene["cards"][number], rect: Rect, selected: boolean): CardFlowNode {
  const { width, height } = rect;
  return {
    id: card.key,
    type: "card",
    position: { x: rect.x, y: rect.y },
    data: { card },
    width,
    height,
    initialWidth: width,
    initialHeight: height,
    measured: { width, height },
    selected,
    ariaRole: "group",
    ariaLabel: `${card.nodeClass} ${card.name}`,
  };
}

function toCaptionNode(caption: Caption, selected: boolean, control: SheetControl): CaptionFlowNode {
  const { x, y, width, height } = caption;
  const onChange = (changed: Caption | undefined, id: string): void =>
    control.changeLayout((old) => ({ ...old, captions: old.captions.flatMap((c) => (c.id === id ? (changed ?? []) : c)) }));
  return { id: caption.id, type: "caption", position: { x, y }, data: { caption, onChange }, width, height, initialWidth: width, initialHeight: height, selected, zIndex: -2 };
}
