import { Search, Trash2, Upload } from "lucide-react";
import { Fragment, useMemo, useState } from "react";
import { Form } from "react-router";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button, IconButton, LinkButton } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Empty } from "~/components/ui/empty";
import { Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Page } from "~/components/ui/page";
import { Segments } from "~/components/ui/segments";
import { Table, TableScroll, Td, Th } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { LibraryChoice } from "~/services/list-library-choices.server";
import { formatCount } from "~/utils/format";
import { listRequired, searchChoices } from "./required-closure";

type Shelf = "all" | LibraryChoice["origin"];

const shelfWords: Record<Shelf, string> = { all: "All", published: "Published", added: "Added", team: "Of the team" };

type Props = {
  entries: readonly LibraryChoice[];
  editBlockedBy: string | undefined;
  shown: string | undefined;
  refusal: string | undefined;
};

export function LibraryView({ entries, editBlockedBy, shown, refusal }: Props) {
  const [shelf, setShelf] = useState<Shelf>("all");
  const [query, setQuery] = useState("");
  const [openId, setOpenId] = useState(() => entries.find((entry) => entry.modelUri === shown)?.id);
  const onShelf = useMemo(() => entries.filter((entry) => shelf === "all" || entry.origin === shelf), [entries, shelf]);
  const found = useMemo(() => searchChoices(onShelf, query), [onShelf, query]);
  return (
    <Page
      title="Library"
      about="NodeSets that a model can stand on, read only."
      actions={
        editBlockedBy === undefined ? (
          <LinkButton to="/models/import?into=library" icon={Upload}>
            Add a NodeSet2 file
          </LinkButton>
        ) : (
          <Button icon={Upload} blockedBy={editBlockedBy}>
            Add a NodeSet2 file
          </Button>
        )
      }
    >
      {refusal ? (
        <Notice tone="error" title={refusal} live className="mb-3" glyph={<FindingShape severity="error" />} />
      ) : null}
      <div className="mb-3 flex flex-wrap items-center gap-3">
        <label className="relative w-72">
          <span className="sr-only">Search the library</span>
          <Icon of={Search} className="pointer-events-none absolute inset-y-0 left-2 my-auto text-ink-3" />
          <Input
            type="search"
            value={query}
            onChange={(event) => setQuery(event.currentTarget.value)}
            placeholder="Name or model URI"
            className="pl-7"
          />
        </label>
        <Segments
          label="Shelf"
          value={shelf}
          onChange={setShelf}
          options={(Object.keys(shelfWords) as Shelf[]).map((value) => ({
            value,
            label: (
              <>
                {shelfWords[value]}
                <span className="font-mono">
                  {value === "all" ? entries.length : entries.filter((entry) => entry.origin === value).length}
                </span>
              </>
            ),
          }))}
        />
      </div>
      {found.length === 0 ? (
        <Empty title={query ? "Nothing has these words" : "Nothing on this shelf yet"} />
      ) : (
        <TableScroll label="Library">
          <Table caption="Models of the library" className="min-w-200">
            <thead>
              <tr>
                <Th>Model</Th>
                <Th>Model URI</Th>
                <Th>Version</Th>
                <Th>Published</Th>
                <Th right>Nodes</Th>
                <Th>Shelf</Th>
              </tr>
            </thead>
            <tbody>
              {found.map((entry) => (
                <Fragment key={entry.id}>
                  <tr
                    className={cx(
                      "hover:bg-bench",
                      openId === entry.id && "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]",
                    )}
                  >
                    <Td className="pl-0">
                      <button
                        type="button"
                        aria-expanded={openId === entry.id}
                        onClick={() => setOpenId(openId === entry.id ? undefined : entry.id)}
                        className="h-7 w-full pl-2 text-left font-semibold focus-visible:-outline-offset-2"
                      >
                        {entry.title}
                      </button>
                    </Td>
                    <Td mono className="text-ink-2">
                      {entry.modelUri}
                    </Td>
                    <Td mono>{entry.version}</Td>
                    <Td mono>{entry.publicationDate?.slice(0, 10)}</Td>
                    <Td right mono>
                      {entry.nodeCount === undefined ? "" : formatCount(entry.nodeCount)}
                    </Td>
                    <Td>
                      <Tag tone={entry.origin === "published" ? "plain" : "ink"}>
                        {shelfWords[entry.origin].toLowerCase()}
                      </Tag>
                    </Td>
                  </tr>
                  {openId === entry.id ? (
                    <tr>
                      <td colSpan={6} className="border-b border-rule bg-leaf p-0 shadow-[inset_3px_0_0_var(--copper)]">
                        <EntryDetail entry={entry} entries={entries} editBlockedBy={editBlockedBy} />
                      </td>
                    </tr>
                  ) : null}
                </Fragment>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
    </Page>
  );
}

function EntryDetail({
  entry,
  entries,
  editBlockedBy,
}: {
  entry: LibraryChoice;
  entries: readonly LibraryChoice[];
  editBlockedBy: string | undefined;
}) {
  const rows = listRequired(entries, [entry.modelUri]).filter((row) => row.modelUri !== entry.modelUri);
  const users = entries.filter((other) => other.required.some((required) => required.modelUri === entry.modelUri));
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_minmax(0,1fr)_auto] gap-8 px-5 py-3 text-small">
      <section>
        <h3 className="mb-1.5 text-note font-medium text-ink-3">Stands on</h3>
        <ul className="grid gap-1">
          {rows.length === 0 ? <li className="text-ink-2">nothing else</li> : null}
          {rows.map((row) => (
            <li key={row.modelUri} className="flex items-center gap-1.5">
              {row.choice ? null : <FindingShape severity="error" />}
              <span className="font-semibold">{row.choice?.title ?? row.modelUri}</span>
              <span className="font-mono text-note text-ink-2">{row.choice ? row.choice.version : "missing"}</span>
            </li>
          ))}
        </ul>
      </section>
      <section>
        <h3 className="mb-1.5 text-note font-medium text-ink-3">Asked for by</h3>
        <p>
          {users.length === 0 ? (
            <span className="text-ink-2">nobody</span>
          ) : (
            [...new Set(users.map((user) => user.title))].join(", ")
          )}
        </p>
        <h3 className="mt-3 mb-1 text-note font-medium text-ink-3">File</h3>
        <p className="font-mono break-all text-ink-2">{entry.fileName || "working state of the team’s model"}</p>
        {entry.by ? <p className="mt-1 text-ink-2">by {entry.by}</p> : null}
      </section>
      <section className="justify-self-end">
        {entry.origin === "added" ? (
          <RemoveEntry
            entry={entry}
            blockedBy={editBlockedBy ?? (users.length > 0 ? "others require it" : undefined)}
          />
        ) : null}
        {entry.origin === "team" ? <LinkButton to={`/models/${entry.id}/sheet`}>Open the model</LinkButton> : null}
      </section>
    </div>
  );
}

function RemoveEntry({ entry, blockedBy }: { entry: LibraryChoice; blockedBy: string | undefined }) {
  if (blockedBy !== undefined)
    return <IconButton icon={Trash2} label="Take out of the library" blockedBy={blockedBy} />;
  return (
    <Dialog
      title="Take it out of the library?"
      about={`${entry.title} ${entry.version ?? ""} (${entry.fileName}) can then no longer be required by a model.`}
      trigger={
        <Button icon={Trash2} tone="danger">
          Take out
        </Button>
      }
    >
      <Form method="post" className="flex justify-end gap-2">
        <input type="hidden" name="upload" value={entry.id} />
        <DialogClose asChild>
          <Button>Keep it</Button>
        </DialogClose>
        <Button type="submit" tone="danger">
          Take out
        </Button>
      </Form>
    </Dialog>
  );
}
