import { useMemo } from "react";
import { flushSync } from "react-dom";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getNodeName } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { showToast } from "../ui/toast";
import type { Point } from "./sheet-geometry";
import { makeChosenLayout, withPositions, type SheetLayout } from "./sheet-layout";
import type { PictureFacts } from "./sheet-picture";
import type { SheetPlace } from "./sheet-place";

export type SheetActions = {
  readonly addFromSelection: () => void;
  readonly addEmpty: () => void;
  readonly duplicate: () => void;
  readonly remove: () => void;
  readonly keepFocus: () => void;
  readonly saveSvg: () => void;
  readonly savePng: () => void;
  readonly print: () => void;
};

type Inputs = {
  space: AddressSpace;
  layout: SheetLayout;
  places: ReadonlyMap<NodeKey, Point>;
  place: SheetPlace;
  /** What a picture of the sheet shows just now. */
  getPicture: () => PictureFacts;
};

/** What can be done to the sheet as a whole. */
export function useSheetActions({ space, layout, places, place, getPicture }: Inputs): SheetActions {
  const { view } = useOpenModel();
  return useMemo(() => {
    const { sheet, sheets, open } = place;
    const addAndOpen = async (name: string, made: SheetLayout): Promise<void> => {
      const id = await sheets.add(findFreeName(name, sheets.sheets), made);
      if (id === undefined) return;
      flushSync(() => place.focusOn(undefined));
      open(id);
    };
    const save = async (kind: "svg" | "png"): Promise<void> => {
      const { saveSheetPicture } = await import("./save-sheet-picture");
      const failure = await saveSheetPicture(kind, getPicture());
      if (failure !== undefined) showToast({ tone: "error", title: failure, seconds: 8 });
    };
    return {
      addFromSelection: () => {
        const { selection } = view.getState();
        const first = selection[0];
        if (first !== undefined) void addAndOpen(selection.length === 1 ? getNodeName(space, first) : "Selection", makeChosenLayout(selection, pick(places, selection)));
      },
      addEmpty: () => void addAndOpen("Sheet", makeChosenLayout([])),
      duplicate: () => void addAndOpen(`${sheet.name} copy`, withPositions(layout, places)),
      remove: () => {
        const at = sheets.sheets.findIndex((entry) => entry.id === sheet.id);
        const next = sheets.sheets[at + 1] ?? sheets.sheets[at - 1];
        void sheets.remove(sheet.id).then((isGone) => {
          if (!isGone || !next) return;
          open(next.id);
          showToast({
            tone: "plain",
            title: `Sheet ${sheet.name} deleted; the model keeps what it showed.`,
            action: (
              <Button size="small" onClick={() => void sheets.add(sheet.name, withPositions(layout, places)).then((id) => id !== undefined && open(id))}>
                Bring it back
              </Button>
            ),
            seconds: 12,
          });
        });
      },
      keepFocus: () => {
        if (place.focus !== undefined) void addAndOpen(getNodeName(space, place.focus), withPositions(layout, places));
      },
      saveSvg: () => void save("svg"),
      savePng: () => void save("png"),
      print: () => void import("./print-sheet").then(({ printSheet }) => printSheet(getPicture)),
    };
  }, [place, space, layout, places, view, getPicture]);
}

function pick(places: ReadonlyMap<NodeKey, Point>, keys: readonly NodeKey[]): Record<string, Point> {
  return Object.fromEntries(keys.flatMap((key) => (places.has(key) ? [[key, places.get(key) as Point]] : [])));
}

function findFreeName(wished: string, sheets: readonly { readonly name: string }[]): string {
  const taken = new Set(sheets.map((sheet) => sheet.name));
  let name = wished.slice(0, 90);
  for (let number = 2; taken.has(name); number++) name = `${wished.slice(0, 90)} ${number}`;
  return name;
}
