import { ChevronDown, Plus, Printer } from "lucide-react";
import { useRef, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getNodeName } from "../model/member-facts";
import { useOpenModel, useView } from "../model/use-model";
import { Button } from "../ui/button";
import { cx } from "../ui/cx";
import { Icon } from "../ui/icon";
import { Menu, type MenuEntry } from "../ui/menu";
import type { SheetActions } from "./use-sheet-actions";
import type { SheetPlace } from "./sheet-place";

type Props = { space: AddressSpace; place: SheetPlace; sheetActions: SheetActions };

/** The sheets of the model as tabs on the upper edge of the frame, with what can be done to the open one. */
export function SheetStrip({ space, place, sheetActions }: Props) {
  const { workspace, actions } = useOpenModel();
  const [renaming, setRenaming] = useState(false);
  const chosen = useView((state) => state.selection.length);
  const { sheet, sheets, open, focus, focusOn } = place;

  if (focus !== undefined) {
    return (
      <div className="sheet-strip" role="group" aria-label="Focus">
        <span className="px-1 text-small">
          Focus on <b className="font-semibold">{getNodeName(space, focus)}</b> and what it is joined with
        </span>
        <Button size="small" onClick={() => focusOn(undefined)}>
          Back to {sheet.name}
        </Button>
        {actions.canEdit ? (
          <Button size="small" tone="bare" onClick={sheetActions.keepFocus}>
            Keep as a sheet
          </Button>
        ) : null}
      </div>
    );
  }
  return (
    <div className="sheet-strip">
      <nav aria-label={`Sheets of ${workspace.model.name}`} className="sheet-tabs">
        {sheets.sheets.map((entry) =>
          entry.id === sheet.id && renaming ? (
            <NameOfSheet
              key={entry.id}
              name={entry.name}
              onDone={(name) => {
                setRenaming(false);
                if (name !== undefined && name !== entry.name) sheets.rename(entry.id, name);
              }}
            />
          ) : (
            <button
              key={entry.id}
              type="button"
              className={cx("sheet-tab", entry.id === sheet.id && "is-open")}
              aria-current={entry.id === sheet.id ? "page" : undefined}
              onClick={() => open(entry.id)}
              onDoubleClick={() => {
                if (actions.canEdit && entry.id === sheet.id) setRenaming(true);
              }}
            >
              {entry.name}
            </button>
          ),
        )}
      </nav>
      {actions.canEdit ? (
        <Menu
          label="New sheet"
          trigger={
            <Button size="small" tone="bare" icon={Plus}>
              New sheet
            </Button>
          }
          entries={[
            {
              label: "From the selection",
              note: chosen === 1 ? "1 node" : `${chosen} nodes`,
              disabled: chosen === 0,
              onSelect: sheetActions.addFromSelection,
            },
            { label: "Empty", onSelect: sheetActions.addEmpty },
          ]}
        />
      ) : null}
      <Menu
        label={`Sheet ${sheet.name}`}
        trigger={
          <Button size="small" tone="bare">
            This sheet <Icon of={ChevronDown} />
          </Button>
        }
        entries={listEntries(place, sheetActions, actions.canEdit, () => setRenaming(true))}
      />
    </div>
  );
}

function listEntries({ sheet, sheets }: SheetPlace, sheetActions: SheetActions, canEdit: boolean, rename: () => void): MenuEntry[] {
  const at = sheets.sheets.findIndex((entry) => entry.id === sheet.id);
  const last = sheets.sheets.length - 1;
  const edits: MenuEntry[] = canEdit
    ? [
        { label: "Rename", onSelect: () => setTimeout(rename) },
        { label: "Duplicate", onSelect: sheetActions.duplicate },
        { label: "Move left", disabled: at <= 0, onSelect: () => sheets.move(sheet.id, at - 1) },
        { label: "Move right", disabled: at >= last, onSelect: () => sheets.move(sheet.id, at + 1) },
        { kind: "rule" },
      ]
    : [];
  const remove: MenuEntry[] = canEdit
    ? [
        { kind: "rule" },
        {
          label: "Delete the sheet",
          danger: true,
          disabled: last === 0,
          ...(last === 0 ? { note: "a model keeps one" } : {}),
          onSelect: sheetActions.remove,
        },
      ]
    : [];
  return [
    ...edits,
    { label: "Save as SVG", onSelect: sheetActions.saveSvg },
    { label: "Save as PNG", onSelect: sheetActions.savePng },
    { label: "Print, or save as PDF", icon: Printer, onSelect: sheetActions.print },
    ...remove,
  ];
}

/** Enter keeps the name, Esc leaves it. */
function NameOfSheet({ name, onDone }: { name: string; onDone: (name: string | undefined) => void }) {
  const isDone = useRef(false);
  const finish = (text: string | undefined): void => {
    if (isDone.current) return;
    isDone.current = true;
    onDone(text === undefined || text.trim() === "" ? undefined : text.trim());
  };
  return (
    <input
      className="sheet-tab is-open"
      aria-label={`New name of sheet ${name}`}
      defaultValue={name}
      maxLength={100}
      size={Math.max(8, name.length)}
      ref={(field) => {
        field?.focus();
        field?.select();
      }}
      onBlur={(event) => finish(event.currentTarget.value)}
      onKeyDown={(event) => {
        event.stopPropagation();
        if (event.key === "Enter") finish(event.currentTarget.value);
        else if (event.key === "Escape") finish(undefined);
      }}
    />
  );
}
