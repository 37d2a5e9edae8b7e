import { X } from "lucide-react";
import { useMemo, useState } from "react";
import { Combobox } from "~/components/ui/combobox";
import { IconButton } from "~/components/ui/button";
import { Table, Td, Th } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import { FindingShape } from "~/components/notation/finding-badge";
import type { LibraryChoice } from "~/services/list-library-choices.server";
import { baseModelUri, listRequired, searchChoices, type RequiredRow } from "./required-closure";

type Props = {
  choices: readonly LibraryChoice[];
  chosen: readonly string[];
  onChange: (chosen: readonly string[]) => void;
  name?: string;
  disabled?: boolean;
};

const originWords: Record<LibraryChoice["origin"], string> = {
  published: "published",
  added: "added by the team",
  team: "a model of the team",
};

/** Required models: found by search, with everything that comes along listed below. */
export function RequiredModelsField({ choices, chosen, onChange, name = "required", disabled = false }: Props) {
  const [query, setQuery] = useState("");
  const rows = useMemo(() => listRequired(choices, chosen), [choices, chosen]);
  const open = choices.filter((choice) => choice.modelUri !== baseModelUri && !chosen.includes(choice.modelUri));
  const found = searchChoices(open, query);
  const titleOf = (uri: string) => rows.find((row) => row.modelUri === uri)?.choice?.title ?? uri;
  return (
    <fieldset className="grid gap-2">
      <legend className="sr-only">Required models</legend>
      {chosen.map((uri) => (
        <input key={uri} type="hidden" name={name} value={uri} />
      ))}
      {disabled ? null : (
        <Combobox
          label="Add a required model"
          placeholder="Search the library: Machinery, Devices, IO-Link …"
          query={query}
          onQuery={setQuery}
          items={found}
          itemKey={(choice) => `${choice.modelUri} ${choice.version ?? ""}`}
          onPick={(choice) => {
            onChange([...chosen, choice.modelUri]);
            setQuery("");
          }}
          head={
            <>
              <span className="font-mono">
                {found.length} of {open.length}
              </span>
              <span>models of the library</span>
            </>
          }
          none="No model of the library has these words"
          renderItem={(choice) => (
            <span className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-3">
              <b className="font-semibold">{choice.title}</b>
              <span className="font-mono text-note text-ink-2">{choice.version}</span>
              <span className="truncate font-mono text-note text-ink-3">{choice.modelUri}</span>
              <span className="text-note text-ink-3">{originWords[choice.origin]}</span>
            </span>
          )}
        />
      )}
      <Table caption="Models that this model stands on">
        <thead>
          <tr>
            <Th>Stands on</Th>
            <Th>Version</Th>
            <Th>Because</Th>
            <Th className="w-8">
              <span className="sr-only">Remove</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.modelUri}>
              <Td>
                <span className="flex items-baseline gap-2">
                  {row.choice ? null : <FindingShape severity="error" />}
                  <b className="font-semibold">{row.choice?.title ?? "Missing"}</b>
                  <span className="truncate font-mono text-note text-ink-3">{row.modelUri}</span>
                </span>
              </Td>
              <Td mono>{row.choice?.version}</Td>
              <Td className="text-ink-2">
                <span className="flex items-center gap-2">
                  {chosen.includes(row.modelUri) ? <Tag tone="ink">chosen</Tag> : null}
                  {explain(row, titleOf)}
                </span>
              </Td>
              <Td right>
                {chosen.includes(row.modelUri) && !disabled ? (
                  <IconButton
                    icon={X}
                    size="small"
                    label={`Do not require ${titleOf(row.modelUri)}`}
                    onClick={() => onChange(chosen.filter((uri) => uri !== row.modelUri))}
                  />
                ) : null}
              </Td>
            </tr>
          ))}
        </tbody>
      </Table>
    </fieldset>
  );
}

function explain({ modelUri, askedBy }: RequiredRow, titleOf: (uri: string) => string): string {
  if (modelUri === baseModelUri) return "every model does";
  return askedBy.length === 0 ? "" : `${askedBy.map(titleOf).join(", ")} ${askedBy.length === 1 ? "needs" : "need"} it`;
}
