import type { ReactNode } from "react";
import { cx } from "~/components/ui/cx";

type Props<Value extends string> = {
  name: string;
  value: Value;
  chosen: Value;
  onChoose: (value: Value) => void;
  sketch?: ReactNode;
  title: string;
  about: string;
};

/** One of a few ways, each told in a sentence: a radio button as a card. */
export function ChoiceCard<Value extends string>({
  name,
  value,
  chosen,
  onChoose,
  sketch,
  title,
  about,
}: Props<Value>) {
  const on = value === chosen;
  return (
    <label
      className={cx(
        "grid cursor-pointer grid-cols-[auto_1fr] gap-x-3 border p-3 has-focus-visible:outline-2 has-focus-visible:outline-copper",
        on ? "border-copper bg-copper-wash" : "border-rule bg-leaf hover:border-edge",
      )}
    >
      <input type="radio" name={name} value={value} checked={on} onChange={() => onChoose(value)} className="sr-only" />
      {sketch ?? <span />}
      <span>
        <b className="block font-semibold">{title}</b>
        <span className="text-small text-ink-2">{about}</span>
      </span>
    </label>
  );
}
