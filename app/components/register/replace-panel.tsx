import { X } from "lucide-react";
import { useDeferredValue, useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { composeEdit } from "../model/edit-steps";
import { findReplacements, toReplaceSteps, type ReplaceField, type Replacement } from "../model/find-replace";
import { formatPath } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { FindingShape } from "../notation/finding-badge";
import { Button, IconButton } from "../ui/button";
import { Checkbox, Input } from "../ui/field";
import { ToggleSegments } from "../ui/segments";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";

const FIELDS = [
  { value: "name", label: "Names" },
  { value: "displayName", label: "Display names" },
  { value: "description", label: "Descriptions" },
] as const satisfies readonly { value: ReplaceField; label: string }[];

const WORDS: Readonly<Record<ReplaceField, string>> = { name: "name", displayName: "display name", description: "description" };
const MOST_SHOWN = 300;

/** Find and replace: every place is shown with what it becomes, and all of them change in one edit. */
export function ReplacePanel({ space, onClose }: { space: AddressSpace; onClose: () => void }) {
  const { actions, editor, view } = useOpenModel();
  const [find, setFind] = useState("");
  const [replacement, setReplacement] = useState("");
  const [fields, setFields] = useState<ReadonlySet<ReplaceField>>(new Set(["name", "displayName", "description"]));
  const [isRegex, setRegex] = useState(false);
  const [matchesCase, setMatchesCase] = useState(true);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const question = useDeferredValue(useMemo(() => ({ find, replacement, isRegex, matchesCase, fields }), [find, replacement, isRegex, matchesCase, fields]));
  const found = useMemo(() => findReplacements(space, question, () => performance.now()), [space, question]);
  const chosen = useMemo(() => (found.ok ? found.replacements.filter((one) => !left.has(toId(one))) : []), [found, left]);
  const trial = useMemo(() => (chosen.length === 0 ? undefined : composeEdit(space, editor.allocator, toReplaceSteps(chosen))), [space, editor, chosen]);
  const refusal = !found.ok ? found.reason : trial && !trial.ok ? trial.reasons.join(" ") : undefined;

  function toggleField(field: ReplaceField): void {
    const next = new Set(fields);
    if (!next.delete(field)) next.add(field);
    setFields(next);
  }
  function replace(): void {
    if (actions.replaceTexts(toReplaceSteps(chosen), chosen.length)) onClose();
  }
  return (
    <section
      className="register-replace"
      aria-label="Find and replace"
      onKeyDown={(event) => {
        if (event.key === "Escape") onClose();
      }}
    >
      <form
        className="flex flex-wrap items-center gap-2.5"
        onSubmit={(event) => {
          event.preventDefault();
          if (chosen.length > 0 && refusal === undefined) replace();
        }}
      >
        <Input autoFocus size="small" className="w-52!" aria-label="Find" placeholder="Find" value={find} spellCheck={false} onChange={(event) => setFind(event.currentTarget.value)} />
        <Input size="small" className="w-52!" aria-label="Replace with" placeholder="Replace with" value={replacement} spellCheck={false} onChange={(event) => setReplacement(event.currentTarget.value)} />
        <ToggleSegments label="In" options={FIELDS} values={fields} onToggle={toggleField} />
        <Checkbox label="As written, small and capital" checked={matchesCase} onChange={(event) => setMatchesCase(event.currentTarget.checked)} />
        <Checkbox label="Regular expression" checked={isRegex} onChange={(event) => setRegex(event.currentTarget.checked)} />
        <Button
          type="submit"
          tone="main"
          size="small"
          className="ml-auto"
          blockedBy={!actions.canEdit ? "asks for the role engineer or administrator" : find === "" ? "write what to find" : chosen.length === 0 ? "nothing is found" : refusal}
        >
          Replace {chosen.length}
        </Button>
        <IconButton icon={X} size="small" label="Close find and replace" onClick={onClose} />
      </form>
      {refusal === undefined ? null : (
        <p className="mt-2 flex items-center gap-1.5 text-small" role="alert">
          <FindingShape severity="error" /> {refusal}
        </p>
      )}
      {found.ok && found.replacements.length > 0 ? (
        <TableScroll label="What would change" className="mt-2 max-h-56 overflow-y-auto border-t border-ink">
          <Table caption="What would change">
            <thead>
              <tr>
                <Th className="w-7">
                  <span className="sr-only">Replace it</span>
                </Th>
                <Th>Where</Th>
                <Th>What</Th>
                <Th>Before</Th>
                <Th>After</Th>
              </tr>
            </thead>
            <tbody>
              {found.replacements.slice(0, MOST_SHOWN).map((one) => (
                <ReplacementRow key={toId(one)} space={space} one={one} isChosen={!left.has(toId(one))} onToggle={() => setLeft(toggled(left, toId(one)))} onShow={() => view.reveal(one.key)} />
              ))}
            </tbody>
          </Table>
          {found.replacements.length > MOST_SHOWN ? <p className="py-1 text-note text-ink-3">and {found.replacements.length - MOST_SHOWN} more{found.isCut ? "; narrow the search to see all" : ""}</p> : null}
        </TableScroll>
      ) : null}
      <p className="sr-only" role="status">
        {find === "" ? "" : `${found.ok ? found.replacements.length : 0} places`}
      </p>
    </section>
  );
}

type RowProps = { space: AddressSpace; one: Replacement; isChosen: boolean; onToggle: () => void; onShow: () => void };

function ReplacementRow({ space, one, isChosen, onToggle, onShow }: RowProps) {
  const path = formatPath(space, one.key);
  return (
    <Tr className={isChosen ? "" : "text-ink-3"}>
      <Td>
        <input type="checkbox" className="size-3.5 accent-(--copper)" aria-label={`Replace in the ${WORDS[one.field]} of ${path}`} checked={isChosen} onChange={onToggle} />
      </Td>
      <Td>
        <button type="button" className="max-w-80 truncate text-left hover:text-copper" onClick={onShow}>
          {path}
        </button>
      </Td>
      <Td className="whitespace-nowrap text-ink-2">
        {WORDS[one.field]} {one.locale ? <span className="font-mono text-note">{one.locale}</span> : null}
      </Td>
      <Td className="text-ink-2">{one.before}</Td>
      <Td>{one.after}</Td>
    </Tr>
  );
}

function toId({ key, field, locale, before }: Replacement): string {
  return [key, field, locale ?? "", before].join("\n");
}

function toggled(set: ReadonlySet<string>, id: string): Set<string> {
  const next = new Set(set);
  if (!next.delete(id)) next.add(id);
  return next;
}
