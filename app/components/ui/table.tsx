import type { HTMLAttributes, ReactNode, TableHTMLAttributes, TdHTMLAttributes, ThHTMLAttributes } from "react";
import { cx } from "./cx";

/** A plain table of the drawing: hairlines between rows, an ink line under the head. Wrap wide ones in `TableScroll`. */
export function Table({
  className,
  caption,
  children,
  ...rest
}: TableHTMLAttributes<HTMLTableElement> & { caption: string }) {
  return (
    <table {...rest} className={cx("w-full border-collapse text-small", className)}>
      <caption className="sr-only">{caption}</caption>
      {children}
    </table>
  );
}

export function TableScroll({
  label,
  children,
  className,
}: {
  label: string;
  children: ReactNode;
  className?: string;
}) {
  return (
    <div role="region" aria-label={label} tabIndex={0} className={cx("overflow-x-auto", className)}>
      {children}
    </div>
  );
}

type Align = { right?: boolean };

export function Th({ right, className, scope = "col", ...rest }: ThHTMLAttributes<HTMLTableCellElement> & Align) {
  return (
    <th
      {...rest}
      scope={scope}
      className={cx(
        "h-6 border-b border-ink px-2 text-note font-medium whitespace-nowrap text-ink-3 first:pl-0 last:pr-0",
        right ? "text-right" : "text-left",
        className,
      )}
    />
  );
}

/** The cell that names its row. */
export function RowHead({ className, ...rest }: ThHTMLAttributes<HTMLTableCellElement>) {
  return (
    <th
      {...rest}
      scope="row"
      className={cx("h-7 border-b border-hair px-2 text-left font-semibold first:pl-0", className)}
    />
  );
}

export function Td({
  right,
  mono,
  className,
  ...rest
}: TdHTMLAttributes<HTMLTableCellElement> & Align & { mono?: boolean }) {
  return (
    <td
      {...rest}
      className={cx(
        "h-7 border-b border-hair px-2 first:pl-0 last:pr-0",
        right && "text-right",
        mono && "font-mono",
        className,
      )}
    />
  );
}

export function Tr({ className, ...rest }: HTMLAttributes<HTMLTableRowElement>) {
  return <tr {...rest} className={cx("hover:bg-bench", className)} />;
}
