import { ChevronDown } from "lucide-react";
import {
  useId,
  type InputHTMLAttributes,
  type ReactNode,
  type Ref,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
} from "react";
import { cx } from "./cx";
import { Icon } from "./icon";

const frame =
  "w-full min-w-0 rounded-edge border border-edge bg-leaf text-ink focus:outline-2 focus:-outline-offset-1 focus:outline-copper focus:border-copper " +
  "disabled:border-dashed disabled:border-rule disabled:bg-transparent disabled:text-ink-3 [&[readonly]]:bg-transparent [&[readonly]]:border-rule aria-invalid:border-error";

const heights = { small: "h-6 px-2 text-small", medium: "h-7 px-2 text-small", large: "h-9 px-3 text-body" } as const;
export type ControlSize = keyof typeof heights;

type FieldProps = {
  label: string;
  /** What to write, shown below the control. */
  hint?: ReactNode;
  errors?: readonly string[] | undefined;
  /** Places the label left of the control. */
  inline?: boolean;
  optional?: boolean;
  className?: string;
  children: (control: { id: string; "aria-invalid"?: true; "aria-describedby"?: string }) => ReactNode;
};

/** Label, control, hint and errors, tied together for readers of every kind. */
export function Field({ label, hint, errors, inline, optional, className, children }: FieldProps) {
  const id = useId();
  const invalid = errors !== undefined && errors.length > 0;
  const describedBy = [hint ? `${id}-hint` : "", invalid ? `${id}-errors` : ""].filter(Boolean).join(" ");
  return (
    <div className={cx(inline ? "grid grid-cols-[96px_1fr] items-center gap-x-3 gap-y-1" : "grid content-start gap-1", className)}>
      <label htmlFor={id} className="text-note font-medium text-ink-2">
        {label}
        {optional ? <span className="font-normal text-ink-3"> (optional)</span> : null}
      </label>
      {children({
        id,
        ...(invalid ? { "aria-invalid": true as const } : {}),
        ...(describedBy ? { "aria-describedby": describedBy } : {}),
      })}
      {invalid ? (
        <ul id={`${id}-errors`} className={cx("text-note text-error", inline && "col-start-2")}>
          {errors.map((error) => (
            <li key={error}>{error}</li>
          ))}
        </ul>
      ) : null}
      {hint ? (
        <div id={`${id}-hint`} className={cx("text-note text-ink-3", inline && "col-start-2")}>
          {hint}
        </div>
      ) : null}
    </div>
  );
}

type InputProps = Omit<InputHTMLAttributes<HTMLInputElement>, "size"> & {
  size?: ControlSize;
  /** Identifiers and figures. */
  mono?: boolean;
  /** Stands inside the right edge, as a unit. */
  unit?: string;
  ref?: Ref<HTMLInputElement>;
};

export function Input({ size = "medium", mono, unit, className, ...rest }: InputProps) {
  const input = (
    <input {...rest} className={cx(frame, heights[size], mono && "font-mono", unit && "pr-10", className)} />
  );
  if (!unit) return input;
  return (
    <span className="relative block w-full">
      {input}
      <span className="pointer-events-none absolute inset-y-0 right-2 flex items-center text-note text-ink-3">
        {unit}
      </span>
    </span>
  );
}

type TextAreaProps = TextareaHTMLAttributes<HTMLTextAreaElement> & { mono?: boolean; ref?: Ref<HTMLTextAreaElement> };

export function TextArea({ mono, className, rows = 3, ...rest }: TextAreaProps) {
  return (
    <textarea
      {...rest}
      rows={rows}
      className={cx(frame, "block px-2 py-1 text-small", mono && "font-mono", className)}
    />
  );
}

type SelectProps = Omit<SelectHTMLAttributes<HTMLSelectElement>, "size"> & {
  size?: ControlSize;
  mono?: boolean;
  ref?: Ref<HTMLSelectElement>;
};

export function Select({ size = "medium", mono, className, children, ...rest }: SelectProps) {
  return (
    <span className={cx("relative block w-full", className)}>
      <select {...rest} className={cx(frame, heights[size], "appearance-none truncate pr-7", mono && "font-mono")}>
        {children}
      </select>
      <Icon of={ChevronDown} className="pointer-events-none absolute inset-y-0 right-2 my-auto text-ink-3" />
    </span>
  );
}

type CheckboxProps = Omit<InputHTMLAttributes<HTMLInputElement>, "type"> & {
  label: ReactNode;
  hint?: ReactNode;
  ref?: Ref<HTMLInputElement>;
};

export function Checkbox({ label, hint, className, ...rest }: CheckboxProps) {
  return (
    <label
      className={cx(
        "grid grid-cols-[14px_1fr] items-start gap-x-2 text-small",
        rest.disabled && "text-ink-3",
        className,
      )}
    >
      <input {...rest} type="checkbox" className="mt-[1.5px] size-3.5 accent-(--copper)" />
      <span>
        {label}
        {hint ? <span className="block text-note text-ink-3">{hint}</span> : null}
      </span>
    </label>
  );
}
