import { Search } from "lucide-react";
import { Dialog } from "radix-ui";
import { useEffect, useId, useMemo, useRef, useState, useSyncExternalStore, type KeyboardEvent } from "react";
import { cx } from "../ui/cx";
import { Icon } from "../ui/icon";
import { Kbd } from "../ui/tag";
import { closePalette, getPalette, openPalette, subscribeToPalette, type PaletteEntry } from "./palette-store";
import { rankEntries } from "./rank-entries";

const MOST_NODES = 24;
const MOST_ACTIONS = 12;

/** Nodes, screens and actions by what one types. Ctrl K opens it on every page. */
export function CommandPalette() {
  const palette = useSyncExternalStore(subscribeToPalette, getPalette, getPalette);

  useEffect(() => {
    const onKeyDown = (event: globalThis.KeyboardEvent): void => {
      if (event.key.toLowerCase() !== "k" || !(event.ctrlKey || event.metaKey) || event.shiftKey || event.altKey) return;
      event.preventDefault();
      if (getPalette().isOpen) closePalette();
      else openPalette();
    };
    window.addEventListener("keydown", onKeyDown);
    return () => window.removeEventListener("keydown", onKeyDown);
  }, []);

  return (
    <Dialog.Root open={palette.isOpen} onOpenChange={(open) => (open ? openPalette() : closePalette())}>
      <Dialog.Portal>
        <Dialog.Overlay className="fixed inset-0 z-40 bg-[rgb(0_0_0/0.18)]" />
        <Dialog.Content
          aria-describedby={undefined}
          onCloseAutoFocus={focusDrawing}
          className="fixed top-[11vh] left-1/2 z-50 flex max-h-[70vh] w-[min(680px,calc(100vw-32px))] -translate-x-1/2 flex-col border-[1.5px] border-ink bg-leaf outline-none"
        >
          <Dialog.Title className="sr-only">Go to node, screen or action</Dialog.Title>
          <PaletteBody key={palette.query} initial={palette.query} />
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}

/** What was named is worked on next: the drawing or the table gets the focus, unless a form has taken it already. */
function focusDrawing(event: Event): void {
  const place = document.querySelector<HTMLElement>("[data-keyboard]");
  if (!place) return;
  event.preventDefault();
  const isTaken = document.activeElement?.matches("input, textarea, select") === true && !document.activeElement.closest("[role=dialog]");
  if (!isTaken) place.focus({ preventScroll: true });
}

function PaletteBody({ initial }: { initial: string }) {
  const { actions, sources } = useSyncExternalStore(subscribeToPalette, getPalette, getPalette);
  const [query, setQuery] = useState(initial);
  const [active, setActive] = useState(0);
  const listId = useId();
  const list = useRef<HTMLDivElement>(null);
  const entries = useMemo(() => {
    const text = query.trim();
    const found = text === "" ? [] : sources.flatMap((source) => source(text, MOST_NODES));
    return [...found, ...rankEntries(actions, text, text === "" ? 40 : MOST_ACTIONS)];
  }, [query, actions, sources]);
  const index = Math.min(active, Math.max(0, entries.length - 1));

  useEffect(() => {
    list.current?.querySelector('[aria-selected="true"]')?.scrollIntoView({ block: "nearest" });
  }, [index, entries]);

  function run(entry: PaletteEntry | undefined): void {
    if (!entry) return;
    closePalette();
    // After the focus has gone back to where it was, so that the entry may put it elsewhere.
    setTimeout(entry.run, 0);
  }

  function onKeyDown(event: KeyboardEvent): void {
    const step = { ArrowDown: 1, ArrowUp: -1, PageDown: 10, PageUp: -10 }[event.key];
    if (step !== undefined) {
      event.preventDefault();
      setActive(Math.max(0, Math.min(entries.length - 1, index + step)));
    } else if (event.key === "Enter") {
      event.preventDefault();
      run(entries[index]);
    }
  }

  return (
    <>
      <div className="flex h-11 shrink-0 items-center gap-2.5 border-b border-rule px-3.5">
        <Icon of={Search} className="text-ink-3" />
        <input
          autoFocus
          role="combobox"
          aria-label="Go to node, screen or action"
          aria-expanded="true"
          aria-controls={listId}
          aria-autocomplete="list"
          aria-activedescendant={entries[index] ? `${listId}-${index}` : undefined}
          className="h-full min-w-0 flex-1 bg-transparent text-lead outline-none"
          placeholder="Name, NodeId, path, data type, unit, screen or action"
          autoComplete="off"
          spellCheck={false}
          value={query}
          onChange={(event) => {
            setQuery(event.currentTarget.value);
            setActive(0);
          }}
          onKeyDown={onKeyDown}
        />
        <Kbd>Esc</Kbd>
      </div>
      <div ref={list} id={listId} role="listbox" aria-label="Answers" className="min-h-0 overflow-auto py-1">
        {entries.map((entry, i) => (
          <PaletteRow
            key={`${entry.group} ${entry.id}`}
            id={`${listId}-${i}`}
            entry={entry}
            isActive={i === index}
            isFirstOfGroup={entries[i - 1]?.group !== entry.group}
            onHover={() => setActive(i)}
            onRun={() => run(entry)}
          />
        ))}
        {entries.length === 0 ? <p className="px-3.5 py-3 text-small text-ink-3">Nothing answers “{query}”.</p> : null}
      </div>
      <div className="flex h-7 shrink-0 items-center gap-3 border-t border-rule bg-bench px-3.5 text-note text-ink-3" aria-hidden="true">
        <span className="flex items-center gap-1">
          <Kbd>↑</Kbd>
          <Kbd>↓</Kbd> choose
        </span>
        <span className="flex items-center gap-1">
          <Kbd>Enter</Kbd> go
        </span>
      </div>
    </>
  );
}

type RowProps = { id: string; entry: PaletteEntry; isActive: boolean; isFirstOfGroup: boolean; onHover: () => void; onRun: () => void };

function PaletteRow({ id, entry, isActive, isFirstOfGroup, onHover, onRun }: RowProps) {
  return (
    <>
      {isFirstOfGroup ? (
        <div role="presentation" className="px-3.5 pt-2 pb-1 text-note font-medium text-ink-3">
          {entry.group}
        </div>
      ) : null}
      <div
        id={id}
        role="option"
        aria-selected={isActive}
        onMouseMove={onHover}
        onMouseDown={(event) => event.preventDefault()}
        onClick={onRun}
        className={cx("flex h-7 cursor-pointer items-center gap-2 px-3.5 text-small", isActive && "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]")}
      >
        {entry.glyph ?? null}
        <span className={cx("shrink-0", entry.isType && "italic")}>{entry.label}</span>
        {entry.hint === undefined ? null : <span className="ml-auto truncate pl-4 font-mono text-note text-ink-3">{entry.hint}</span>}
      </div>
    </>
  );
}
