import { Plus, Printer, Table2 } from "lucide-react";
import { href } from "react-router";
import { useSearchState } from "~/components/shell/use-search-state";
import { Button, LinkButton } from "~/components/ui/button";
import { Drawer } from "~/components/ui/drawer";
import { Empty } from "~/components/ui/empty";
import { FindingBadge } from "~/components/notation/finding-badge";
import { Block } from "~/components/ui/page";
import { Segments } from "~/components/ui/segments";
import { isIoLinkMaster } from "~/domain/mapping/source-settings";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { Sources } from "~/services/read-sources.server";
import { GatewayTable } from "./gateway-table";
import { MasterPicture } from "./master-picture";
import { PortPanel } from "./port-panel";
import type { SourceFinding } from "~/services/list-source-findings.server";
import { SourcePanel } from "./source-panel";
import { UnitTable } from "./unit-table";
import { useSourceActions } from "./use-source-actions";

type Props = {
  sources: Sources;
  devices: readonly DeviceSummary[];
  findings: readonly SourceFinding[];
  mayEdit: boolean;
};

const NEW = "new";
const ALL = "";

/** Where bytes come from: masters as a picture, units and servers as tables, gateways with their machines. */
export function SourcesView({ sources: { sources, gateways, machines }, devices, findings, mayEdit }: Props) {
  const actions = useSourceActions(mayEdit);
  const search = useSearchState();
  const openId = search.get("source");
  const openPort = Number(search.get("port") ?? Number.NaN);
  const machine = search.get("machine") ?? ALL;
  const masters = sources.filter((source) => isIoLinkMaster(source.kind));
  const units = sources.filter((source) => source.kind === "modbus-unit");
  const servers = sources.filter((source) => !masters.includes(source) && !units.includes(source));
  const open = sources.find((source) => source.id === openId);
  const port = open?.ports.find((one) => one.port === openPort);
  const machineNames = [
    ...new Set(
      sources
        .flatMap((source) => [...source.bindings, ...source.ports.flatMap((one) => one.bindings)])
        .map((binding) => binding.machine),
    ),
  ].sort();
  const ports = masters.flatMap((master) => master.ports);
  const planned = ports.filter((one) => one.plan !== undefined || one.bindings.length > 0).length;

  const show = search.set;
  const select = (source: string | undefined, portNumber?: number) =>
    show({ source, port: portNumber === undefined ? undefined : String(portNumber) });

  return (
    <div className="flex min-h-0 flex-1 flex-col">
      <main id="main" tabIndex={-1} className="min-h-0 flex-1 overflow-auto px-5 pb-8 outline-none">
        <header className="flex min-h-14 flex-wrap items-center gap-x-3 gap-y-2 py-2">
          <h1 className="text-title font-semibold tracking-[-0.02em]">Sources</h1>
          <p className="text-body text-ink-2">
            {masters.length} {masters.length === 1 ? "master" : "masters"}, <span className="font-mono">{planned}</span>{" "}
            of <span className="font-mono">{ports.length}</span> ports planned, {units.length} Modbus{" "}
            {units.length === 1 ? "address" : "addresses"}
          </p>
          <div className="ml-auto flex flex-wrap items-center gap-2">
            {machineNames.length > 1 && machineNames.length <= 12 ? (
              <Segments
                label="Machine"
                value={machine}
                onChange={(value) => show({ machine: value })}
                options={[{ value: ALL, label: "All" }, ...machineNames.map((name) => ({ value: name, label: name }))]}
              />
            ) : null}
            <LinkButton to={href("/sources/tags")} icon={Table2}>
              Tags
            </LinkButton>
            <LinkButton to={href("/sources/wiring-list")} icon={Printer}>
              Wiring list
            </LinkButton>
            <Button icon={Plus} tone="main" blockedBy={actions.blockedBy} onClick={() => select(NEW)}>
              Source
            </Button>
          </div>
        </header>
        <p className="mb-4 max-w-240 text-note text-ink-2">
          Process data of IO-Link is not safety-related communication, and neither are the status codes made of it.
          Whatever writes outputs can move machinery: follow the machine&rsquo;s risk assessment, local codes and
          licensed practice.
        </p>
        {sources.length === 0 ? (
          <Empty
            title="No source yet"
            action={
              <Button icon={Plus} blockedBy={actions.blockedBy} onClick={() => select(NEW)}>
                Add the first source
              </Button>
            }
          >
            A source is where bytes come from: an IO-Link master with its ports, a Modbus TCP unit, an OPC UA server.
            Begin with the master in the cabinet.
          </Empty>
        ) : null}
        <div className="grid gap-7">
          {masters.length > 0 ? (
            <section
              aria-label="Port plan"
              tabIndex={0}
              className="grid gap-5 overflow-x-auto focus-visible:-outline-offset-2"
            >
              {masters.map((master) => (
                <MasterPicture
                  key={master.id}
                  source={master}
                  findings={findings.filter((finding) => finding.sourceId === master.id)}
                  isSelected={open?.id === master.id}
                  selectedPort={open?.id === master.id ? port?.port : undefined}
                  machine={machine === ALL ? undefined : machine}
                  onSelect={(portNumber) => select(master.id, portNumber)}
                />
              ))}
            </section>
          ) : null}
          {units.length > 0 ? (
            <Block title="Modbus units">
              <UnitTable
                label="Modbus units"
                sources={units}
                findings={findings}
                selected={openId}
                onSelect={(id) => select(id)}
              />
            </Block>
          ) : null}
          {servers.length > 0 ? (
            <Block title="Servers and services">
              <UnitTable
                label="Servers and services"
                sources={servers}
                findings={findings}
                selected={openId}
                onSelect={(id) => select(id)}
              />
            </Block>
          ) : null}
          <Block title="Gateways" about="The OPC UA servers on the shop floor that publish the machines.">
            <GatewayTable gateways={gateways} machines={machines} actions={actions} />
          </Block>
        </div>
      </main>
      {open && port ? (
        <Drawer
          label={`Port ${port.port} of ${open.name}`}
          storageKey="source-drawer"
          initialHeight={270}
          onClose={() => select(undefined)}
          head={
            <>
              <WorstBadge
                findings={findings.filter((finding) => finding.sourceId === open.id && finding.port === port.port)}
              />
              <h2 className="text-small font-semibold">
                {open.name} port {port.port}
              </h2>
              <span className="text-small text-ink-2">
                {port.device?.name ?? (port.plan || port.bindings.length > 0 ? "no device planned" : "free")}
              </span>
            </>
          }
        >
          <PortPanel
            source={open}
            port={port}
            devices={devices}
            findings={findings.filter((finding) => finding.sourceId === open.id && finding.port === port.port)}
            actions={actions}
          />
        </Drawer>
      ) : open || openId === NEW ? (
        <Drawer
          label={open ? open.name : "New source"}
          storageKey="source-drawer"
          initialHeight={330}
          onClose={() => select(undefined)}
          head={<h2 className="text-small font-semibold">{open ? open.name : "New source"}</h2>}
        >
          <SourcePanel
            source={open}
            findings={findings.filter((finding) => finding.sourceId === open?.id && finding.port === undefined)}
            actions={actions}
            onDone={() => select(undefined)}
          />
        </Drawer>
      ) : null}
    </div>
  );
}

function WorstBadge({ findings }: { findings: readonly SourceFinding[] }) {
  const worst = findings.find((finding) => finding.severity === "error") ?? findings[0];
  return worst ? <FindingBadge severity={worst.severity} count={findings.length} title={worst.message} /> : null;
}
