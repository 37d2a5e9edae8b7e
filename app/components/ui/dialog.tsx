import { X } from "lucide-react";
import { Dialog as Radix } from "radix-ui";
import type { ReactNode } from "react";
import { buttonClass } from "./button";
import { cx } from "./cx";
import { Icon } from "./icon";

type DialogProps = {
  title: string;
  /** One sentence on what it is for or what it will do. */
  about?: ReactNode;
  trigger?: ReactNode;
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
  children: ReactNode;
  className?: string;
};

/** Only where a question must be answered first, as before something is removed for good. */
export function Dialog({ title, about, trigger, open, onOpenChange, children, className }: DialogProps) {
  return (
    <Radix.Root {...(open === undefined ? {} : { open })} {...(onOpenChange ? { onOpenChange } : {})}>
      {trigger ? <Radix.Trigger asChild>{trigger}</Radix.Trigger> : null}
      <Radix.Portal>
        <Radix.Overlay className="fixed inset-0 z-40 bg-[rgb(0_0_0/0.35)]" />
        <Radix.Content
          {...(about ? {} : { "aria-describedby": undefined })}
          className={cx(
            "fixed top-[12vh] left-1/2 z-50 max-h-[80vh] w-[min(520px,calc(100vw-32px))] -translate-x-1/2 overflow-auto border-[1.5px] border-ink bg-leaf outline-none",
            className,
          )}
        >
          <header className="flex items-center gap-2 border-b border-rule py-2 pr-2 pl-4">
            <Radix.Title className="flex-1 text-lead font-semibold">{title}</Radix.Title>
            <Radix.Close asChild>
              <button type="button" aria-label="Close" className={buttonClass("bare", "medium", "w-7 px-0!")}>
                <Icon of={X} size={15} />
              </button>
            </Radix.Close>
          </header>
          <div className="grid gap-4 p-4">
            {about ? <Radix.Description className="text-small text-ink-2">{about}</Radix.Description> : null}
            {children}
          </div>
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}

export const DialogClose = Radix.Close;
