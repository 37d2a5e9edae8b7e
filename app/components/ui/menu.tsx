import type { LucideIcon } from "lucide-react";
import { ContextMenu as RadixContext, DropdownMenu as Radix } from "radix-ui";
import type { ReactNode } from "react";
import { Link } from "react-router";
import { cx } from "./cx";
import { Icon } from "./icon";
import { Kbd } from "./tag";
import { panelClass } from "./popover";

const itemClass =
  "flex h-7 cursor-pointer items-center gap-2 px-3 text-small outline-none select-none data-highlighted:bg-copper-wash data-highlighted:shadow-[inset_3px_0_0_var(--copper)] " +
  "data-disabled:cursor-not-allowed data-disabled:text-ink-3";

export type MenuEntry =
  | {
      kind?: "action";
      label: string;
      icon?: LucideIcon;
      glyph?: ReactNode;
      keys?: string;
      /** Said behind the label, paler: the reason when it is disabled. */
      note?: string;
      disabled?: boolean;
      danger?: boolean;
      onSelect: () => void;
    }
  | { kind: "link"; label: string; icon?: LucideIcon; note?: string; to: string; download?: boolean }
  | { kind: "choice"; label: string; checked: boolean; onSelect: () => void }
  | { kind: "head"; label: string }
  | { kind: "rule" };

type Parts = Pick<typeof Radix, "Item" | "CheckboxItem" | "Label" | "Separator">;

function MenuRows({ entries, parts }: { entries: readonly MenuEntry[]; parts: Parts }) {
  return entries.map((entry, index) => {
    const key = `${index}-${"label" in entry ? entry.label : "rule"}`;
    if (entry.kind === "rule") return <parts.Separator key={key} className="my-1 h-px bg-hair" />;
    if (entry.kind === "head")
      return (
        <parts.Label key={key} className="px-3 pt-2 pb-1 text-note font-medium text-ink-3">
          {entry.label}
        </parts.Label>
      );
    if (entry.kind === "choice")
      return (
        <parts.CheckboxItem key={key} checked={entry.checked} onSelect={entry.onSelect} className={itemClass}>
          <span className={cx("size-2.5 border border-edge", entry.checked && "border-ink bg-ink")} />
          {entry.label}
        </parts.CheckboxItem>
      );
    if (entry.kind === "link")
      return (
        <parts.Item key={key} asChild className={itemClass}>
          {entry.download ? (
            <a href={entry.to} download>
              {entry.icon ? <Icon of={entry.icon} /> : null}
              {entry.label}
              {entry.note ? <span className="ml-auto pl-4 text-note text-ink-3">{entry.note}</span> : null}
            </a>
          ) : (
            <Link to={entry.to}>
              {entry.icon ? <Icon of={entry.icon} /> : null}
              {entry.label}
              {entry.note ? <span className="ml-auto pl-4 text-note text-ink-3">{entry.note}</span> : null}
            </Link>
          )}
        </parts.Item>
      );
    return (
      <parts.Item
        key={key}
        disabled={entry.disabled ?? false}
        onSelect={entry.onSelect}
        className={cx(itemClass, entry.danger && !entry.disabled && "text-error")}
      >
        {entry.glyph ?? (entry.icon ? <Icon of={entry.icon} /> : null)}
        {entry.label}
        {entry.note || entry.keys ? (
          <span className="ml-auto flex items-center gap-2 pl-4 text-note text-ink-3">
            {entry.note}
            {entry.keys ? <Kbd>{entry.keys}</Kbd> : null}
          </span>
        ) : null}
      </parts.Item>
    );
  });
}

type MenuProps = {
  trigger: ReactNode;
  label: string;
  entries: readonly MenuEntry[];
  align?: "start" | "end";
  head?: ReactNode;
  className?: string;
};

/** A menu under a button; arrow keys, type-ahead and Esc as everywhere. */
export function Menu({ trigger, label, entries, align = "start", head, className }: MenuProps) {
  return (
    <Radix.Root modal={false}>
      <Radix.Trigger asChild>{trigger}</Radix.Trigger>
      <Radix.Portal>
        <Radix.Content
          aria-label={label}
          align={align}
          sideOffset={5}
          collisionPadding={8}
          className={cx(panelClass, "min-w-48 py-1", className)}
        >
          {head}
          <MenuRows entries={entries} parts={Radix} />
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}

/** The same menu on the secondary button, on the menu key and on Shift F10. */
export function ContextMenu({
  children,
  label,
  entries,
}: {
  children: ReactNode;
  label: string;
  entries: readonly MenuEntry[];
}) {
  return (
    <RadixContext.Root modal={false}>
      <RadixContext.Trigger asChild>{children}</RadixContext.Trigger>
      <RadixContext.Portal>
        <RadixContext.Content aria-label={label} collisionPadding={8} className={cx(panelClass, "min-w-48 py-1")}>
          <MenuRows entries={entries} parts={RadixContext as unknown as Parts} />
        </RadixContext.Content>
      </RadixContext.Portal>
    </RadixContext.Root>
  );
}
