import { useState } from "react";
import { Form, useNavigation } from "react-router";
import { describe } from "~/components/model/edit-steps";
import { listParents } from "~/components/model/list-parents";
import { getNodeName } from "~/components/model/member-facts";
import { OptionalMembers } from "~/components/model/optional-members";
import { TypeSearch } from "~/components/model/type-search";
import { FindingShape, FindingTallyBadge } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block } from "~/components/ui/page";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listMachines } from "~/domain/instantiation/list-machines";
import {
  MACHINES,
  proposeNextName,
  type NodeIdPolicy,
  type RollOutIntent,
  type RollOutRow,
} from "~/domain/instantiation/roll-out-machines";
import { formatCount } from "~/utils/format";
import { MachineRows } from "./machine-rows";
import { NodeIdChoice } from "./node-id-choice";
import { previewRollOut, type RollOutPreview } from "./preview-roll-out";

type Props = { space: AddressSpace; editBlockedBy: string | undefined };

/** Many machines of one type in one go: a table, a look at what comes of it, one step. */
export function RollOutView({ space, editBlockedBy }: Props) {
  const machines = listMachines(space);
  const last = machines.at(-1);
  const parents = listParents(space);
  const busy = useNavigation().state !== "idle";
  const [type, setType] = useState<NodeKey | undefined>(last?.typeKey);
  const [parent, setParent] = useState<NodeKey | undefined>(
    parents.find((choice) => choice.key === MACHINES)?.key ?? parents[0]?.key,
  );
  const [optional, setOptional] = useState<readonly string[]>([]);
  const [manufacturer, setManufacturer] = useState(last?.identification.Manufacturer ?? "");
  const [rows, setRows] = useState<readonly RollOutRow[]>([
    { name: proposeNextName(last?.name ?? ""), serialNumber: "", location: "" },
  ]);
  const [nodeIds, setNodeIds] = useState<NodeIdPolicy>({ kind: "numbers" });
  const [preview, setPreview] = useState<RollOutPreview | undefined>(undefined);
  const intent: RollOutIntent | undefined =
    type && parent ? { type, parent, optional, manufacturer, rows, nodeIds } : undefined;
  const missing = intent
    ? rows.some((row) => row.name.trim() === "")
      ? "a machine has no name"
      : undefined
    : "choose the type first";

  /** Whatever is changed, the preview told of something else. */
  const changing =
    <T,>(set: (value: T) => void) =>
    (value: T) => {
      set(value);
      setPreview(undefined);
    };
  return (
      <div className="grid grid-cols-[minmax(0,1fr)_340px] gap-8 max-lg:grid-cols-1">
        <div className="grid content-start gap-6">
          <Block title="Machines" about="cells may be pasted from a spreadsheet">
            <MachineRows
              rows={rows}
              onChange={changing(setRows)}
              common={optional}
              choiceFor={(row, onChoose) =>
                type && parent ? (
                  <OptionalMembers space={space} parent={parent} type={type} chosen={row.optional ?? optional} onChoose={onChoose} />
                ) : null
              }
            />
          </Block>
          {type && parent ? (
            <OptionalMembers
              space={space}
              parent={parent}
              type={type}
              chosen={optional}
              onChoose={changing(setOptional)}
            />
          ) : null}
        </div>
        <aside className="grid content-start gap-4 border-t-[1.5px] border-ink pt-3">
          <Field label="Type" hint={type ? <i>{getNodeName(space, type)}</i> : "Search it in the loaded models."}>
            {(tied) => (
              <TypeSearch
                label="Type"
                id={tied.id}
                space={space}
                kind="ObjectType"
                concreteOnly
                autoFocus={false}
                placeholder={type ? "Search another type" : "Search a type"}
                onPick={changing(setType)}
              />
            )}
          </Field>
          <Field label="Below">
            {(tied) => (
              <Select
                {...tied}
                value={parent ?? ""}
                onChange={(event) => changing(setParent)(event.currentTarget.value as NodeKey)}
              >
                {parents.map((choice) => (
                  <option key={choice.key} value={choice.key}>
                    {choice.label}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Field label="Manufacturer" optional hint="Written into the identification of each.">
            {(tied) => (
              <Input
                {...tied}
                value={manufacturer}
                onChange={(event) => changing(setManufacturer)(event.currentTarget.value)}
              />
            )}
          </Field>
          <NodeIdChoice policy={nodeIds} onChange={changing(setNodeIds)} example={rows[0]} />
          <Button
            className="justify-self-start"
            blockedBy={missing}
            onClick={() => intent && setPreview(previewRollOut(space, intent))}
          >
            Preview
          </Button>
          {preview ? <Preview preview={preview} space={space} /> : null}
          <Form method="post">
            <input type="hidden" name="intent" value={JSON.stringify(intent ?? null)} />
            <Button type="submit" tone="main" busy={busy} blockedBy={editBlockedBy ?? missing}>
              Roll out {rows.length} {rows.length === 1 ? "machine" : "machines"}
            </Button>
          </Form>
          <p className="text-note text-ink-3">One transaction: all of them are made, or none.</p>
        </aside>
      </div>
  );
}

function Preview({ preview, space }: { preview: RollOutPreview; space: AddressSpace }) {
  if (!preview.ok)
    return (
      <Notice tone="error" glyph={<FindingShape severity="error" />} title="It cannot be made" live>
        {describe(space, preview.problems).join(" ")}
      </Notice>
    );
  const tally = { error: 0, warning: 0, hint: 0 };
  for (const { severity } of preview.findings) tally[severity]++;
  const rules = new Map(preview.findings.map((finding) => [finding.rule, finding.message] as const));
  return (
    <Notice tone={tally.error > 0 ? "error" : "plain"} title={`${formatCount(preview.nodes)} nodes would be made`} live>
      <p className="mb-1 break-words">
        {preview.machines.map((machine, i) => (
          <span key={machine.nodeId}>
            {i > 0 ? ", " : ""}
            {machine.name} <span className="font-mono text-note text-ink-3">{machine.nodeId}</span>
          </span>
        ))}
      </p>
      <span className="flex items-center gap-2">
        Findings in them: <FindingTallyBadge tally={tally} showNone />
      </span>
      <ul>
        {[...rules].slice(0, 5).map(([rule, message]) => (
          <li key={rule} className="text-note text-ink-2">
            <span className="font-mono">{rule}</span> {message}
          </li>
        ))}
      </ul>
    </Notice>
  );
}
