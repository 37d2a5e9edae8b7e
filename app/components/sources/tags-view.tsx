import { X } from "lucide-react";
import { useEffect, useState } from "react";
import { Form, href } from "react-router";
import { IconButton, TextLink } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Empty } from "~/components/ui/empty";
import { Input } from "~/components/ui/field";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { Tag } from "~/domain/mapping/tag";
import { unitByCode } from "~/domain/units/units";
import type { TagListSummary } from "~/services/import-tags.server";
import { tableWords } from "../mapping/describe-source";
import { TagImport } from "./tag-import";
import { fetchTags } from "./tag-lists";

const MOST = 300;

type Props = {
  lists: readonly TagListSummary[];
  sources: readonly { readonly id: string; readonly name: string }[];
  editBlockedBy: string | undefined;
};

/** Names and addresses of controllers' values, as lists gave them. */
export function TagsView({ lists, sources, editBlockedBy }: Props) {
  const [open, setOpen] = useState<string | undefined>(undefined);
  return (
    <Page
      title="Controller tags"
      about={
        <>
          Lists of symbols, Modbus addresses, JSON fields and OPC UA nodes; part of{" "}
          <TextLink to={href("/sources")}>Sources</TextLink>.
        </>
      }
    >
      <div className="grid grid-cols-[minmax(0,1fr)] gap-7">
        <TagImport sources={sources} blockedBy={editBlockedBy} />
        {lists.length === 0 ? (
          <Empty title="No tag list yet">
            Export the symbols or the address list of a controller and take it in here; suggestions on the Mapping page
            then know its values.
          </Empty>
        ) : (
          <Block title="Lists">
            <TableScroll label="Tag lists">
              <Table caption="Tag lists">
                <thead>
                  <tr>
                    <Th>List</Th>
                    <Th>Source</Th>
                    <Th>File</Th>
                    <Th right>Tags</Th>
                    <Th>Taken in</Th>
                    <Th>
                      <span className="sr-only">Actions</span>
                    </Th>
                  </tr>
                </thead>
                <tbody>
                  {lists.map((list) => (
                    <tr key={list.id} className={cx(open === list.id ? "bg-copper-wash" : "hover:bg-bench")}>
                      <RowHead className="p-0!">
                        <button
                          type="button"
                          aria-expanded={open === list.id}
                          className="h-7 w-full pl-2 text-left font-semibold focus-visible:-outline-offset-2"
                          onClick={() => setOpen(open === list.id ? undefined : list.id)}
                        >
                          {list.name}
                        </button>
                      </RowHead>
                      <Td>
                        {sources.find((source) => source.id === list.sourceId)?.name ?? (
                          <span className="text-ink-3">any</span>
                        )}
                      </Td>
                      <Td mono>{list.fileName}</Td>
                      <Td right mono>
                        {list.count}
                      </Td>
                      <Td className="text-ink-2">
                        {list.by}, <span className="font-mono">{list.at.slice(0, 10)}</span>
                      </Td>
                      <Td right>
                        {editBlockedBy === undefined ? (
                          <Form method="post" className="inline">
                            <input type="hidden" name="id" value={list.id} />
                            <IconButton type="submit" icon={X} size="small" label={`Remove ${list.name}`} />
                          </Form>
                        ) : null}
                      </Td>
                    </tr>
                  ))}
                </tbody>
              </Table>
            </TableScroll>
          </Block>
        )}
        {open ? <Tags key={open} id={open} /> : null}
      </div>
    </Page>
  );
}

function Tags({ id }: { id: string }) {
  const [tags, setTags] = useState<readonly Tag[] | undefined>(undefined);
  const [query, setQuery] = useState("");
  useEffect(() => {
    let isOver = false;
    void fetchTags(id).then((found) => {
      if (!isOver) setTags(found);
    });
    return () => {
      isOver = true;
    };
  }, [id]);
  const words = query.toLowerCase().split(/\s+/).filter(Boolean);
  const found = (tags ?? []).filter((tag) =>
    words.every((word) => `${tag.name} ${tag.comment ?? ""}`.toLowerCase().includes(word)),
  );
  return (
    <Block
      title="Tags"
      about={tags ? <span className="font-mono">{found.length}</span> : "reading …"}
      actions={
        <Input
          type="search"
          aria-label="Search the tags"
          placeholder="Name or comment"
          className="w-56!"
          value={query}
          onChange={(event) => setQuery(event.currentTarget.value)}
        />
      }
    >
      <TableScroll label="Tags" className="max-h-120 overflow-y-auto">
        <Table caption="Tags of the list">
          <thead>
            <tr>
              <Th>Name</Th>
              <Th>Read at</Th>
              <Th>Type</Th>
              <Th>Scale</Th>
              <Th>Unit</Th>
              <Th>Comment</Th>
              <Th right>Line</Th>
            </tr>
          </thead>
          <tbody>
            {found.slice(0, MOST).map((tag) => (
              <Tr key={tag.line}>
                <RowHead>{tag.name}</RowHead>
                <Td mono>{describePlace(tag)}</Td>
                <Td mono>
                  {tag.reference.kind === "register"
                    ? `${tag.reference.type ?? ""} ${tag.reference.order ?? ""}`.trim()
                    : (tag.dataType ?? "")}
                </Td>
                <Td mono>
                  {tag.scale === undefined && tag.offset === undefined
                    ? ""
                    : `× ${tag.scale ?? 1}${tag.offset ? ` + ${tag.offset}` : ""}`}
                </Td>
                <Td>{tag.unit === undefined ? "" : (unitByCode(tag.unit)?.symbol ?? tag.unit)}</Td>
                <Td className="text-ink-2">{tag.comment}</Td>
                <Td right mono className="text-ink-3">
                  {tag.line}
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
      {found.length > MOST ? (
        <p className="mt-1 text-note text-ink-3">and {found.length - MOST} more; search by name</p>
      ) : null}
    </Block>
  );
}

function describePlace({ reference }: Tag): string {
  switch (reference.kind) {
    case "register":
      return `${tableWords[reference.table]} ${reference.address}${reference.bit === undefined ? "" : `, bit ${reference.bit}`}`;
    case "tag":
      return reference.name;
    case "json-path":
      return reference.path.join("/");
    case "opc-ua-node":
      return reference.nodeId;
  }
}
