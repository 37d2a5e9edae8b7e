import { Expand, Link2, Pencil, Save, Shrink } from "lucide-react";
import { useEffect, useState } from "react";
import { useFetcher, useSearchParams } from "react-router";
import { changeTile, lampColours, moveTile, type BoardContent, type BoardTile, type LampColour } from "~/domain/live/watch-board";
import type { BoardPage } from "~/services/watch-boards.server";
import { LiveContext, useStream } from "../live/live-context";
import { LiveValues } from "../live/live-values";
import { StatusBadge } from "../notation/status-badge";
import { Button, LinkButton } from "../ui/button";
import { cx } from "../ui/cx";
import { Empty } from "../ui/empty";
import { Field, Input, Select } from "../ui/field";
import { Notice } from "../ui/notice";
import { BoardTileView } from "./board-tile";

type Props = { board: BoardPage; isWall: boolean; mayArrange: boolean };

/** One board on one machine and one server. A switch changes NodeIds, nothing else. */
export function BoardView({ board, isWall, mayArrange }: Props) {
  const [content, setContent] = useState(board.content);
  const [name, setName] = useState(board.name);
  const [isArranging, setArranging] = useState(false);
  const fetcher = useFetcher<{ version?: number; detail?: string }>();
  const save = (): void => {
    void fetcher.submit({ name, content, version: board.version } as never, { method: "PUT", encType: "application/json" });
    setArranging(false);
  };
  return (
    <main id="main" tabIndex={-1} className={cx("min-h-0 flex-1 overflow-y-auto outline-none", isWall ? "fixed inset-0 z-40 bg-paper px-6 py-4" : "px-5 pb-8 max-sm:px-4")}>
      <header className="flex min-h-14 flex-wrap items-center gap-x-3 gap-y-2 py-2">
        {isArranging ? (
          <Field label="Name of the board" inline className="grid-cols-[auto_1fr]!">
            {(tied) => <Input {...tied} value={name} onChange={(event) => setName(event.target.value)} maxLength={100} />}
          </Field>
        ) : (
          <h1 className="text-title font-semibold tracking-[-0.02em]">{name}</h1>
        )}
        <Switches board={board} />
        <span className="ml-auto flex flex-wrap items-center gap-2">
          {isArranging ? (
            <Button tone="main" icon={Save} onClick={save}>
              Keep the arrangement
            </Button>
          ) : isWall ? null : (
            <Button icon={Pencil} onClick={() => setArranging(true)} blockedBy={mayArrange ? undefined : "Your roles do not arrange boards"}>
              Arrange
            </Button>
          )}
          {isWall ? null : <CopyLink />}
          <WallSwitch isWall={isWall} />
        </span>
      </header>
      {fetcher.data?.detail ? <Notice tone="error" live title={fetcher.data.detail} className="mb-3" /> : null}
      {board.target === null ? (
        <Empty title="No server to read from">
          <p>Start a test server on the model, or name the gateway as an endpoint.</p>
          <p className="mt-3 flex justify-center gap-2">
            <LinkButton to={`/models/${board.modelId}/test-server`} tone="main">
              Test server
            </LinkButton>
            <LinkButton to="/live/endpoints">Endpoints</LinkButton>
          </p>
        </Empty>
      ) : board.machine === null ? (
        <Empty title="No machine of this type">
          <p>Roll one out; the board shows it at once.</p>
        </Empty>
      ) : (
        <LiveBoard key={`${board.target.id}`} targetId={board.target.id}>
          <Sections content={content} nodeIds={board.nodeIds} isArranging={isArranging} onChange={setContent} isWall={isWall} />
        </LiveBoard>
      )}
    </main>
  );
}

function Switches({ board }: { board: BoardPage }) {
  const [, setSearch] = useSearchParams();
  const choose = (key: "machine" | "server", value: string): void =>
    setSearch(
      (before) => {
        before.set(key, value);
        return before;
      },
      { replace: true, preventScrollReset: true },
    );
  return (
    <div className="flex flex-wrap items-center gap-3">
      {board.machines.length > 0 ? (
        <Field label="Machine" inline className="grid-cols-[auto_1fr]!">
          {(tied) => (
            <Select {...tied} value={board.machine ?? ""} onChange={(event) => choose("machine", event.target.value)}>
              {board.machines.map((machine) => (
                <option key={machine.nodeId} value={machine.nodeId}>
                  {machine.name}
                </option>
              ))}
            </Select>
          )}
        </Field>
      ) : null}
      {board.targets.length > 0 ? (
        <Field label="Server" inline className="grid-cols-[auto_1fr]!">
          {(tied) => (
            <Select {...tied} value={board.target?.id ?? ""} onChange={(event) => choose("server", event.target.value)}>
              {board.targets.map((target) => (
                <option key={target.id} value={target.id}>
                  {target.name}
                </option>
              ))}
            </Select>
          )}
        </Field>
      ) : null}
      {board.target?.isTestServer ? <span className="text-small text-warning">Simulated values. No machine is connected.</span> : null}
    </div>
  );
}

