import { X } from "lucide-react";
import { useEffect, useRef, useState, type KeyboardEvent, type PointerEvent, type ReactNode } from "react";
import { IconButton } from "./button";
import { cx } from "./cx";

type DrawerProps = {
  label: string;
  /** Glyph, name, path, and what belongs beside them. */
  head: ReactNode;
  /** Actions at the right of the head, before Close. */
  tools?: ReactNode;
  children: ReactNode;
  onClose?: () => void;
  /** Key under which this browser keeps the height. */
  storageKey?: string;
  initialHeight?: number;
  minHeight?: number;
  className?: string;
};

const step = 24;

/** A drawer at the lower edge of its column: dragged taller by its grip, or by arrow keys on it; keeps its height. */
export function Drawer(props: DrawerProps) {
  const {
    label,
    head,
    tools,
    children,
    onClose,
    storageKey = "drawer-height",
    initialHeight = 260,
    minHeight = 96,
    className,
  } = props;
  const [height, setHeight] = useState(initialHeight);
  const section = useRef<HTMLElement>(null);
  const drag = useRef<{ y: number; height: number } | null>(null);

  useEffect(() => {
    const kept = Number(localStorage.getItem(storageKey));
    if (kept >= minHeight) setHeight(kept);
  }, [storageKey, minHeight]);

  function limit(wanted: number): number {
    const room = section.current?.parentElement?.clientHeight ?? 900;
    return Math.round(Math.max(minHeight, Math.min(wanted, room - 120)));
  }
  function keep(next: number) {
    setHeight(next);
    localStorage.setItem(storageKey, String(next));
  }
  function onPointerDown(event: PointerEvent<HTMLDivElement>) {
    event.currentTarget.setPointerCapture(event.pointerId);
    drag.current = { y: event.clientY, height };
  }
  function onPointerMove(event: PointerEvent<HTMLDivElement>) {
    if (drag.current) setHeight(limit(drag.current.height + drag.current.y - event.clientY));
  }
  function onPointerUp() {
    if (drag.current) keep(height);
    drag.current = null;
  }
  function onKeyDown(event: KeyboardEvent<HTMLDivElement>) {
    const wanted = { ArrowUp: height + step, ArrowDown: height - step, Home: minHeight, End: 10_000 }[event.key];
    if (wanted === undefined) return;
    event.preventDefault();
    keep(limit(wanted));
  }

  return (
    <section
      ref={section}
      aria-label={label}
      style={{ height }}
      className={cx("relative flex max-h-[80%] shrink-0 flex-col border-t-[1.5px] border-ink bg-bench", className)}
    >
      <div
        role="separator"
        aria-orientation="horizontal"
        aria-label={`Height of ${label}`}
        aria-valuenow={height}
        aria-valuemin={minHeight}
        tabIndex={0}
        onPointerDown={onPointerDown}
        onPointerMove={onPointerMove}
        onPointerUp={onPointerUp}
        onPointerCancel={onPointerUp}
        onKeyDown={onKeyDown}
        className="group absolute inset-x-0 -top-1 z-10 flex h-3 cursor-row-resize touch-none justify-center focus-visible:outline-offset-0"
      >
        <span className="mt-1.5 h-[5px] w-4 border-y border-ink-3 group-hover:border-copper" />
      </div>
      <header className="flex h-8 shrink-0 items-center gap-2 border-b border-rule pr-2 pl-5">
        {head}
        <span className="ml-auto flex shrink-0 items-center gap-2">
          {tools}
          {onClose ? <IconButton icon={X} label="Close drawer" keys="Esc" size="small" onClick={onClose} /> : null}
        </span>
      </header>
      <div className="min-h-0 flex-1 overflow-auto">{children}</div>
    </section>
  );
}
