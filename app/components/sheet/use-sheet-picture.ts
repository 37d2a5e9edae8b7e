import { useCallback, useRef } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import type { NodeKey } from "~/domain/address-space/node-id";
import { useOpenModel } from "../model/use-model";
import type { Rect } from "./sheet-geometry";
import type { Caption } from "./sheet-layout";
import type { PictureFacts } from "./sheet-picture";
import type { SheetPlace } from "./sheet-place";
import type { Scene } from "./sheet-scene";

type Inputs = { space: AddressSpace; scene: Scene; rects: ReadonlyMap<NodeKey, Rect>; captions: readonly Caption[]; place: SheetPlace };

/** Answers the sheet as it is drawn just now, with what its title block says. */
export function useSheetPicture(inputs: Inputs): () => PictureFacts {
  const { workspace, editor } = useOpenModel();
  const latest = useRef(inputs);
  latest.current = inputs;
  return useCallback(() => {
    const { space, scene, rects, captions, place } = latest.current;
    const { model, user } = workspace;
    const at = place.sheets.sheets.findIndex((sheet) => sheet.id === place.sheet.id);
    const namespace = getOwnNamespace(space.own.header);
    const title = [
      { label: "Model", value: model.name, width: 150 },
      { label: "Namespace", value: namespace, width: Math.max(150, namespace.length * 7 + 20), isMono: true },
      { label: "Version", value: `${space.own.header.models[0]?.version ?? "–"} · edit ${editor.getState().seq}`, width: 130, isMono: true },
      { label: "Printed", value: `${user.name}, ${new Date().toLocaleDateString("en-GB", { day: "numeric", month: "short", year: "numeric" })}`, width: 200 },
      { label: "Sheet", value: `${place.sheet.name}, ${at + 1} of ${place.sheets.sheets.length}`, width: 150 },
    ];
    return { scene, rects, captions, name: `${model.name}, ${place.sheet.name}`, title };
  }, [workspace, editor]);
}
