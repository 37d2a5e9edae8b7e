import { Tooltip as Radix } from "radix-ui";
import type { ReactNode } from "react";

/** A short word about a control, on hover and focus. Never the only place of something that must be known. */
export function Tooltip({
  text,
  side = "bottom",
  children,
}: {
  text: string;
  side?: "top" | "bottom" | "left" | "right";
  children: ReactNode;
}) {
  return (
    <Radix.Root>
      <Radix.Trigger asChild>{children}</Radix.Trigger>
      <Radix.Portal>
        <Radix.Content
          side={side}
          sideOffset={6}
          collisionPadding={8}
          className="z-50 max-w-72 border border-ink bg-ink px-2 py-1 text-note text-ink-on"
        >
          {text}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}

/** Once, around the page. */
export function TooltipProvider({ children }: { children: ReactNode }) {
  return (
    <Radix.Provider delayDuration={450} skipDelayDuration={200}>
      {children}
    </Radix.Provider>
  );
}
