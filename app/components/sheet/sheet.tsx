import { ReactFlowProvider } from "@xyflow/react";
import "./sheet.css";
import { useOpenModel, useSpace } from "../model/use-model";
import { LineEndMarkers } from "../notation/line-ends";
import { SheetDrawing } from "./sheet-drawing";
import { useSheetLayout } from "./use-sheet-layout";

/** The graph view of a model in the standard's notation, framed like a drawing. */
export function Sheet({ sheetId }: { sheetId: string }) {
  const { workspace, actions } = useOpenModel();
  const space = useSpace();
  const { layout, change } = useSheetLayout(workspace.model.id, sheetId, actions.canEdit);
  return (
    <ReactFlowProvider>
      <LineEndMarkers />
      {layout ? <SheetDrawing space={space} layout={layout} changeLayout={change} /> : <div className="sheet" aria-busy="true" />}
    </ReactFlowProvider>
  );
}
