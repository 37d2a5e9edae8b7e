import type { ReactNode } from "react";
import { cx } from "./cx";

export type TitleCell = {
  label: string;
  value: ReactNode;
  mono?: boolean;
  strong?: boolean;
  here?: boolean;
  narrowHidden?: boolean;
};

/** The drawing's title block as the foot of a page: small keys over values. */
export function TitleBlock({
  label,
  cells,
  className,
}: {
  label: string;
  cells: readonly TitleCell[];
  className?: string;
}) {
  return (
    <section aria-label={label} className={cx("shrink-0 border-t-[1.5px] border-ink bg-leaf", className)}>
      <dl tabIndex={0} aria-label={label} className="flex h-(--foot) overflow-x-auto focus-visible:-outline-offset-2">
        {cells.map((cell) => (
          <div
            key={cell.label}
            className={cx(
              "flex min-w-0 flex-col justify-center border-l border-rule px-3.5 first:border-l-0 first:pl-5",
              "shrink-0 last:flex-1",
              cell.here && "bg-copper-wash",
              cell.narrowHidden && "max-[1360px]:hidden",
            )}
          >
            <dt className="text-key text-ink-3">{cell.label}</dt>
            <dd className={cx("truncate text-small", cell.mono && "font-mono", cell.strong && "font-semibold")}>
              {cell.value}
            </dd>
          </div>
        ))}
      </dl>
    </section>
  );
}
