import { ReactFlowProvider } from "@xyflow/react";
import { useCallback, useEffect, useMemo, useState } from "react";
import { useSearchParams } from "react-router";
import "./sheet.css";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { SheetSummary } from "~/presenters/sheets.server";
import { useOpenModel, useSpace } from "../model/use-model";
import { LineEndMarkers } from "../notation/line-ends";
import { listNeighbours } from "./neighbours";
import { SheetDrawing } from "./sheet-drawing";
import { makeChosenLayout, type SheetLayout } from "./sheet-layout";
import { useSheetLayout } from "./use-sheet-layout";
import { useSheets, type SheetsControl } from "./use-sheets";

/** The sheets of a model in the standard's notation, each framed like a drawing; `?sheet=` names the one that is open. */
export function Sheet() {
  const { workspace, view, presence } = useOpenModel();
  const [parameters, setParameters] = useSearchParams();
  const sheets = useSheets(workspace.model.id, workspace.sheets);
  const wanted = parameters.get("sheet");
  const current = sheets.sheets.find((sheet) => sheet.id === wanted) ?? sheets.sheets[0];
  // What was brought into sight on one sheet is not asked for on the next one.
  const [seen, setSeen] = useState(0);

  const open = useCallback(
    (id: string) => {
      setSeen(view.getState().revealed);
      setParameters({ sheet: id }, { preventScrollReset: true });
    },
    [setParameters, view],
  );
  const name = current?.name;
  useEffect(() => presence.setPlace(name === undefined ? "sheet" : `sheet ${name}`), [presence, name]);

  if (!current) return null;
  return <OneSheet key={current.id} sheet={current} sheets={sheets} open={open} seen={seen} />;
}

type Focus = { readonly key: NodeKey; readonly layout: SheetLayout };
type Props = { sheet: SheetSummary; sheets: SheetsControl; open: (id: string) => void; seen: number };

/** One sheet, or for a while one node with what lies around it. */
function OneSheet({ sheet, sheets, open, seen }: Props) {
  const { workspace, actions, view } = useOpenModel();
  const space = useSpace();
  const { layout, change } = useSheetLayout(workspace.model.id, sheet.id, actions.canEdit);
  const [focus, setFocus] = useState<Focus>();
  const [unfocused, setUnfocused] = useState(seen);

  const changeFocus = useCallback((make: (layout: SheetLayout) => SheetLayout) => setFocus((old) => old && { ...old, layout: make(old.layout) }), []);
  const focusOn = useCallback(
    (key: NodeKey | undefined) => {
      setUnfocused(view.getState().revealed);
      setFocus(key === undefined ? undefined : { key, layout: makeChosenLayout([key, ...listNeighbours(space, key)]) });
    },
    [space, view],
  );
  const place = useMemo(() => ({ sheet, sheets, open, focus: focus?.key, focusOn }), [sheet, sheets, open, focus?.key, focusOn]);
  const shown = focus?.layout ?? layout;

  return (
    <ReactFlowProvider key={focus?.key ?? ""}>
      <LineEndMarkers />
      {shown ? (
        <SheetDrawing space={space} layout={shown} changeLayout={focus ? changeFocus : change} place={place} seen={Math.max(seen, unfocused)} />
      ) : (
        <div className="sheet" aria-busy="true" />
      )}
    </ReactFlowProvider>
  );
}
