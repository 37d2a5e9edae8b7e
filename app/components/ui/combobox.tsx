import { useEffect, useId, useRef, useState, type KeyboardEvent, type ReactNode } from "react";
import { Input, type ControlSize } from "./field";
import { AnchoredPanel } from "./popover";
import { cx } from "./cx";

type ComboboxProps<Item> = {
  /** Name of the text field for readers; give `id` instead when a label stands beside it. */
  label: string;
  id?: string;
  query: string;
  onQuery: (query: string) => void;
  /** The rows that answer the query, best first. */
  items: readonly Item[];
  itemKey: (item: Item) => string;
  renderItem: (item: Item) => ReactNode;
  onPick: (item: Item) => void;
  /** Called on Esc, and when the field is left without picking. */
  onCancel?: () => void;
  placeholder?: string;
  /** Above the rows: how many of how many, name and date of the table. */
  head?: ReactNode;
  foot?: ReactNode;
  /** Said instead of rows when nothing answers. */
  none?: string;
  size?: ControlSize;
  mono?: boolean;
  autoFocus?: boolean;
  className?: string;
  panelClassName?: string;
  "aria-invalid"?: true;
  "aria-describedby"?: string;
};

/** A text field with a list below it; arrow keys choose, Enter takes, Esc leaves. The focus stays in the field. */
export function Combobox<Item>(props: ComboboxProps<Item>) {
  const {
    label,
    query,
    onQuery,
    items,
    itemKey,
    renderItem,
    onPick,
    onCancel,
    head,
    foot,
    none = "Nothing found",
    size,
    mono,
  } = props;
  const listId = useId();
  const [open, setOpen] = useState(false);
  const [active, setActive] = useState(0);
  const list = useRef<HTMLUListElement>(null);
  const index = Math.min(active, Math.max(0, items.length - 1));

  useEffect(() => {
    list.current?.children[index]?.scrollIntoView({ block: "nearest" });
  }, [index, open]);

  function pick(item: Item | undefined) {
    if (item === undefined) return;
    setOpen(false);
    setActive(0);
    onPick(item);
  }
  function leave() {
    setOpen(false);
    onCancel?.();
  }
  function onKeyDown(event: KeyboardEvent<HTMLInputElement>) {
    if (event.key === "ArrowDown" || event.key === "ArrowUp") {
      event.preventDefault();
      if (!open) setOpen(true);
      else setActive(Math.max(0, Math.min(items.length - 1, index + (event.key === "ArrowDown" ? 1 : -1))));
    } else if (event.key === "Enter" && open) {
      event.preventDefault();
      pick(items[index]);
    } else if (event.key === "Escape" && (open || onCancel)) {
      event.preventDefault();
      event.stopPropagation();
      leave();
    }
  }

  return (
    <AnchoredPanel
      open={open}
      onOpenChange={setOpen}
      label={label}
      keepFocus
      className={cx("w-(--radix-popover-trigger-width) min-w-80", props.panelClassName)}
      anchor={
        <Input
          {...(props.id ? { id: props.id } : { "aria-label": label })}
          {...(props["aria-invalid"] ? { "aria-invalid": true } : {})}
          {...(props["aria-describedby"] ? { "aria-describedby": props["aria-describedby"] } : {})}
          {...(size ? { size } : {})}
          {...(mono ? { mono } : {})}
          {...(props.className ? { className: props.className } : {})}
          role="combobox"
          aria-expanded={open}
          aria-controls={listId}
          aria-autocomplete="list"
          aria-activedescendant={open && items[index] !== undefined ? `${listId}-${index}` : undefined}
          autoComplete="off"
          spellCheck={false}
          placeholder={props.placeholder}
          autoFocus={props.autoFocus}
          value={query}
          onChange={(event) => {
            onQuery(event.currentTarget.value);
            setActive(0);
            setOpen(true);
          }}
          onClick={() => setOpen(true)}
          onKeyDown={onKeyDown}
          onBlur={leave}
        />
      }
    >
      {head ? (
        <div className="flex h-6 items-center justify-between gap-2 bg-bench px-2 text-note text-ink-3">{head}</div>
      ) : null}
      <ul ref={list} id={listId} role="listbox" aria-label={label} className="max-h-72 overflow-auto">
        {items.map((item, i) => (
          <li
            key={itemKey(item)}
            id={`${listId}-${i}`}
            role="option"
            aria-selected={i === index}
            onMouseEnter={() => setActive(i)}
            onMouseDown={(event) => event.preventDefault()}
            onClick={() => pick(item)}
            className={cx(
              "cursor-pointer border-b border-hair px-2 py-1 text-small last:border-b-0",
              i === index && "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]",
            )}
          >
            {renderItem(item)}
          </li>
        ))}
      </ul>
      {items.length === 0 ? <p className="px-2 py-2 text-small text-ink-3">{none}</p> : null}
      {foot ? (
        <div className="flex min-h-7 items-center gap-2 border-t border-rule bg-bench px-2 text-small text-ink-2">
          {foot}
        </div>
      ) : null}
    </AnchoredPanel>
  );
}
