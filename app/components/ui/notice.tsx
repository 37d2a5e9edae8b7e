import type { ReactNode } from "react";
import { cx } from "./cx";

export type NoticeTone = "plain" | "error" | "warning" | "hint" | "good";

const tones: Record<NoticeTone, string> = {
  plain: "bg-bench border-rule shadow-[inset_3px_0_0_var(--ink-2)]",
  error: "bg-error-wash border-error shadow-[inset_3px_0_0_var(--error)]",
  warning: "bg-warning-wash border-warning shadow-[inset_3px_0_0_var(--warning)]",
  hint: "bg-hint-wash border-hint shadow-[inset_3px_0_0_var(--hint)]",
  good: "bg-good-wash border-good shadow-[inset_3px_0_0_var(--good)]",
};

type NoticeProps = {
  tone?: NoticeTone;
  title?: ReactNode;
  glyph?: ReactNode;
  action?: ReactNode;
  live?: boolean;
  className?: string;
  children?: ReactNode;
};

/** A word on the page about what happened or what to know. `live` reads it out when it appears. */
export function Notice({ tone = "plain", title, glyph, action, live, className, children }: NoticeProps) {
  return (
    <div
      {...(live ? { role: tone === "error" ? "alert" : "status" } : {})}
      className={cx("flex items-start gap-2 border py-2 pr-3 pl-4 text-small text-ink", tones[tone], className)}
    >
      {glyph ? <span className="mt-0.5 shrink-0">{glyph}</span> : null}
      <div className="min-w-0 flex-1">
        {title ? <p className="font-semibold">{title}</p> : null}
        {children}
      </div>
      {action ? <div className="shrink-0">{action}</div> : null}
    </div>
  );
}
