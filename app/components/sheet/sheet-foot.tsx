import { useReactFlow, useStore, type ReactFlowState } from "@xyflow/react";
import { Maximize2, Minus, Network, Plus } from "lucide-react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import { SaveState } from "../model/save-state";
import { useFindingTally, useOpenModel } from "../model/use-model";
import { FindingTallyBadge } from "../notation/finding-badge";
import { Tooltip } from "../ui/tooltip";
import type { SheetControl } from "./sheet-control";
import type { Rect } from "./sheet-geometry";
import { SheetMap } from "./sheet-map";
import { Stencil } from "./stencil";

type Props = { space: AddressSpace; isArranging: boolean; rects: ReadonlyMap<NodeKey, Rect>; control: SheetControl };

/** The foot of the drawing: stencil, map of the sheet, title block. */
export function SheetFoot({ space, isArranging, rects, control }: Props) {
  const { actions } = useOpenModel();
  return (
    <div className="sheet-foot">
      <div className="stencil">{actions.canEdit ? <Stencil space={space} control={control} /> : <p className="px-4 text-small text-ink-3">You may look at this sheet, not change it.</p>}</div>
      <MapBlock isArranging={isArranging} onArrange={control.arrange} rects={rects} />
      <SheetTitle space={space} />
    </div>
  );
}

const getZoom = (state: ReactFlowState): number => Math.round(state.transform[2] * 100);

function MapBlock({ isArranging, onArrange, rects }: { isArranging: boolean; onArrange: () => void; rects: ReadonlyMap<NodeKey, Rect> }) {
  const { fitView, zoomIn, zoomOut, zoomTo } = useReactFlow();
  const zoom = useStore(getZoom);
  return (
    <div className="sheet-map" role="group" aria-label="Map of the sheet">
      <SheetMap rects={rects} />
      <div className="sheet-map-tools">
        <MapButton label="Zoom out" onClick={() => void zoomOut({ duration: 90 })} icon={Minus} />
        <button type="button" aria-label={`Zoom ${zoom} %, press for 100 %`} onClick={() => void zoomTo(1, { duration: 180 })}>
          {zoom} %
        </button>
        <MapButton label="Zoom in" onClick={() => void zoomIn({ duration: 90 })} icon={Plus} />
        <MapButton label="Fit the sheet into the window" onClick={() => void fitView({ duration: 180, padding: 0.08, maxZoom: 1 })} icon={Maximize2} />
        <MapButton label={isArranging ? "Arranging …" : "Arrange the cards"} onClick={onArrange} icon={Network} />
      </div>
    </div>
  );
}

function MapButton({ label, onClick, icon: IconOf }: { label: string; onClick: () => void; icon: typeof Plus }) {
  return (
    <Tooltip text={label} side="top">
      <button type="button" aria-label={label} onClick={onClick}>
        <IconOf size={11} strokeWidth={1.6} aria-hidden />
      </button>
    </Tooltip>
  );
}

function SheetTitle({ space }: { space: AddressSpace }) {
  const { workspace } = useOpenModel();
  const tally = useFindingTally();
  const entry = space.own.header.models[0];
  const required = entry?.requiredModels.length ?? 0;
  return (
    <dl className="sheet-title" aria-label="Title block">
      <div>
        <dt>Model</dt>
        <dd className="font-semibold">{workspace.model.name}</dd>
      </div>
      <div>
        <dt>Namespace</dt>
        <dd className="font-mono" title={getOwnNamespace(space.own.header)}>
          {getOwnNamespace(space.own.header)}
        </dd>
      </div>
      <div>
        <dt>Version</dt>
        <dd className="font-mono">{entry?.version ?? "–"}</dd>
      </div>
      <div>
        <dt>State</dt>
        <dd>
          <SaveState />
        </dd>
      </div>
      <div>
        <dt>Checked</dt>
        <dd>{tally ? <FindingTallyBadge tally={tally} showNone /> : "checking …"}</dd>
      </div>
      <div>
        <dt>Requires</dt>
        <dd>
          {required} {required === 1 ? "model" : "models"}
        </dd>
      </div>
    </dl>
  );
}
