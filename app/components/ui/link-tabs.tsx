import type { ReactNode } from "react";
import { NavLink } from "react-router";
import { cx } from "./cx";

export type LinkTab = { to: string; label: ReactNode; end?: boolean };

/** Tabs that are pages: links in a navigation, the open one is raised onto the leaf. */
export function LinkTabs({ label, tabs, className }: { label: string; tabs: readonly LinkTab[]; className?: string }) {
  return (
    <nav aria-label={label} className={cx("flex self-stretch", className)}>
      {tabs.map((tab) => (
        <NavLink
          key={tab.to}
          to={tab.to}
          end={tab.end ?? false}
          prefetch="intent"
          className={({ isActive }) =>
            cx(
              "-mb-px flex items-center gap-1.5 border-x px-3 whitespace-nowrap focus-visible:-outline-offset-2",
              isActive
                ? "border-rule bg-leaf font-semibold text-ink shadow-[inset_0_2px_0_var(--copper)]"
                : "border-transparent text-ink-2 hover:text-ink",
            )
          }
        >
          {tab.label}
        </NavLink>
      ))}
    </nav>
  );
}
