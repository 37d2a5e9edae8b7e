import { makeAddRequest } from "../model/add-request";
import type { PaletteEntry } from "../palette/palette-store";
import type { SheetControl } from "./sheet-control";
import type { SheetActions } from "./use-sheet-actions";

const ADDABLE = ["ObjectType", "VariableType", "DataType", "ReferenceType", "Object", "Variable", "Property", "Method"] as const;

/** What the palette offers while a sheet is open. */
export function listPaletteActions(control: SheetControl, sheet: SheetActions, canEdit: boolean): PaletteEntry[] {
  const group = "Actions on this sheet";
  const looks: PaletteEntry[] = [
    { id: "arrange", label: "Arrange the cards", group, run: control.arrange },
    { id: "sheet-svg", label: "Save the sheet as SVG", group, run: sheet.saveSvg },
    { id: "sheet-png", label: "Save the sheet as PNG", group, run: sheet.savePng },
    { id: "sheet-print", label: "Print the sheet, or save it as PDF", group, run: sheet.print },
  ];
  if (!canEdit) return looks;
  const sheets: PaletteEntry[] = [
    { id: "sheet-from-selection", label: "New sheet from the selection", group, run: sheet.addFromSelection },
    { id: "sheet-empty", label: "New empty sheet", group, run: sheet.addEmpty },
    { id: "sheet-duplicate", label: "Duplicate this sheet", group, run: sheet.duplicate },
  ];
  const adds = ADDABLE.map((kind) => ({ id: `add-${kind}`, label: `Add ${kind === "DataType" ? "enumeration" : kind}`, group, run: () => control.add(makeAddRequest(kind)) }));
  return [...looks, ...sheets, ...adds];
}
