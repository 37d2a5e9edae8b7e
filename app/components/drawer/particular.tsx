import { useEffect, useId, useRef, useState, type ReactNode } from "react";
import { cx } from "../ui/cx";
import { Input, TextArea } from "../ui/field";

/** A key and its value or control, as one row of a drawer column. */
export function Particular({ label, children }: { label: string; children: (id: string) => ReactNode }) {
  const id = useId();
  return (
    <div className="particular">
      <label htmlFor={id}>{label}</label>
      <div className="min-w-0">{children(id)}</div>
    </div>
  );
}

/** A row that is only read. */
export function Fact({ label, children, mono }: { label: string; children: ReactNode; mono?: boolean }) {
  return (
    <div className="particular">
      <span className="particular-key">{label}</span>
      <div className={mono ? "particular-fact font-mono" : "particular-fact"}>{children}</div>
    </div>
  );
}

type CommitProps = {
  id?: string;
  label?: string;
  value: string;
  onCommit: (text: string) => void;
  readOnly?: boolean;
  mono?: boolean;
  unit?: string;
  placeholder?: string;
  rows?: number;
  className?: string;
  /** In a table: the frame shows only while it is pointed at or edited. */
  isBare?: boolean;
};

/** A field that hands its text over when it is left or Enter is pressed; Esc brings the old text back. */
export function CommitField({
  id,
  label,
  value,
  onCommit,
  readOnly = false,
  mono,
  unit,
  placeholder,
  rows,
  className,
  isBare,
}: CommitProps) {
  const [text, setText] = useState(value);
  const isLeaving = useRef(false);
  useEffect(() => setText(value), [value]);

  function commit(): void {
    if (!isLeaving.current && text !== value) onCommit(text);
    isLeaving.current = false;
  }

  const shared = {
    ...(id === undefined ? { "aria-label": label } : { id }),
    value: text,
    readOnly,
    placeholder,
    spellCheck: rows !== undefined,
    autoComplete: "off",
    onBlur: commit,
    ...(mono ? { mono } : {}),
    className: cx(
      className,
      isBare &&
        "border-transparent! bg-transparent! focus:border-copper! focus:bg-leaf! hover:not-read-only:border-edge!",
    ),
  };
  function onKey(key: string, isMultiline: boolean, element: HTMLElement): void {
    if (key === "Enter" && !isMultiline) element.blur();
    if (key !== "Escape") return;
    isLeaving.current = true;
    setText(value);
    element.blur();
  }
  if (rows !== undefined) {
    return (
      <TextArea
        {...shared}
        rows={rows}
        onChange={(event) => setText(event.currentTarget.value)}
        onKeyDown={(event) => {
          event.stopPropagation();
          onKey(event.key, !(event.ctrlKey || event.metaKey), event.currentTarget);
        }}
      />
    );
  }
  return (
    <Input
      {...shared}
      {...(unit === undefined ? {} : { unit })}
      size="small"
      onChange={(event) => setText(event.currentTarget.value)}
      onKeyDown={(event) => {
        event.stopPropagation();
        onKey(event.key, false, event.currentTarget);
      }}
    />
  );
}
