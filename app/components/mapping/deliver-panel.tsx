import { Download } from "lucide-react";
import { useState } from "react";
import { useOpenModel } from "~/components/model/use-model";
import { buttonClass } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Field, Select } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Block } from "~/components/ui/page";
import type { NodeKey } from "~/domain/address-space/node-id";
import { ReadDocument } from "./read-document";

type Choice = { readonly key: NodeKey; readonly name: string };
type Props = {
  /** A machine type of a model of types. */
  type: Choice | undefined;
  /** The machines of a model of machines. */
  machines: readonly Choice[];
};

const typeFiles = [
  [
    "mapping-document",
    "mapping.json",
    "Mapping document",
    "JSON by the published schema: sources, layouts, transforms, units, quality. Read back it gives the same mapping.",
  ],
  ["mapping-table", "mapping.csv", "Mapping as a table", "CSV for people: one row a Variable."],
  ["signal-list", "signals.xlsx", "Signal list", "A workbook with every signal, its unit, range and source."],
] as const;

const machineFiles = [
  [
    "thing-description",
    "thing.json",
    "Thing Description",
    "W3C Web of Things 1.1 with Modbus and HTTP forms and OPC UA names, for one machine.",
  ],
  [
    "mapping-document",
    "mapping.json",
    "Mapping document",
    "The mapping as it holds for this machine: bindings and exceptions applied.",
  ],
  ["mapping-table", "mapping.csv", "Mapping as a table", "CSV for people, with ports and addresses of this machine."],
] as const;

/** What leaves the house of this mapping. */
export function DeliverPanel({ type, machines }: Props) {
  const { workspace } = useOpenModel();
  const [machine, setMachine] = useState(machines[0]?.key);
  const base = `/models/${workspace.model.id}/deliver`;
  if (!type && machines.length === 0)
    return <Empty title="Nothing to deliver yet">Map a type first, or roll out a machine.</Empty>;
  return (
    <div className="grid content-start gap-6">
      {type ? (
        <>
          <Block title="Files" about={<em>{type.name}</em>}>
            <Files
              files={typeFiles.map(([what, file, name, about]) => ({
                href: `${base}/${what}?type=${encodeURIComponent(type.key)}`,
                file,
                name,
                about,
              }))}
            />
          </Block>
          <ReadDocument type={type.key} />
        </>
      ) : (
        <Block
          title="Files of a machine"
          actions={
            <Field label="Machine" inline>
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  className="w-48!"
                  value={machine ?? ""}
                  onChange={(event) => setMachine(event.currentTarget.value as NodeKey)}
                >
                  {machines.map((one) => (
                    <option key={one.key} value={one.key}>
                      {one.name}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
          }
        >
          <Files
            files={machineFiles.map(([what, file, name, about]) => ({
              href: `${base}/${what}?machine=${encodeURIComponent(machine ?? "")}`,
              file,
              name,
              about,
            }))}
          />
        </Block>
      )}
    </div>
  );
}

function Files({ files }: { files: readonly { href: string; file: string; name: string; about: string }[] }) {
  return (
    <ul className="border-t border-ink">
      {files.map((one) => (
        <li
          key={one.href}
          className="grid grid-cols-[200px_minmax(0,1fr)_auto] items-center gap-4 border-b border-hair py-2 text-small"
        >
          <span className="font-semibold">{one.name}</span>
          <span className="text-ink-2">{one.about}</span>
          <a href={one.href} download className={buttonClass("plain", "small")}>
            <Icon of={Download} /> {one.file}
          </a>
        </li>
      ))}
    </ul>
  );
}