/** Everybody of the organisation may open the link; what they may change there is a matter of their roles. */
function CopyLink() {
  const [isCopied, setCopied] = useState(false);
  const copy = (): void => {
    void navigator.clipboard.writeText(location.href).then(() => setCopied(true));
  };
  return (
    <Button icon={Link2} onClick={copy}>
      {isCopied ? "Link copied" : "Copy the link"}
    </Button>
  );
}

function WallSwitch({ isWall }: { isWall: boolean }) {
  const [, setSearch] = useSearchParams();
  const toggle = (): void =>
    setSearch(
      (before) => {
        if (isWall) before.delete("wall");
        else before.set("wall", "1");
        return before;
      },
      { replace: true },
    );
  return (
    <Button icon={isWall ? Shrink : Expand} onClick={toggle}>
      {isWall ? "Leave the wall" : "Wall"}
    </Button>
  );
}

function LiveBoard({ targetId, children }: { targetId: string; children: React.ReactNode }) {
  const [values] = useState(() => new LiveValues(targetId));
  useEffect(() => values.open(), [values]);
  return (
    <LiveContext value={values}>
      <StreamNote />
      {children}
    </LiveContext>
  );
}

const STREAM_NOTES = { stopped: "The stream stopped; values are the last ones.", lost: "The server is not reached; values are the last ones.", paused: "Paused." } as const;

function StreamNote() {
  const stream = useStream();
  if (stream === "running") return null;
  return (
    <p role="status" className="mb-3">
      <StatusBadge status="stale">{STREAM_NOTES[stream]}</StatusBadge>
    </p>
  );
}

type SectionsProps = {
  content: BoardContent;
  nodeIds: Readonly<Record<string, string>>;
  isArranging: boolean;
  isWall: boolean;
  onChange: (content: BoardContent) => void;
};

function Sections({ content, nodeIds, isArranging, isWall, onChange }: SectionsProps) {
  const shown = content.tiles.filter((tile) => isArranging || !tile.isHidden);
  const sections = [...new Set(shown.map((tile) => tile.section))];
  return (
    <div className="grid gap-6">
      {sections.map((section) => (
        <section key={section} aria-label={section || "Machine"}>
          <h2 className={cx("mb-2 border-b border-ink pb-1 font-semibold tracking-[-0.01em]", isWall ? "text-title" : "text-lead")}>{section || "Machine"}</h2>
          <ul className={cx("grid gap-x-4 gap-y-3", isWall ? "grid-cols-[repeat(auto-fill,minmax(290px,1fr))]" : "grid-cols-[repeat(auto-fill,minmax(220px,1fr))]")}>
            {shown
              .filter((tile) => tile.section === section)
              .map((tile) => (
                <li key={tile.path} className={cx("flex min-w-0 flex-col", tile.isWide && "col-span-2 max-sm:col-span-1", tile.isHidden && "opacity-50")}>
                  <BoardTileView tile={tile} nodeId={nodeIds[tile.path] ?? null} isWall={isWall} />
                  {isArranging ? <ArrangeTile tile={tile} onMove={(by) => onChange(moveTile(content, tile.path, by))} onChange={(change) => onChange(changeTile(content, tile.path, change))} /> : null}
                </li>
              ))}
          </ul>
        </section>
      ))}
    </div>
  );
}

const LAMP_MEANINGS: Readonly<Record<LampColour, string>> = { red: "red, danger", yellow: "yellow, abnormal", green: "green, normal", blue: "blue, act", white: "white, neutral" };

function ArrangeTile({ tile, onMove, onChange }: { tile: BoardTile; onMove: (by: -1 | 1) => void; onChange: (change: Partial<BoardTile>) => void }) {
  return (
    <div role="group" aria-label={`Arrange ${tile.title}`} className="mt-1 flex flex-wrap gap-1 print:hidden">
      <Button size="small" onClick={() => onMove(-1)} aria-label={`${tile.title} earlier`}>
        ←
      </Button>
      <Button size="small" onClick={() => onMove(1)} aria-label={`${tile.title} later`}>
        →
      </Button>
      <Button size="small" onClick={() => onChange({ isWide: !tile.isWide })} aria-pressed={tile.isWide}>
        Wide
      </Button>
      {tile.kind === "bar" || tile.kind === "counter" || tile.kind === "value" ? (
        <Button size="small" onClick={() => onChange({ hasTrend: !tile.hasTrend })} aria-pressed={tile.hasTrend}>
          Trend
        </Button>
      ) : null}
      <Button size="small" onClick={() => onChange({ isHidden: !tile.isHidden })} aria-pressed={tile.isHidden}>
        {tile.isHidden ? "Show" : "Hide"}
      </Button>
      {tile.states.map((state) => (
        <label key={state.value} className="flex w-full items-center gap-2 text-note text-ink-2">
          <span className="min-w-0 flex-1 truncate">{state.text}</span>
          <select
            value={state.lamp}
            aria-label={`Lamp of ${state.text}`}
            onChange={(event) => onChange({ states: tile.states.map((other) => (other === state ? { ...other, lamp: event.target.value as LampColour } : other)) })}
            className="h-6 rounded-edge border border-edge bg-leaf px-1 text-note"
          >
            {lampColours.map((colour) => (
              <option key={colour} value={colour}>
                {LAMP_MEANINGS[colour]}
              </option>
            ))}
          </select>
        </label>
      ))}
    </div>
  );
}
