import { X } from "lucide-react";
import { useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { hasValueAttributes } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getNodeName, RULE_KEYS, type RuleName } from "../model/member-facts";
import { MoveMenu } from "../model/move-menu";
import { TypeSearch } from "../model/type-search";
import { UnitSearch } from "../model/unit-search";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Input } from "../ui/field";
import { Menu } from "../ui/menu";

type Props = {
  space: AddressSpace;
  selection: readonly NodeKey[];
  /** Gives all rows what the first has in the column of the cursor. */
  fill: { readonly column: string | undefined; readonly run: () => void };
};

/** What can be done to all selected rows; each press is one edit, undone with one step. */
export function BulkBar({ space, selection, fill }: Props) {
  const { actions, view } = useOpenModel();
  const [open, setOpen] = useState<"unit" | "range" | "dataType" | "move">();
  const keys = selection.filter((key) => actions.mayChange(key));
  const variables = keys.filter((key) => space.getNode(key)?.nodeClass === "Variable");
  const valued = keys.filter((key) => hasValue(space, key));
  const names = selection.slice(0, 4).map((key) => getNodeName(space, key));
  const instances = keys.filter((key) => !space.getNode(key)?.nodeClass.endsWith("Type"));

  return (
    <div className="register-bulk" role="toolbar" aria-label="Selected rows">
      <b>{selection.length} rows</b>
      <span className="max-w-80 truncate text-ink-2">
        {names.join(", ")}
        {selection.length > names.length ? " …" : ""}
      </span>
      <i className="register-rule" />
      <Menu
        label="Rule"
        trigger={<Button size="small" {...(instances.length === 0 ? { blockedBy: "none of these nodes takes a modelling rule" } : {})}>Rule</Button>}
        entries={(Object.keys(RULE_KEYS) as RuleName[]).map((rule) => ({
          label: rule,
          onSelect: () => actions.changeCells(instances.map((key) => ({ key, column: "rule", text: rule })), "set-rule"),
        }))}
      />
      {open === "unit" ? (
        <div className="w-56">
          <UnitSearch
            label="Unit of the selected rows"
            initial=""
            onPick={(unit) => {
              actions.setUnit(variables, unit);
              setOpen(undefined);
            }}
            onCancel={() => setOpen(undefined)}
          />
        </div>
      ) : (
        <Button size="small" onClick={() => setOpen("unit")} {...(variables.length === 0 ? { blockedBy: "no Variable is selected" } : {})}>
          Unit
        </Button>
      )}
      {open === "range" ? (
        <Input
          size="small"
          mono
          autoFocus
          className="w-36!"
          aria-label="EURange of the selected rows"
          placeholder="min … max"
          onBlur={() => setOpen(undefined)}
          onKeyDown={(event) => {
            if (event.key === "Escape") setOpen(undefined);
            if (event.key !== "Enter") return;
            const text = event.currentTarget.value;
            actions.changeCells(variables.map((key) => ({ key, column: "range", text })), "set-range");
            setOpen(undefined);
          }}
        />
      ) : (
        <Button size="small" onClick={() => setOpen("range")} {...(variables.length === 0 ? { blockedBy: "no Variable is selected" } : {})}>
          EURange
        </Button>
      )}
      {open === "dataType" ? (
        <div className="w-56">
          <TypeSearch
            label="DataType of the selected rows"
            space={space}
            kind="DataType"
            initial=""
            onPick={(type) => {
              actions.setDataType(valued, type);
              setOpen(undefined);
            }}
            onCancel={() => setOpen(undefined)}
          />
        </div>
      ) : (
        <Button size="small" onClick={() => setOpen("dataType")} {...(valued.length === 0 ? { blockedBy: "no Variable is selected" } : {})}>
          DataType
        </Button>
      )}
      <Menu
        label="Access"
        trigger={<Button size="small" {...(variables.length === 0 ? { blockedBy: "no Variable is selected" } : {})}>Access</Button>}
        entries={["R", "RW", "W", "RH", "RWH"].map((access) => ({
          label: access,
          onSelect: () => actions.changeCells(variables.map((key) => ({ key, column: "access", text: access })), "set-access"),
        }))}
      />
      <Button size="small" onClick={() => setOpen("move")} {...(keys.length === 0 ? { blockedBy: "these nodes belong to required models" } : {})}>
        Move to …
      </Button>
      {open === "move" ? <MoveMenu keys={keys} onClose={() => setOpen(undefined)} /> : null}
      <i className="register-rule" />
      <Button
        size="small"
        title="Ctrl D"
        onClick={fill.run}
        {...(fill.column === undefined ? { blockedBy: "put the cursor into the column first" } : keys.length === 0 ? { blockedBy: "these nodes belong to required models" } : {})}
      >
        Fill {fill.column ?? ""} down
      </Button>
      <Button size="small" onClick={() => actions.duplicate(keys)} {...(keys.length === 0 ? { blockedBy: "these nodes belong to required models" } : {})}>
        Duplicate
      </Button>
      <Button size="small" tone="danger" onClick={() => actions.remove(keys)} {...(keys.length === 0 ? { blockedBy: "these nodes belong to required models" } : {})}>
        Delete
      </Button>
      <span className="ml-auto truncate text-ink-2">one edit, undone with one step</span>
      <Button size="small" tone="bare" icon={X} onClick={() => view.select([])}>
        Clear
      </Button>
    </div>
  );
}

function hasValue(space: AddressSpace, key: NodeKey): boolean {
  const node = space.getNode(key);
  return node !== undefined && hasValueAttributes(node);
}
