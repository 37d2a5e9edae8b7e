import type { ReactNode } from "react";
import { cx } from "./cx";

/** An empty place: one line that says what belongs here, and the first thing to do. */
export function Empty({
  title,
  children,
  action,
  className,
}: {
  title: string;
  children?: ReactNode;
  action?: ReactNode;
  className?: string;
}) {
  return (
    <div
      className={cx(
        "grid place-content-center justify-items-center gap-3 border border-dashed border-edge p-8 text-center",
        className,
      )}
    >
      <p className="text-body font-semibold text-ink">{title}</p>
      {children ? <div className="max-w-120 text-small text-ink-2">{children}</div> : null}
      {action}
    </div>
  );
}
