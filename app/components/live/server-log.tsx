import { useEffect, useRef } from "react";
import type { LogLine } from "~/domain/simulation/test-server-state";
import { cx } from "../ui/cx";

const TONES: Readonly<Record<LogLine["level"], string>> = { info: "text-ink-2", output: "text-ink-3", warning: "text-warning", error: "text-error" };

/** The end of the process's log; stays at its last line while the reader is there. */
export function ServerLog({ lines }: { lines: readonly LogLine[] }) {
  const box = useRef<HTMLOListElement>(null);
  useEffect(() => {
    const element = box.current;
    if (element && element.scrollHeight - element.scrollTop - element.clientHeight < 80) element.scrollTop = element.scrollHeight;
  }, [lines]);
  if (lines.length === 0) return <p className="text-small text-ink-3">Nothing has been logged yet.</p>;
  return (
    <ol ref={box} tabIndex={0} aria-label="Log" className="max-h-64 overflow-auto border border-rule bg-leaf p-2 font-mono text-note leading-[17px]">
      {lines.map((line, index) => (
        <li key={index} className={cx("grid grid-cols-[62px_56px_minmax(0,1fr)] gap-2", TONES[line.level])}>
          <time dateTime={line.at}>{new Date(line.at).toLocaleTimeString("en-GB")}</time>
          <span>{line.level}</span>
          <span className="break-words whitespace-pre-wrap">{line.text}</span>
        </li>
      ))}
    </ol>
  );
}
