import { useReactFlow } from "@xyflow/react";
import { useMemo, useRef, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { AddNodePanel } from "../model/add-node-panel";
import { makeAddRequest, type AddRequest } from "../model/add-request";
import { MoveMenu } from "../model/move-menu";
import { useOpenModel } from "../model/use-model";
import type { PaletteEntry } from "../palette/palette-store";
import { usePaletteActions } from "../palette/use-palette-actions";
import { arrangeCards } from "./arrange-cards";
import { ConnectMenu } from "./connect-menu";
import { placeCards } from "./place-cards";
import { SheetCanvas } from "./sheet-canvas";
import type { SheetControl } from "./sheet-control";
import { SheetFoot } from "./sheet-foot";
import { getBounds, getZoneOrigin, type Point, type Rect } from "./sheet-geometry";
import { withFoldToggled, withHidden, withPositions, withShown, type SheetLayout } from "./sheet-layout";
import { SheetMenu } from "./sheet-menu";
import type { Scene } from "./sheet-scene";
import type { ConnectRequest } from "./use-connect-drag";
import { useScene } from "./use-scene";
import { ZoneStrip } from "./zone-strips";

type Props = { space: AddressSpace; layout: SheetLayout; changeLayout: (make: (layout: SheetLayout) => SheetLayout) => void };

const NOT_MOVED: ReadonlyMap<NodeKey, Point> = new Map();

/** Frame, canvas and foot of one sheet with what can be done on it. */
export function SheetDrawing({ space, layout, changeLayout }: Props) {
  const { view, actions } = useOpenModel();
  const { fitView } = useReactFlow();
  const canvas = useRef<HTMLDivElement>(null);
  const scene = useScene(space, layout);
  const [moved, setMoved] = useState(NOT_MOVED);
  const [connecting, setConnecting] = useState<ConnectRequest>();
  const [adding, setAdding] = useState<AddRequest>();
  const [moving, setMoving] = useState<readonly NodeKey[]>();
  const [isArranging, setArranging] = useState(false);
  const places = useMemo(() => placeCards(scene, new Map(Object.entries(layout.positions) as [NodeKey, Point][])), [scene, layout.positions]);
  const rects = useMemo(() => toRects(scene, places, moved), [scene, places, moved]);
  const origin = useMemo(() => getZoneOrigin(getBounds(toRects(scene, places, NOT_MOVED).values())), [scene, places]);

  const control = useMemo<SheetControl>(() => {
    // Places that were only computed become fixed as soon as somebody places a card, so that nothing jumps later.
    const place = (positions: ReadonlyMap<NodeKey, Point>): void => {
      setMoved(NOT_MOVED);
      changeLayout((old) => withPositions(withPositions(old, places), positions));
    };
    const arrange = async (): Promise<void> => {
      setArranging(true);
      try {
        const { selection } = view.getState();
        const chosen = scene.cards.filter((card) => selection.includes(card.key));
        const keys = new Set((chosen.length > 1 ? chosen : scene.cards).map((card) => card.key));
        place(moveTo(await arrangeCards(scene, keys), places));
        requestAnimationFrame(() => void fitView({ duration: 180, padding: 0.08, maxZoom: 1 }));
      } finally {
        setArranging(false);
      }
    };
    return {
      show: (keys) => changeLayout((old) => withShown(withPositions(old, places), keys)),
      hide: (keys) => changeLayout((old) => withHidden(withPositions(old, places), keys)),
      toggleFold: (key) => changeLayout((old) => withFoldToggled(old, key)),
      place,
      arrange: () => void arrange(),
      connect: setConnecting,
      add: setAdding,
      move: setMoving,
      changeLayout,
    };
  }, [changeLayout, places, scene, view, fitView]);

  usePaletteActions(useMemo(() => listSheetActions(control, actions.canEdit), [control, actions]));

  return (
    <section className="sheet" aria-label="Sheet">
      <div className="sheet-frame">
        <ZoneStrip side="top" origin={origin} canvas={canvas} />
        <ZoneStrip side="left" origin={origin} canvas={canvas} />
        <div className="sheet-drawing">
          <SheetMenu space={space} scene={scene} rects={rects} control={control}>
            <SheetCanvas ref={canvas} space={space} scene={scene} rects={rects} captions={layout.captions} control={control} onMove={setMoved} />
          </SheetMenu>
          <SheetFoot space={space} isArranging={isArranging} control={control} />
        </div>
        <ZoneStrip side="right" origin={origin} canvas={canvas} />
        <ZoneStrip side="bottom" origin={origin} canvas={canvas} />
      </div>
      {connecting ? <ConnectMenu space={space} request={connecting} onClose={() => setConnecting(undefined)} /> : null}
      {moving ? <MoveMenu keys={moving} onClose={() => setMoving(undefined)} /> : null}
      {adding ? <AddNodePanel key={adding.id} request={adding} onClose={() => setAdding(undefined)} /> : null}
    </section>
  );
}

function listSheetActions(control: SheetControl, canEdit: boolean): PaletteEntry[] {
  const group = "Actions on this sheet";
  const arrange = { id: "arrange", label: "Arrange the cards", group, run: control.arrange };
  if (!canEdit) return [arrange];
  const adds = ADDABLE.map((kind) => ({ id: `add-${kind}`, label: `Add ${kind === "DataType" ? "enumeration" : kind}`, group, run: () => control.add(makeAddRequest(kind)) }));
  return [arrange, ...adds];
}

const ADDABLE = ["ObjectType", "VariableType", "DataType", "ReferenceType", "Object", "Variable", "Property", "Method"] as const;

function toRects(scene: Scene, places: ReadonlyMap<NodeKey, Point>, moved: ReadonlyMap<NodeKey, Point>): Map<NodeKey, Rect> {
  const rects = new Map<NodeKey, Rect>();
  for (const card of scene.cards) {
    const point = moved.get(card.key) ?? places.get(card.key);
    if (point) rects.set(card.key, { ...point, width: card.width, height: card.height });
  }
  return rects;
}

/** Puts newly arranged cards where their old ones lay, so that the view need not travel. */
function moveTo(arranged: ReadonlyMap<NodeKey, Point>, places: ReadonlyMap<NodeKey, Point>): Map<NodeKey, Point> {
  const old = [...arranged.keys()].flatMap((key) => places.get(key) ?? []);
  const x = Math.min(...old.map((point) => point.x));
  const y = Math.min(...old.map((point) => point.y));
  return new Map([...arranged].map(([key, point]) => [key, { x: point.x + x, y: point.y + y }] as const));
}
