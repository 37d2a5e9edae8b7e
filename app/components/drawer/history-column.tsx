import { useEffect, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { NodeHistoryPage } from "~/presenters/node-history.server";
import { describeEdit } from "../shell/describe-edit";
import { LocalTime } from "../shell/local-time";
import { useEditorState, useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { describeChange } from "./describe-change";

type Entry = NodeHistoryPage["entries"][number];
type Loaded = { readonly entries: readonly Entry[]; readonly next: number | undefined };

/** Who changed what of this node when, the newest first; older pages on demand. */
export function HistoryColumn({ space, node }: { space: AddressSpace; node: Node }) {
  const { workspace } = useOpenModel();
  const { seq } = useEditorState();
  const { id, createdAt } = workspace.model;
  const [loaded, setLoaded] = useState<Loaded>();
  const [failure, setFailure] = useState<string>();
  const isOwn = space.isOwn(node.key);

  useEffect(() => {
    if (!isOwn) return undefined;
    const controller = new AbortController();
    loadPage(id, node.key, undefined, controller.signal)
      .then((page) => {
        setFailure(undefined);
        setLoaded({ entries: page.entries, next: page.next });
      })
      .catch((error: unknown) => {
        if (!controller.signal.aborted) setFailure(error instanceof Error ? error.message : String(error));
      });
    return () => controller.abort();
  }, [id, node.key, seq, isOwn]);

  async function more(before: number): Promise<void> {
    const page = await loadPage(id, node.key, before).catch(() => undefined);
    if (page) setLoaded((old) => ({ entries: [...(old?.entries ?? []), ...page.entries], next: page.next }));
  }

  return (
    <section aria-label="History">
      <h3>History</h3>
      {isOwn ? null : (
        <p className="text-small text-ink-3">The node belongs to a required model; its history is there.</p>
      )}
      {failure === undefined ? null : (
        <p className="text-small text-warning">The history cannot be read now: {failure}</p>
      )}
      <ol className="history">
        {loaded?.entries.map((entry) => (
          <HistoryEntry key={entry.seq} space={space} entry={entry} />
        ))}
        {isOwn && loaded && loaded.next === undefined && !wasMadeHere(loaded.entries) ? (
          <li>
            <LocalTime iso={createdAt} parts="date" />
            <span className="text-ink-2">came with the model</span>
          </li>
        ) : null}
      </ol>
      {loaded?.next === undefined ? null : (
        <Button size="small" tone="bare" className="-ml-1.5" onClick={() => void more(loaded.next ?? 0)}>
          Older
        </Button>
      )}
    </section>
  );
}

function wasMadeHere(entries: readonly Entry[]): boolean {
  return entries.some((entry) => entry.changes.some((change) => change.kind === "created"));
}

async function loadPage(
  modelId: string,
  key: NodeKey,
  before?: number,
  signal?: AbortSignal,
): Promise<NodeHistoryPage> {
  const query = new URLSearchParams({ node: key, ...(before === undefined ? {} : { before: String(before) }) });
  const answer = await fetch(`/models/${modelId}/history?${query.toString()}`, signal ? { signal } : {});
  if (!answer.ok) throw new Error(`answer ${answer.status}`);
  return (await answer.json()) as NodeHistoryPage;
}

const MOST = 6;

function HistoryEntry({ space, entry }: { space: AddressSpace; entry: Entry }) {
  return (
    <li>
      <LocalTime iso={entry.at} parts={isToday(entry.at) ? "time" : "date-time"} />
      <div className="min-w-0">
        <span title={describeEdit(entry.label)}>
          <b>{entry.author}</b> <span className="text-ink-3">{describeEdit(entry.label)}</span>
        </span>
        <ul>
          {entry.changes.slice(0, MOST).map((change, i) => (
            <li key={i} className="text-ink-2">
              {describeChange(space, change)}
            </li>
          ))}
          {entry.changes.length > MOST ? <li className="text-ink-3">and {entry.changes.length - MOST} more</li> : null}
        </ul>
      </div>
    </li>
  );
}

function isToday(iso: string): boolean {
  return new Date(iso).toDateString() === new Date().toDateString();
}
