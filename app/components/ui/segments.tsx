import { useId, type ReactNode } from "react";
import { cx } from "./cx";

export type Segment<Value extends string> = { value: Value; label: ReactNode; name?: string; disabled?: boolean };

const shell =
  "inline-flex h-[26px] shrink-0 overflow-hidden rounded-edge border border-edge bg-leaf text-small whitespace-nowrap";

type SegmentsProps<Value extends string> = {
  label: string;
  options: readonly Segment<Value>[];
  value: Value;
  onChange?: (value: Value) => void;
  /** Name in a form; without `onChange` the segments are uncontrolled and start at `value`. */
  name?: string;
  className?: string;
};

/** One of a few, as radio buttons: solid ink is the one chosen. */
export function Segments<Value extends string>({
  label,
  options,
  value,
  onChange,
  name,
  className,
}: SegmentsProps<Value>) {
  const group = useId();
  return (
    <fieldset
      className={cx(shell, "m-0 p-0 focus-within:has-focus-visible:outline-2 focus-within:outline-copper", className)}
    >
      <legend className="sr-only">{label}</legend>
      {options.map((option) => (
        <label
          key={option.value}
          className={cx(
            "flex items-center gap-1.5 border-l border-rule px-[9px] text-ink-2 first-of-type:border-l-0",
            "has-checked:bg-ink has-checked:font-medium has-checked:text-ink-on",
            option.disabled ? "text-ink-3" : "cursor-pointer hover:bg-bench-2 has-checked:hover:bg-ink",
          )}
        >
          <input
            type="radio"
            className="sr-only"
            name={name ?? group}
            value={option.value}
            disabled={option.disabled}
            {...(onChange
              ? { checked: option.value === value, onChange: () => onChange(option.value) }
              : { defaultChecked: option.value === value })}
          />
          {option.label}
        </label>
      ))}
    </fieldset>
  );
}

type ToggleSegmentsProps<Value extends string> = {
  label: string;
  options: readonly Segment<Value>[];
  values: ReadonlySet<Value>;
  onToggle: (value: Value) => void;
  className?: string;
};

/** Several of a few: a copper foot line marks each one chosen. */
export function ToggleSegments<Value extends string>({
  label,
  options,
  values,
  onToggle,
  className,
}: ToggleSegmentsProps<Value>) {
  return (
    <div role="group" aria-label={label} className={cx(shell, className)}>
      {options.map((option) => {
        const on = values.has(option.value);
        return (
          <button
            key={option.value}
            type="button"
            aria-pressed={on}
            aria-label={option.name}
            disabled={option.disabled}
            onClick={() => onToggle(option.value)}
            className={cx(
              "flex items-center gap-1.5 border-l border-rule px-[9px] first:border-l-0 focus-visible:-outline-offset-2",
              on ? "text-ink shadow-[inset_0_-2px_0_var(--copper)]" : "text-ink-3 hover:bg-bench-2",
            )}
          >
            {option.label}
          </button>
        );
      })}
    </div>
  );
}
