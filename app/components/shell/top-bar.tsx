import { ChevronDown, LogOut, Menu as MenuIcon, Search } from "lucide-react";
import { useEffect, useState } from "react";
import { Form, Link, NavLink } from "react-router";
import { FerruleMark } from "~/components/notation/ferrule-badge";
import { StatusShape } from "~/components/notation/status-badge";
import { Icon } from "~/components/ui/icon";
import { Initials } from "~/components/ui/initials";
import { Popover } from "~/components/ui/popover";
import { Kbd } from "~/components/ui/tag";
import { cx } from "~/components/ui/cx";
import type { FrameData } from "~/presenters/frame.server";
import type { Theme } from "~/utils/theme";
import { screens } from "./screens";
import { useRunningTestServers } from "./use-running-test-servers";
import { ThemeSwitch } from "./theme-switch";

function Screens({ stacked }: { stacked?: boolean }) {
  return screens.map((screen) => (
    <NavLink
      key={screen.to}
      to={screen.to}
      end={screen.end}
      prefetch="intent"
      className={({ isActive }) =>
        stacked
          ? cx(
              "flex h-10 items-center px-4 text-body",
              isActive && "bg-copper-wash font-semibold shadow-[inset_3px_0_0_var(--copper)]",
            )
          : cx(
              "relative flex items-center px-[11px] focus-visible:-outline-offset-2",
              isActive
                ? "font-semibold text-ink after:absolute after:inset-x-[11px] after:-bottom-[1.5px] after:h-[3px] after:bg-copper"
                : "text-ink-2 hover:text-ink",
            )
      }
    >
      {screen.label}
    </NavLink>
  ));
}

export function TopBar({ frame, theme, onFind }: { frame: FrameData; theme: Theme; onFind: () => void }) {
  return (
    <header className="flex h-(--bar) shrink-0 items-stretch border-b-[1.5px] border-ink bg-paper px-5 max-sm:px-3">
      <a href="#main" className="sr-only focus:not-sr-only focus:self-center focus:px-2">
        Skip to content
      </a>
      <Link
        to="/"
        aria-label="Ferrule, to the park"
        className="flex items-center gap-2 pr-4 text-lead font-bold tracking-[-0.015em]"
      >
        <FerruleMark />
        <span className="max-sm:sr-only">Ferrule</span>
      </Link>
      <Organization frame={frame} />
      <nav aria-label="Screens" className="flex items-stretch pl-2 max-md:hidden">
        <Screens />
      </nav>
      <div className="ml-auto flex items-center gap-3.5 pl-3">
        <FindButton onFind={onFind} />
        <TestServers frame={frame} />
        <PersonMenu frame={frame} theme={theme} />
        <Popover
          label="Screens"
          align="end"
          className="w-52"
          trigger={
            <button type="button" aria-label="Screens" className="grid size-8 place-items-center md:hidden">
              <Icon of={MenuIcon} size={18} />
            </button>
          }
        >
          <nav aria-label="Screens" className="grid py-1">
            <Screens stacked />
          </nav>
        </Popover>
      </div>
    </header>
  );
}

function Organization({ frame }: { frame: FrameData }) {
  const { organization, organizations } = frame;
  const className =
    "flex items-center gap-1.5 border-x border-hair px-4 text-small text-ink-2 max-sm:border-r-0 max-sm:px-3";
  if (organizations.length < 2) return <div className={className}>{organization.name}</div>;
  return (
    <Popover
      label="Organisation"
      className="w-64 py-1"
      trigger={
        <button type="button" className={cx(className, "hover:text-ink")}>
          {organization.name} <Icon of={ChevronDown} />
        </button>
      }
    >
      <Form method="post" action="/organization" className="grid">
        {organizations.map((other) => (
          <button
            key={other.id}
            name="organization"
            value={other.id}
            aria-current={other.id === organization.id || undefined}
            className="flex h-8 items-center px-3 text-left text-small hover:bg-copper-wash aria-[current]:font-semibold"
          >
            {other.name}
          </button>
        ))}
      </Form>
    </Popover>
  );
}

function FindButton({ onFind }: { onFind: () => void }) {
  const [keys, setKeys] = useState("Ctrl K");
  useEffect(() => {
    if (/Mac|iPhone|iPad/u.test(navigator.userAgent)) setKeys("⌘ K");
  }, []);
  return (
    <button
      type="button"
      onClick={onFind}
      aria-label="Go to node, screen or action"
      aria-keyshortcuts="Control+K"
      className="flex h-7 w-69 items-center gap-2 rounded-edge border border-rule bg-leaf pr-1.5 pl-[9px] text-small text-ink-3 hover:border-edge max-lg:w-auto max-sm:hidden"
    >
      <Icon of={Search} />
      <span className="max-lg:sr-only">Go to node, screen or action</span>
      <Kbd className="ml-auto">{keys}</Kbd>
    </button>
  );
}

function TestServers({ frame }: { frame: FrameData }) {
  const count = useRunningTestServers(frame.organization.id, frame.testServers).length;
  if (count === 0) return null;
  return (
    <Link to="/live" className="flex items-center gap-[5px] text-small whitespace-nowrap text-ink-2 hover:text-ink">
      <StatusShape status="good" />
      <span>
        {count} <span className="max-sm:sr-only">{count === 1 ? "test server" : "test servers"}</span>
      </span>
    </Link>
  );
}

function PersonMenu({ frame, theme }: { frame: FrameData; theme: Theme }) {
  const { user, roles } = frame;
  return (
    <Popover
      label={user.name}
      align="end"
      className="w-64"
      trigger={
        <button type="button" aria-label={`${user.name}: theme and sign-out`}>
          <Initials name={user.name} tone="me" />
        </button>
      }
    >
      <div className="grid gap-0.5 border-b border-hair px-3 py-2">
        <span className="font-semibold">{user.name}</span>
        <span className="text-small text-ink-2">{user.email}</span>
        <span className="text-note text-ink-3">{roles.length > 0 ? roles.join(", ") : "no role yet"}</span>
      </div>
      <div className="grid gap-1 border-b border-hair px-3 py-2.5">
        <span className="text-note text-ink-3">Theme</span>
        <ThemeSwitch theme={theme} />
      </div>
      <Form method="post" action="/sign-out">
        <button className="flex h-8 w-full items-center gap-2 px-3 text-left text-small hover:bg-copper-wash">
          <Icon of={LogOut} /> Sign out
        </button>
      </Form>
    </Popover>
  );
}
