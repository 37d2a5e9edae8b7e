import { useEffect, useRef, useState, type ReactNode } from "react";
import { cx } from "../ui/cx";

const HOLD_TIME = 900;

type Props = { children: ReactNode; busy: boolean; blockedBy?: string | undefined; onHeld: () => void };

/** A button that acts only when it is held: with the pointer, or with the space bar or Enter. Letting go early does nothing. */
export function HoldButton({ children, busy, blockedBy, onHeld }: Props) {
  const [isHeld, setHeld] = useState(false);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const isBlocked = busy || blockedBy !== undefined;
  const release = (): void => {
    clearTimeout(timer.current);
    setHeld(false);
  };
  const hold = (): void => {
    if (isBlocked || isHeld) return;
    setHeld(true);
    timer.current = setTimeout(() => {
      setHeld(false);
      onHeld();
    }, HOLD_TIME);
  };
  useEffect(() => () => clearTimeout(timer.current), []);
  return (
    <button
      type="button"
      aria-disabled={isBlocked || undefined}
      aria-busy={busy || undefined}
      title={blockedBy ?? "Hold for a second; letting go earlier does nothing"}
      onPointerDown={hold}
      onPointerUp={release}
      onPointerLeave={release}
      onPointerCancel={release}
      onBlur={release}
      onContextMenu={(event) => event.preventDefault()}
      onKeyDown={(event) => {
        if (event.key !== " " && event.key !== "Enter") return;
        event.preventDefault();
        hold();
      }}
      onKeyUp={release}
      className={cx(
        "relative h-8 shrink-0 touch-none overflow-hidden border-[1.5px] px-3.5 text-small font-semibold select-none",
        isBlocked
          ? "cursor-not-allowed border-dashed border-rule text-ink-3"
          : "border-warning bg-[repeating-linear-gradient(135deg,var(--leaf)_0_8px,var(--warning-wash)_8px_12px)]",
      )}
    >
      <span
        aria-hidden
        style={{ transitionDuration: isHeld ? `${HOLD_TIME}ms` : "0ms" }}
        className={cx("absolute inset-y-0 left-0 bg-warning opacity-30 transition-[width] ease-linear", isHeld ? "w-full" : "w-0")}
      />
      <span className="relative">{busy ? "Working…" : children}</span>
    </button>
  );
}
