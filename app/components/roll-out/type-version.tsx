import { useState } from "react";
import { Form, useNavigation, useSearchParams } from "react-router";
import { DifferenceBadge, RatingBadge } from "~/components/notation/difference-badge";
import { FindingShape } from "~/components/notation/finding-badge";
import { toDifference } from "~/components/revisions/to-difference";
import { Button, TextLink } from "~/components/ui/button";
import { Checkbox, Field, Select } from "~/components/ui/field";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { PinSummary } from "~/services/pins.server";
import type { MachinePreview, RevisionPreview } from "~/services/take-revision.server";

type Props = {
  pin: PinSummary;
  preview: RevisionPreview | null;
  clientId: string;
  editBlockedBy: string | undefined;
};

/** The frozen revision of the types that the machines stand on, and the way to another one. */
export function TypeVersion({ pin, preview, clientId, editBlockedBy }: Props) {
  const [, setSearch] = useSearchParams();
  const isLooking = useNavigation().state === "loading";
  const behind = Object.keys(pin.behind).length;
  const [number, setNumber] = useState(preview?.to ?? pin.newest);
  return (
    <Block title="Type version" className="mb-8">
      <div className="flex flex-wrap items-end gap-x-6 gap-y-3 border-t border-ink pt-3">
        <p className="min-w-80 flex-1 text-small">
          <TextLink to={`/models/${pin.modelId}/revisions`}>
            <b className="font-semibold">{pin.modelName}</b>
          </TextLink>{" "}
          is held at <b className="font-semibold">revision {pin.number}</b>, “{pin.message}”, frozen by {pin.author}.{" "}
          <span className="text-ink-2">{tellNews(pin, behind)}</span>
        </p>
        <Field label="Revision to look at" inline>
          {(tied) => (
            <Select {...tied} size="small" className="w-64" value={number} onChange={(event) => setNumber(Number(event.currentTarget.value))}>
              {pin.revisions.map((revision) => (
                <option key={revision.number} value={revision.number}>
                  {`${revision.number} · ${revision.message.slice(0, 48)}${revision.number === pin.number ? " (held now)" : ""}`}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Button
          busy={isLooking}
          blockedBy={number === pin.number && behind === 0 ? "the machines stand on this revision" : undefined}
          onClick={() => setSearch({ of: pin.modelUri, take: String(number) }, { preventScrollReset: true })}
        >
          Show what it brings
        </Button>
      </div>
      {preview ? <Update preview={preview} clientId={clientId} editBlockedBy={editBlockedBy} onLeave={() => setSearch({}, { preventScrollReset: true })} /> : null}
    </Block>
  );
}

function tellNews(pin: PinSummary, behind: number): string {
  const late = behind > 0 ? `${behind} ${behind === 1 ? "machine follows" : "machines follow"} an earlier one. ` : "";
  if (pin.newest > pin.number) return `${late}Revision ${pin.newest} is frozen since.`;
  if (pin.editsSince > 0) return `${late}The types have ${pin.editsSince} ${pin.editsSince === 1 ? "edit" : "edits"} since; they reach the machines when they are frozen and taken.`;
  return `${late}The types were not changed since.`;
}

type UpdateProps = { preview: RevisionPreview; clientId: string; editBlockedBy: string | undefined; onLeave: () => void };

function Update({ preview, clientId, editBlockedBy, onLeave }: UpdateProps) {
  const busy = useNavigation().state === "submitting";
  const touched = preview.machines.filter((machine) => machine.facts.length > 0);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const chosen = touched.filter((machine) => !left.has(machine.key));
  const isSame = preview.from === preview.to;
  function toggle(key: string, follows: boolean): void {
    const next = new Set(left);
    if (follows) next.delete(key);
    else next.add(key);
    setLeft(next);
  }
  const take = { modelUri: preview.modelUri, number: preview.to, machines: chosen.map((machine) => machine.key), clientId };
  return (
    <div className="mt-4 grid gap-5 border-[1.5px] border-ink bg-leaf p-4">
      {preview.comparison && !isSame ? <TypeChanges preview={preview} /> : null}
      <section>
        <h3 className="mb-1 font-semibold">
          What the machines get <span className="font-mono font-normal text-ink-3">{touched.length} of {preview.machines.length}</span>
        </h3>
        {touched.length === 0 ? (
          <p className="border-t border-hair pt-1.5 text-small text-ink-2">Nothing in them has to change.</p>
        ) : (
          <MachineChanges machines={touched} left={left} onToggle={toggle} />
        )}
      </section>
      <NewFindings findings={preview.findings} />
      <Form method="post" className="flex items-center gap-3">
        <input type="hidden" name="take" value={JSON.stringify(take)} />
        <Button type="submit" tone="main" busy={busy} blockedBy={editBlockedBy ?? (isSame && chosen.length === 0 ? "no machine is chosen" : undefined)}>
          {isSame ? `Update ${count(chosen.length)}` : `Take revision ${preview.to}, update ${count(chosen.length)}`}
        </Button>
        <Button tone="bare" onClick={onLeave}>
          Leave it
        </Button>
        <span className="text-note text-ink-3">One transaction. A machine that is left out keeps what it has and may follow later.</span>
      </Form>
    </div>
  );
}

function count(machines: number): string {
  return `${machines} ${machines === 1 ? "machine" : "machines"}`;
}

function TypeChanges({ preview }: { preview: RevisionPreview }) {
  const changes = preview.comparison?.changes ?? [];
  return (
    <section>
      <h3 className="mb-1 font-semibold">
        What changed in the types, revision {preview.from} to {preview.to} <span className="font-mono font-normal text-ink-3">{changes.length}</span>
      </h3>
      <TableScroll label="Changes of the types" className="max-h-64 overflow-y-auto">
        <Table caption="Changes of the types">
          <thead>
            <tr>
              <Th className="w-7">
                <span className="sr-only">Added, removed or changed</span>
              </Th>
              <Th>Where</Th>
              <Th>Change</Th>
              <Th>Before</Th>
              <Th>After</Th>
              <Th>For readers</Th>
            </tr>
          </thead>
          <tbody>
            {changes.map((change, i) => (
              <Tr key={`${change.kind} ${change.path} ${i}`}>
                <Td>
                  <DifferenceBadge difference={toDifference(change)} />
                </Td>
                <Td className="font-semibold">{change.path || "the model"}</Td>
                <Td className="whitespace-nowrap">
                  {change.kind.replaceAll("-", " ")}
                  {change.detail ? <span className="text-ink-3"> · {change.detail}</span> : null}
                </Td>
                <Td mono className="text-note text-ink-2">
                  {change.before ?? ""}
                </Td>
                <Td mono className="text-note">
                  {change.after ?? ""}
                </Td>
                <Td>
                  <RatingBadge rating={change.rating} />
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </section>
  );
}

const words: Record<MachinePreview["facts"][number]["kind"], string> = {
  "missing-member": "gets",
  "removed-member": "loses",
  "renamed-member": "renames",
  "changed-attribute": "takes over",
};

type MachineChangesProps = { machines: readonly MachinePreview[]; left: ReadonlySet<string>; onToggle: (key: string, follows: boolean) => void };

function MachineChanges({ machines, left, onToggle }: MachineChangesProps) {
  return (
    <ul className="border-t border-ink">
      {machines.map((machine) => (
        <li key={machine.key} className="grid grid-cols-[180px_minmax(0,1fr)] gap-x-4 border-b border-hair py-1.5 text-small">
          <Checkbox
            label={<b className="font-semibold">{machine.name}</b>}
            hint={`follows revision ${machine.follows}`}
            checked={!left.has(machine.key)}
            onChange={(event) => onToggle(machine.key, event.currentTarget.checked)}
          />
          <ul className={left.has(machine.key) ? "text-ink-3" : ""}>
            {machine.facts.map((fact) => (
              <li key={`${fact.kind} ${fact.path} ${fact.attribute ?? ""}`}>
                {words[fact.kind]} <b className="font-semibold">{fact.path}</b>
                {fact.attribute ? <span className="text-ink-2"> {fact.attribute}</span> : null}
                {fact.to === undefined && fact.from === undefined ? null : (
                  <span className="font-mono text-note text-ink-2">
                    {" "}
                    {fact.from ?? "nothing"} → {fact.to ?? "nothing"}
                  </span>
                )}
              </li>
            ))}
          </ul>
        </li>
      ))}
    </ul>
  );
}

function NewFindings({ findings }: { findings: RevisionPreview["findings"] }) {
  return (
    <section>
      <h3 className="mb-1 font-semibold">
        Findings that come with it <span className="font-mono font-normal text-ink-3">{findings.length}</span>
      </h3>
      {findings.length === 0 ? (
        <p className="border-t border-hair pt-1.5 text-small text-ink-2">None, when all machines follow.</p>
      ) : (
        <ul className="max-h-48 overflow-y-auto border-t border-ink text-small">
          {findings.map((finding, i) => (
            <li key={`${finding.rule} ${finding.path} ${i}`} className="flex items-start gap-2 border-b border-hair py-1">
              <span className="pt-0.5">
                <FindingShape severity={finding.severity} />
              </span>
              <span>
                <span className="font-mono text-note text-ink-3">{finding.rule}</span> <b className="font-semibold">{finding.path.replaceAll("/", " / ")}</b> {finding.message}
              </span>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
