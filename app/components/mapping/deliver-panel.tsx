import { useState } from "react";
import { useOpenModel } from "~/components/model/use-model";
import { Empty } from "~/components/ui/empty";
import { Checkbox, Field, Select } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block } from "~/components/ui/page";
import type { NodeKey } from "~/domain/address-space/node-id";
import { DownloadLink } from "./download-link";
import { ExportTemplates } from "./export-templates";
import { ReadDocument } from "./read-document";

type Choice = { readonly key: NodeKey; readonly name: string };
type Props = {
  /** A machine type of a model of types. */
  type: Choice | undefined;
  /** The machines of a model of machines. */
  machines: readonly Choice[];
  /** Paths of the Variables that the mapping writes to outputs. */
  outputs: readonly string[];
};

const documentFiles = [
  [
    "document",
    "Mapping document",
    "JSON by the published schema: sources, layouts, transforms, units, quality. Read back it gives the same mapping.",
  ],
  ["csv", "Mapping as a table", "CSV for people: one row a Variable."],
] as const;
const typeFiles = [
  ...documentFiles,
  ["signal-list", "Signal list", "A workbook with every surveyed signal, its unit, range and source."],
] as const;
const machineFiles = [
  ...documentFiles,
  ["thing-description", "Thing Description", "W3C Web of Things 1.1 with Modbus and HTTP forms and OPC UA names."],
] as const;

/** What leaves the house of this mapping: files, what templates make of it, and the way back in. */
export function DeliverPanel({ type, machines, outputs }: Props) {
  const { workspace } = useOpenModel();
  const [machine, setMachine] = useState<NodeKey | undefined>(machines[0]?.key);
  const [isReviewed, setReviewed] = useState(false);
  const of = type?.key ?? machine;
  if (of === undefined) return <Empty title="Nothing to deliver yet">Map a type first, or roll out a machine.</Empty>;
  const base = `/models/${workspace.model.id}/deliver`;
  const isLocked = outputs.length > 0 && !isReviewed;
  return (
    <div className="grid content-start gap-7">
      {outputs.length > 0 ? (
        <Notice
          tone="warning"
          title={`${outputs.length} ${outputs.length === 1 ? "Variable writes" : "Variables write"} to outputs: ${outputs.join(", ")}`}
        >
          <p className="mb-1.5">
            A write can move machinery, and IO-Link process data is not safety-related communication. Follow the
            machine&rsquo;s risk assessment, local codes and licensed practice.
          </p>
          <Checkbox
            label={`Reviewed by ${workspace.user.name}`}
            checked={isReviewed}
            onChange={(event) => setReviewed(event.currentTarget.checked)}
          />
        </Notice>
      ) : null}
      <Block
        title="Files"
        about={type ? <em>{type.name}</em> : undefined}
        actions={
          type ? undefined : (
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
          )
        }
      >
        <ul className="border-t border-ink">
          {(type ? typeFiles : machineFiles).map(([what, name, about]) => (
            <li
              key={what}
              className="grid grid-cols-[200px_minmax(0,1fr)_auto] items-center gap-4 border-b border-hair py-2 text-small"
            >
              <span className="font-semibold">{name}</span>
              <span className="text-ink-2">{about}</span>
              <DownloadLink href={`${base}/${what}?of=${encodeURIComponent(of)}`} name={name} isLocked={isLocked} />
            </li>
          ))}
        </ul>
      </Block>
      <ExportTemplates of={of} isLocked={isLocked} />
      {type ? <ReadDocument type={type.key} /> : null}
    </div>
  );
}
