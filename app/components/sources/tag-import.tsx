import { useState } from "react";
import { useRevalidator } from "react-router";
import { FileDrop } from "~/components/models/file-drop";
import { ProblemList, type ShownProblem } from "~/components/models/problem-list";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Table, TableScroll, Td, Th } from "~/components/ui/table";
import { showToast } from "~/components/ui/toast";
import { octetOrders } from "~/domain/mapping/mapping";
import { tagColumns, type ColumnMatch, type TagColumn } from "~/domain/mapping/read-tags";
import type { TagImportIntent, TagPreview } from "~/services/import-tags.server";
import { tableWords } from "../mapping/describe-source";
import { importTagFile, previewTagFile } from "./tag-lists";

const columnWords: Readonly<Record<TagColumn, string>> = {
  name: "Name",
  address: "Modbus address",
  table: "Table",
  type: "Type",
  order: "Octet order",
  bit: "Bit",
  scale: "Scale",
  offset: "Offset",
  unit: "Unit",
  path: "JSON path",
  nodeId: "NodeId",
  comment: "Comment",
};

type Props = { sources: readonly { readonly id: string; readonly name: string }[]; blockedBy: string | undefined };
type Reading = TagImportIntent["reading"];

/** A list of a controller's values: choose the file, match its columns, look, take it in whole. */
export function TagImport({ sources, blockedBy }: Props) {
  const { revalidate } = useRevalidator();
  const [file, setFile] = useState<File | undefined>(undefined);
  const [preview, setPreview] = useState<TagPreview | undefined>(undefined);
  const [problems, setProblems] = useState<readonly ShownProblem[]>([]);
  const [columns, setColumns] = useState<ColumnMatch>({});
  const [options, setOptions] = useState<Omit<Reading, "columns">>({
    addressing: "wire",
    table: "holding-register",
    order: "ABCD",
  });
  const [name, setName] = useState("");
  const [sourceId, setSourceId] = useState("");
  const [template, setTemplate] = useState("");
  const [isBusy, setBusy] = useState(false);

  async function choose(next: File): Promise<void> {
    setFile(next);
    setProblems([]);
    const answer = await previewTagFile(next);
    setPreview(answer.ok ? answer.value : undefined);
    if (!answer.ok) return setProblems(answer.problems);
    const [known] = answer.value.templates;
    setColumns(known?.columns ?? answer.value.guessed);
    setName(next.name.replace(/\.\w+$/, ""));
  }
  async function take(): Promise<void> {
    if (!file) return;
    setBusy(true);
    const answer = await importTagFile(file, {
      name,
      ...(sourceId === "" ? {} : { sourceId }),
      ...(template.trim() === "" ? {} : { template: template.trim() }),
      reading: { ...options, columns: columns as Reading["columns"] },
    });
    setBusy(false);
    if (!answer.ok) return setProblems(answer.problems);
    setPreview(undefined);
    setFile(undefined);
    setProblems([]);
    showToast({
      tone: "good",
      title: `${answer.value.count} tags taken in`,
      detail: "Suggestions on the Mapping page can use them.",
    });
    await revalidate();
  }
  if (blockedBy !== undefined) return <p className="text-small text-ink-2">Taking in a tag list {blockedBy}.</p>;
  return (
    <div className="grid gap-4">
      <FileDrop
        name="tags"
        accept=".csv,.tsv,.txt,.xlsx"
        label="Drop a tag list here, or press to choose one"
        hint="CSV or XLSX; the first row holds the heads"
        onChosen={(next) => void choose(next)}
      />
      {problems.length > 0 ? (
        <section aria-label="Problems of the list" className="max-h-80 overflow-y-auto">
          <Notice tone="error" title="The list cannot be taken in" live className="mb-2">
            Nothing was stored. Lines that cannot be read are listed with their places.
          </Notice>
          <ProblemList problems={problems} caption="Problems of the list" />
        </section>
      ) : null}
      {preview ? (
        <>
          <section aria-label="Columns">
            <h2 className="mb-1.5 flex items-center gap-3 text-lead font-semibold">
              Columns
              {preview.templates.length > 0 ? (
                <Select
                  aria-label="Kept match of columns"
                  size="small"
                  className="w-56!"
                  onChange={(event) =>
                    setColumns(
                      preview.templates.find((one) => one.name === event.currentTarget.value)?.columns ??
                        preview.guessed,
                    )
                  }
                >
                  {preview.templates.map((one) => (
                    <option key={one.name} value={one.name}>
                      as {one.name}
                    </option>
                  ))}
                  <option value="">as guessed</option>
                </Select>
              ) : null}
            </h2>
            <div className="grid grid-cols-[repeat(auto-fill,minmax(150px,1fr))] gap-3">
              {tagColumns.map((column) => (
                <Field key={column} label={columnWords[column]}>
                  {(tied) => (
                    <Select
                      {...tied}
                      size="small"
                      value={columns[column] ?? ""}
                      onChange={(event) => {
                        const { [column]: _old, ...rest } = columns;
                        setColumns(
                          event.currentTarget.value === "" ? rest : { ...rest, [column]: event.currentTarget.value },
                        );
                      }}
                    >
                      <option value="">none</option>
                      {preview.columns.map((head) => (
                        <option key={head} value={head}>
                          {head}
                        </option>
                      ))}
                    </Select>
                  )}
                </Field>
              ))}
            </div>
          </section>
          <section
            aria-label="How addresses are written"
            className="grid grid-cols-[repeat(auto-fill,minmax(220px,1fr))] items-start gap-3"
          >
            <Field label="Addresses" hint="The digit before the address is a custom of documents, not of the protocol.">
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  value={options.addressing}
                  onChange={(event) =>
                    setOptions({ ...options, addressing: event.currentTarget.value as Reading["addressing"] })
                  }
                >
                  <option value="wire">as on the wire, from 0</option>
                  <option value="one-based">counted from 1</option>
                  <option value="prefixed">with the table&rsquo;s digit, 40001</option>
                </Select>
              )}
            </Field>
            <Field label="Table where the list says none">
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  value={options.table}
                  onChange={(event) => setOptions({ ...options, table: event.currentTarget.value as Reading["table"] })}
                >
                  {Object.entries(tableWords).map(([table, word]) => (
                    <option key={table} value={table}>
                      {word}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
            <Field
              label="Octets where the list says none"
              hint="A the highest: ABCD high word first, CDAB low word first."
            >
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  value={options.order}
                  onChange={(event) => setOptions({ ...options, order: event.currentTarget.value as Reading["order"] })}
                >
                  {octetOrders.map((order) => (
                    <option key={order} value={order}>
                      {order}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
          </section>
          <TableScroll label="First rows">
            <Table caption="First rows of the list">
              <thead>
                <tr>
                  {preview.columns.map((head, i) => (
                    <Th key={`${head} ${i}`}>{head}</Th>
                  ))}
                </tr>
              </thead>
              <tbody>
                {preview.rows.map((row, i) => (
                  <tr key={i}>
                    {preview.columns.map((_, column) => (
                      <Td key={column} mono>
                        {row[column]}
                      </Td>
                    ))}
                  </tr>
                ))}
              </tbody>
            </Table>
          </TableScroll>
          <div className="flex flex-wrap items-end gap-3">
            <Field label="Name of the list">
              {(tied) => (
                <Input
                  {...tied}
                  size="small"
                  value={name}
                  maxLength={100}
                  onChange={(event) => setName(event.currentTarget.value)}
                />
              )}
            </Field>
            <Field label="Source" optional>
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  value={sourceId}
                  onChange={(event) => setSourceId(event.currentTarget.value)}
                >
                  <option value="">any of its make</option>
                  {sources.map((source) => (
                    <option key={source.id} value={source.id}>
                      {source.name}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
            <Field label="Keep the match of columns as" optional>
              {(tied) => (
                <Input
                  {...tied}
                  size="small"
                  value={template}
                  maxLength={100}
                  onChange={(event) => setTemplate(event.currentTarget.value)}
                />
              )}
            </Field>
            <Button
              tone="main"
              size="small"
              busy={isBusy}
              blockedBy={
                name.trim() === ""
                  ? "the list needs a name"
                  : columns.name === undefined
                    ? "say which column holds the name"
                    : undefined
              }
              onClick={() => void take()}
            >
              Take in {preview.count} rows
            </Button>
          </div>
        </>
      ) : null}
    </div>
  );
}
