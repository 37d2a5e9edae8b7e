import { useState, type FormEvent } from "react";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { listMissingAddress, sourceKinds, type SourceAddress, type SourceKind } from "~/domain/mapping/source-settings";
import type { SourceView } from "~/services/read-sources.server";
import { addressFields, addressWords, kindWords, numberFields, type AddressField } from "./source-words";
import type { SourceActions } from "./use-source-actions";

type Props = { source: SourceView | undefined; actions: SourceActions; onDone: () => void };

/** Name, kind and address of a source. */
export function SourceForm({ source, actions, onDone }: Props) {
  const [name, setName] = useState(source?.name ?? "");
  const [kind, setKind] = useState<SourceKind>(source?.kind ?? "rest-master");
  const [texts, setTexts] = useState<Readonly<Record<string, string>>>(() =>
    Object.fromEntries(
      Object.entries({ portCount: 8, port: 502, ...source?.address }).map(([key, value]) => [key, String(value)]),
    ),
  );
  const [note, setNote] = useState(source?.note ?? "");
  const address = toAddress(kind, texts);
  const missing = new Set(listMissingAddress({ kind, address }));

  async function submit(event: FormEvent): Promise<void> {
    event.preventDefault();
    const saved = await actions.send({
      intent: "save-source",
      value: { ...(source ? { id: source.id } : {}), name: name.trim(), kind, address, note },
    });
    if (saved) onDone();
  }
  return (
    <form onSubmit={(event) => void submit(event)} className="grid gap-3">
      <div className="grid grid-cols-[1fr_2fr] gap-3">
        <Field label="Name">
          {(tied) => (
            <Input
              {...tied}
              required
              maxLength={100}
              value={name}
              autoFocus
              onChange={(event) => setName(event.currentTarget.value)}
            />
          )}
        </Field>
        <Field label="Kind">
          {(tied) => (
            <Select {...tied} value={kind} onChange={(event) => setKind(event.currentTarget.value as SourceKind)}>
              {sourceKinds.map((one) => (
                <option key={one} value={one}>
                  {kindWords[one]}
                </option>
              ))}
            </Select>
          )}
        </Field>
      </div>
      <div className="grid grid-cols-2 gap-3">
        {addressFields[kind].map((field) => (
          <AddressInput
            key={field}
            field={field}
            value={texts[field] ?? ""}
            onChange={(text) => setTexts({ ...texts, [field]: text })}
            isNeeded={missing.has(field)}
          />
        ))}
        {(["periodMs", "timeoutMs"] as const).map((field) => (
          <Field key={field} label={field === "periodMs" ? "Read every" : "Answer within"}>
            {(tied) => (
              <Input
                {...tied}
                mono
                unit="ms"
                inputMode="numeric"
                value={texts[field] ?? (field === "periodMs" ? "500" : "2000")}
                onChange={(event) => setTexts({ ...texts, [field]: event.currentTarget.value })}
              />
            )}
          </Field>
        ))}
      </div>
      <Field label="Note" optional>
        {(tied) => (
          <Input {...tied} maxLength={2_000} value={note} onChange={(event) => setNote(event.currentTarget.value)} />
        )}
      </Field>
      <p className="text-note text-ink-3">Passwords and keys are never kept here; a gateway holds its own.</p>
      <div className="flex justify-end gap-2">
        <Button onClick={onDone}>Cancel</Button>
        <Button
          type="submit"
          tone="main"
          busy={actions.isBusy}
          blockedBy={actions.blockedBy ?? (name.trim() === "" ? "it needs a name" : undefined)}
        >
          {source ? "Save the source" : "Add the source"}
        </Button>
      </div>
    </form>
  );
}

function AddressInput({
  field,
  value,
  onChange,
  isNeeded,
}: {
  field: AddressField;
  value: string;
  onChange: (text: string) => void;
  isNeeded: boolean;
}) {
  const [label, hint] = addressWords[field];
  return (
    <Field label={label} hint={hint} optional={!isNeeded && value === ""}>
      {(tied) => (
        <Input
          {...tied}
          mono
          required={isNeeded}
          inputMode={numberFields.has(field) ? "numeric" : "text"}
          value={value}
          spellCheck={false}
          onChange={(event) => onChange(event.currentTarget.value)}
        />
      )}
    </Field>
  );
}

/** What the form says as an address; a figure that is none stays text, so that the server names the field. */
function toAddress(kind: SourceKind, texts: Readonly<Record<string, string>>): SourceAddress {
  const entries = [...addressFields[kind], "periodMs", "timeoutMs"].flatMap((field) => {
    const text = (texts[field] ?? "").trim();
    if (text === "") return [];
    const isNumber = numberFields.has(field as AddressField) || field.endsWith("Ms");
    return [[field, isNumber && /^\d+$/.test(text) ? Number(text) : text] as const];
  });
  return Object.fromEntries(entries) as SourceAddress;
}
