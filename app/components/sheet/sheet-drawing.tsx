import { useReactFlow } from "@xyflow/react";
import { lazy, Suspense, useMemo, useRef, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { AddRequest } from "../model/add-request";
import { useOpenModel } from "../model/use-model";
import { usePaletteActions } from "../palette/use-palette-actions";
import { arrangeCards } from "./arrange-cards";
import { listPaletteActions } from "./list-palette-actions";
import { makeRoom, placeCards } from "./place-cards";
import { SheetCanvas } from "./sheet-canvas";
import type { SheetControl } from "./sheet-control";
import { SheetFoot } from "./sheet-foot";
import { getBounds, getZoneOrigin, type Point, type Rect } from "./sheet-geometry";
import { withFoldToggled, withHandPlaced, withHidden, withoutHandPlaced, withPositions, withShown, type SheetLayout } from "./sheet-layout";
import { SheetMenu } from "./sheet-menu";
import type { SheetPlace } from "./sheet-place";
import type { Scene } from "./sheet-scene";
import { SheetStrip } from "./sheet-strip";
import type { ConnectRequest } from "./use-connect-drag";
import { useDropPlace } from "./use-drop-place";
import { useSheetActions } from "./use-sheet-actions";
import { useSheetPicture } from "./use-sheet-picture";
import { useScene } from "./use-scene";
import { ZoneStrip } from "./zone-strips";

type Props = { space: AddressSpace; layout: SheetLayout; changeLayout: (make: (layout: SheetLayout) => SheetLayout) => void; place: SheetPlace; seen: number };

/** Forms and menus come when they are first asked for. */
const AddNodePanel = lazy(() => import("../model/add-node-panel").then((part) => ({ default: part.AddNodePanel })));
const ConnectMenu = lazy(() => import("./connect-menu").then((part) => ({ default: part.ConnectMenu })));
const MoveMenu = lazy(() => import("../model/move-menu").then((part) => ({ default: part.MoveMenu })));

const NOT_MOVED: ReadonlyMap<NodeKey, Point> = new Map();

/** Frame, canvas and foot of one sheet with what can be done on it. */
export function SheetDrawing({ space, layout, changeLayout, place: sheetPlace, seen }: Props) {
  const { view, actions } = useOpenModel();
  const { fitView } = useReactFlow();
  const canvas = useRef<HTMLDivElement>(null);
  const scene = useScene(space, layout);
  const [moved, setMoved] = useState(NOT_MOVED);
  const [connecting, setConnecting] = useState<ConnectRequest>();
  const [adding, setAdding] = useState<AddRequest>();
  const [moving, setMoving] = useState<readonly NodeKey[]>();
  const [isArranging, setArranging] = useState(false);
  const dropPlace = useRef<Point>(undefined);
  const places = useMemo(() => placeCards(scene, new Map(Object.entries(layout.positions) as [NodeKey, Point][])), [scene, layout.positions]);
  const rects = useMemo(() => toRects(scene, places, moved), [scene, places, moved]);
  const origin = useMemo(() => getZoneOrigin(getBounds(toRects(scene, places, NOT_MOVED).values())), [scene, places]);

  const control = useMemo<SheetControl>(() => {
    // Places that were only computed become fixed as soon as somebody places a card, so that nothing jumps later.
    const place = (positions: ReadonlyMap<NodeKey, Point>): void => {
      setMoved(NOT_MOVED);
      changeLayout((old) => withHandPlaced(withPositions(old, places), positions));
    };
    const arrange = async (): Promise<void> => {
      setArranging(true);
      try {
        const { selection } = view.getState();
        const chosen = scene.cards.filter((card) => selection.includes(card.key));
        const byHand = new Set(layout.byHand);
        const free = scene.cards.filter((card) => !byHand.has(card.key));
        const keys = new Set((chosen.length > 1 ? chosen : free).map((card) => card.key));
        const arranged = moveTo(await arrangeCards(scene, keys), places);
        const kept = toRects({ ...scene, cards: scene.cards.filter((card) => !keys.has(card.key)) }, places, NOT_MOVED);
        setMoved(NOT_MOVED);
        changeLayout((old) => withPositions(withPositions(old, places), makeRoom(scene, arranged, kept)));
        // The canvas knows the new places two frames later.
        requestAnimationFrame(() => requestAnimationFrame(() => void fitView({ duration: 180, padding: 0.08, maxZoom: 1 })));
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
      add: (request, at) => {
        dropPlace.current = at;
        setAdding(request);
      },
      move: setMoving,
      release: (keys) => changeLayout((old) => withoutHandPlaced(old, keys)),
      byHand: new Set(layout.byHand),
      focusOn: sheetPlace.focusOn,
      changeLayout,
    };
  }, [changeLayout, places, scene, view, fitView, layout.byHand, sheetPlace.focusOn]);

  const getPicture = useSheetPicture({ space, scene, rects, captions: layout.captions, place: sheetPlace });
  const sheetActions = useSheetActions({ space, layout, places, place: sheetPlace, getPicture });
  useDropPlace(scene, dropPlace, control.place);
  usePaletteActions(useMemo(() => listPaletteActions(control, sheetActions, actions.canEdit), [control, sheetActions, actions]));

  return (
    <section className="sheet" aria-label="Sheet">
      <SheetStrip space={space} place={sheetPlace} sheetActions={sheetActions} />
      <div className="sheet-frame">
        <ZoneStrip side="top" origin={origin} canvas={canvas} />
        <ZoneStrip side="left" origin={origin} canvas={canvas} />
        <div className="sheet-drawing">
          <SheetMenu space={space} scene={scene} rects={rects} control={control}>
            <SheetCanvas ref={canvas} space={space} scene={scene} rects={rects} captions={layout.captions} control={control} print={sheetActions.print} onMove={setMoved} seen={seen} />
          </SheetMenu>
          <SheetFoot space={space} isArranging={isArranging} rects={rects} control={control} />
        </div>
        <ZoneStrip side="right" origin={origin} canvas={canvas} />
        <ZoneStrip side="bottom" origin={origin} canvas={canvas} />
      </div>
      <Suspense>
      {connecting ? <ConnectMenu space={space} request={connecting} onClose={() => setConnecting(undefined)} /> : null}
      {moving ? <MoveMenu keys={moving} onClose={() => setMoving(undefined)} /> : null}
      {adding ? <AddNodePanel key={adding.id} request={adding} onClose={() => setAdding(undefined)} /> : null}
      </Suspense>
    </section>
  );
}

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
