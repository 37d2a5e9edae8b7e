import { useEffect, useState, type ComponentProps } from "react";
import { Field, Input } from "~/components/ui/field";
import { formatFigure, parseFigure } from "./parse-figure";

type Props = Omit<ComponentProps<typeof Input>, "value" | "onChange" | "onBlur" | "onKeyDown"> & {
  label: string;
  value: string;
  /** Takes the text when the field is left or Enter is pressed; a text says why it cannot be taken. */
  onCommit: (text: string) => string | undefined;
  hint?: string | undefined;
  className?: string;
};

/** A text field whose text is taken when it is left; Esc brings the old one back. */
export function CommitInput({ label, value, onCommit, hint, className, ...rest }: Props) {
  const [text, setText] = useState(value);
  const [error, setError] = useState<string | undefined>(undefined);
  useEffect(() => {
    setText(value);
    setError(undefined);
  }, [value]);
  function commit(): void {
    if (text === value) return setError(undefined);
    setError(onCommit(text));
  }
  return (
    <Field
      label={label}
      hint={hint}
      errors={error === undefined ? undefined : [error]}
      {...(className ? { className } : {})}
    >
      {(tied) => (
        <Input
          {...tied}
          {...rest}
          size="small"
          value={text}
          spellCheck={false}
          autoComplete="off"
          onChange={(event) => setText(event.currentTarget.value)}
          onBlur={commit}
          onKeyDown={(event) => {
            if (event.key === "Enter") commit();
            if (event.key === "Escape" && text !== value) {
              event.stopPropagation();
              setText(value);
              setError(undefined);
            }
          }}
        />
      )}
    </Field>
  );
}

type FigureProps = Omit<Props, "value" | "onCommit"> & {
  value: number | undefined;
  onCommit: (value: number) => void;
  isWhole?: boolean;
  low?: number;
  high?: number;
  /** The field may be empty; then this is called. */
  onClear?: () => void;
};

/** The same for a figure within its limits. */
export function FigureInput({
  value,
  onCommit,
  isWhole,
  low = -Infinity,
  high = Infinity,
  onClear,
  ...rest
}: FigureProps) {
  function take(text: string): string | undefined {
    if (text.trim() === "" && onClear) {
      onClear();
      return undefined;
    }
    const figure = parseFigure(text);
    if (figure === undefined || (isWhole && !Number.isInteger(figure)))
      return `“${text}” is no ${isWhole ? "whole number" : "figure"}`;
    if (figure < low || figure > high) return `from ${formatFigure(low)} to ${formatFigure(high)}`;
    onCommit(figure);
    return undefined;
  }
  return <CommitInput {...rest} mono value={value === undefined ? "" : formatFigure(value)} onCommit={take} />;
}
