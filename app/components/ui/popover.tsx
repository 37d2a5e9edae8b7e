import { Popover as Radix } from "radix-ui";
import type { ReactNode } from "react";
import { cx } from "./cx";

export const panelClass = "z-40 border-[1.5px] border-ink bg-leaf text-ink outline-none";

type PopoverProps = {
  trigger: ReactNode;
  children: ReactNode;
  label: string;
  side?: "top" | "bottom" | "left" | "right";
  align?: "start" | "center" | "end";
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
  className?: string;
};

export function Popover({
  trigger,
  children,
  label,
  side = "bottom",
  align = "start",
  open,
  onOpenChange,
  className,
}: PopoverProps) {
  return (
    <Radix.Root {...(open === undefined ? {} : { open })} {...(onOpenChange ? { onOpenChange } : {})}>
      <Radix.Trigger asChild>{trigger}</Radix.Trigger>
      <Radix.Portal>
        <Radix.Content
          aria-label={label}
          side={side}
          align={align}
          sideOffset={5}
          collisionPadding={8}
          className={cx(panelClass, className)}
        >
          {children}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}

/** A panel that hangs on a place that is no button, as a cell in edit. */
export function AnchoredPanel({
  anchor,
  children,
  label,
  open,
  onOpenChange,
  className,
  keepFocus,
}: {
  anchor: ReactNode;
  children: ReactNode;
  label: string;
  open: boolean;
  onOpenChange: (open: boolean) => void;
  className?: string;
  /** The focus stays in the anchor (a text field that drives a list). */
  keepFocus?: boolean;
}) {
  return (
    <Radix.Root open={open} onOpenChange={onOpenChange}>
      <Radix.Anchor asChild>{anchor}</Radix.Anchor>
      <Radix.Portal>
        <Radix.Content
          aria-label={label}
          align="start"
          sideOffset={-1}
          collisionPadding={8}
          {...(keepFocus
            ? {
                onOpenAutoFocus: (event: Event) => event.preventDefault(),
                onCloseAutoFocus: (event: Event) => event.preventDefault(),
              }
            : {})}
          className={cx(panelClass, className)}
        >
          {children}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
