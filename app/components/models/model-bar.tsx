import { ChevronDown, Download, Hash, Info, Play, Table2, Trash2 } from "lucide-react";
import type { ReactNode } from "react";
import { useRunningTestServers, type RunningServer } from "~/components/shell/use-running-test-servers";
import { LinkButton } from "~/components/ui/button";
import { Icon } from "~/components/ui/icon";
import { LinkTabs, type LinkTab } from "~/components/ui/link-tabs";
import { Menu } from "~/components/ui/menu";

type Props = {
  model: { readonly id: string; readonly name: string };
  /** Screens of the model that exist, in order. */
  tabs: readonly LinkTab[];
  mayEdit: boolean;
  /** Presence, undo, saved state. */
  tools: ReactNode;
  /** The running test server of this model, or the way to one. */
  testServer: ReactNode;
};

export function ModelBar({ model, tabs, mayEdit, tools, testServer }: Props) {
  return (
    <section
      aria-label={`Bar of ${model.name}`}
      className="flex h-(--bar-2) shrink-0 items-stretch gap-4 border-b border-rule bg-paper px-5"
    >
      <Menu
        label={`Model ${model.name}`}
        trigger={
          <button
            type="button"
            className="flex min-w-0 items-center gap-1.5 self-center text-lead font-semibold tracking-[-0.01em] hover:text-copper"
          >
            <span className="truncate">{model.name}</span>
            <Icon of={ChevronDown} className="shrink-0 text-ink-3" />
          </button>
        }
        entries={[
          { kind: "link", label: "About this model", icon: Info, to: `/models/${model.id}/about` },
          ...(mayEdit
            ? ([
                { kind: "link", label: "Add from a signal list", icon: Table2, to: `/models/${model.id}/signals` },
                { kind: "link", label: "Renumber nodes", icon: Hash, to: `/models/${model.id}/renumber` },
              ] as const)
            : []),
          {
            kind: "link",
            label: "Download NodeSet2",
            icon: Download,
            to: `/models/${model.id}/nodeset`,
            download: true,
          },
          {
            kind: "link",
            label: "Download in canonical order",
            icon: Download,
            to: `/models/${model.id}/nodeset?order=canonical`,
            download: true,
          },
          ...(mayEdit
            ? ([
                { kind: "rule" },
                { kind: "link", label: "Delete …", icon: Trash2, to: `/models/${model.id}/about#delete` },
              ] as const)
            : []),
        ]}
      />
      <LinkTabs label={`Screens of ${model.name}`} tabs={tabs} />
      <div className="ml-auto flex min-w-0 items-center gap-2">
        {tools}
        {testServer}
        <a
          href={`/models/${model.id}/nodeset`}
          download
          className="inline-flex h-7 shrink-0 items-center gap-1.5 rounded-edge border border-edge bg-leaf px-2.5 text-small font-medium whitespace-nowrap hover:bg-bench-2"
        >
          <Icon of={Download} /> Export
        </a>
      </div>
    </section>
  );
}

type TestServerLinkProps = { modelId: string; organizationId: string; known: readonly RunningServer[] };

/** The way to the model's test server; a full disc while one runs. */
export function TestServerLink({ modelId, organizationId, known }: TestServerLinkProps) {
  const isRunning = useRunningTestServers(organizationId, known).some((server) => server.modelId === modelId);
  return (
    <LinkButton to={`/models/${modelId}/test-server`} icon={isRunning ? undefined : Play}>
      {isRunning ? <RunningMark /> : null}
      Test server
    </LinkButton>
  );
}

function RunningMark() {
  return <span aria-label="running" role="img" className="size-2 rounded-full bg-good" />;
}
