import type { ReactNode } from "react";
import { cx } from "./cx";

const tones = {
  plain: "border-rule text-ink-2",
  ink: "border-ink text-ink",
  copper: "border-copper text-copper",
  mate: "border-mate text-mate",
} as const;

export function Tag({
  tone = "plain",
  mono,
  className,
  children,
}: {
  tone?: keyof typeof tones;
  mono?: boolean;
  className?: string;
  children: ReactNode;
}) {
  return (
    <span
      className={cx(
        "inline-flex h-[18px] items-center gap-1 border bg-leaf px-[5px] text-note leading-none whitespace-nowrap",
        tones[tone],
        mono && "font-mono",
        className,
      )}
    >
      {children}
    </span>
  );
}

export function Kbd({ children, className }: { children: ReactNode; className?: string }) {
  return (
    <kbd
      className={cx(
        "inline-block rounded-edge border border-rule bg-paper px-1 font-mono text-note leading-4 font-medium whitespace-nowrap text-ink-3",
        className,
      )}
    >
      {children}
    </kbd>
  );
}
