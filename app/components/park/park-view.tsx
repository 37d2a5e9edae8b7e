import { FileUp, Plus } from "lucide-react";
import { Link } from "react-router";
import { FindingTallyBadge } from "~/components/notation/finding-badge";
import { describeEdit } from "~/components/shell/describe-edit";
import { LocalTime } from "~/components/shell/local-time";
import { useRevalidateOn } from "~/components/shell/use-revalidate-on";
import { Button, LinkButton } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Block, Page } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { TitleBlock } from "~/components/ui/title-block";
import type { Park } from "~/services/read-park.server";
import { formatCount } from "~/utils/format";
import { GatewayTable } from "./gateway-table";
import { MachineTable } from "./machine-table";
import { FirstSteps } from "./first-steps";
import { ReviewTable } from "./review-table";
import type { ParkData } from "./park-data";
import { TestServerTable } from "./test-server-table";
import { WaitList } from "./wait-list";

const editReason = "asks for the role engineer or administrator";

export function ParkView({ park }: { park: ParkData }) {
  const { models, machines, testServers, edits, organizationId } = park;
  useRevalidateOn(`test-servers:${organizationId}`, `models:${organizationId}`);
  const running = testServers.filter((server) => server.state === "running");
  return (
    <Page
      title="Park"
      about={describePark(park)}
      actions={
        <>
          <span className="font-mono text-small text-ink-2 max-sm:hidden">
            <LocalTime iso={park.now} parts="day-date-time" />
          </span>
          {park.mayEdit ? (
            <>
              <LinkButton to="/models/import" icon={FileUp}>
                Import
              </LinkButton>
              <LinkButton to="/models/new" icon={Plus}>
                New model
              </LinkButton>
            </>
          ) : (
            <Button icon={Plus} blockedBy={editReason}>
              New model
            </Button>
          )}
        </>
      }
      foot={
        <TitleBlock
          label="Title block of the park"
          cells={[
            { label: "Works", value: park.organizationName, strong: true },
            { label: "Models", value: describeModels(park) },
            {
              label: "Nodes of our own",
              value: formatCount(models.reduce((sum, model) => sum + model.nodeCount, 0)),
              mono: true,
            },
            { label: "Machines", value: String(machines.length), mono: true },
            { label: "Test servers", value: `${running.length} running` },
            { label: "Last edit", value: edits[0] ? <EditCell edit={edits[0]} /> : "none yet" },
            { label: "Signed in", value: [park.userName, ...park.roles].join(", ") },
          ]}
        />
      }
    >
      {park.showsSteps && models.length > 0 ? <FirstSteps park={park} /> : null}
      {models.length === 0 ? (
        <NoModels mayEdit={park.mayEdit} />
      ) : (
        <div className="grid grid-cols-[minmax(0,1fr)_330px] gap-x-5 gap-y-6 max-[1400px]:grid-cols-[minmax(0,1fr)_260px] max-lg:grid-cols-1">
          <div className="grid content-start gap-6">
            {machines.length > 0 ? (
              <MachineTable machines={machines} testServers={running} />
            ) : (
              <NoMachines mayEdit={park.mayEdit} />
            )}
          </div>
          <WaitList park={park} />
        </div>
      )}
      {models.length > 0 ? (
        <div className="mt-6 grid grid-cols-2 gap-8 max-lg:grid-cols-1">
          <div className="grid content-start gap-6">
            <ReviewTable reviews={park.reviews} />
            <ModelsBlock park={park} />
          </div>
          <div className="grid content-start gap-6">
            <GatewayTable gateways={park.gateways} />
            <TestServerTable servers={testServers} />
            <EditsBlock park={park} />
          </div>
        </div>
      ) : null}
    </Page>
  );
}

function describePark({ machines, models }: ParkData): string {
  const types = new Set(machines.map((machine) => machine.typeName)).size;
  if (machines.length > 0)
    return `${machines.length} ${machines.length === 1 ? "machine" : "machines"} of ${types} ${types === 1 ? "type" : "types"}`;
  return models.length === 0
    ? "nothing here yet"
    : `${models.length} ${models.length === 1 ? "model" : "models"}, no machines yet`;
}

function describeModels({ models }: ParkData): string {
  const types = models.filter((model) => model.kind === "types").length;
  return `${types} of types, ${models.length - types} of machines`;
}

function EditCell({ edit }: { edit: Park["edits"][number] }) {
  return (
    <>
      {edit.author}, <LocalTime iso={edit.at} />
    </>
  );
}

function NoModels({ mayEdit }: { mayEdit: boolean }) {
  return (
    <Empty
      title="Start with a model"
      className="min-h-80"
      action={
        <span className="flex flex-wrap justify-center gap-2">
          {mayEdit ? (
            <>
              <LinkButton to="/models/new" tone="main" icon={Plus}>
                New model
              </LinkButton>
              <LinkButton to="/models/import" icon={FileUp}>
                Import a NodeSet2 file
              </LinkButton>
            </>
          ) : (
            <Button blockedBy={editReason}>New model</Button>
          )}
        </span>
      }
    >
      Decide once what a kind of machine exposes; then make the machines from it, check them, and serve them on a test
      server.
    </Empty>
  );
}

function NoMachines({ mayEdit }: { mayEdit: boolean }) {
  return (
    <Empty
      title="No machines yet"
      action={mayEdit ? <LinkButton to="/models/new">New model of machines</LinkButton> : undefined}
    >
      Make a model of kind machines, require your model of types, and instantiate its types below the Machines object.
    </Empty>
  );
}

function ModelsBlock({ park }: { park: ParkData }) {
  return (
    <Block
      title="Models"
      actions={
        <LinkButton to="/models" size="small" tone="bare">
          All models
        </LinkButton>
      }
    >
      <TableScroll label="Models">
        <Table caption="Models of the team">
          <thead>
            <tr>
              <Th>Model</Th>
              <Th>Kind</Th>
              <Th>Version</Th>
              <Th right>Nodes</Th>
              <Th>Findings</Th>
              <Th>Last edit</Th>
            </tr>
          </thead>
          <tbody>
            {park.models.slice(0, 10).map((model) => (
              <Tr key={model.id}>
                <Td>
                  <Link to={`/models/${model.id}/sheet`} className="font-semibold hover:text-copper">
                    {model.name}
                  </Link>
                </Td>
                <Td className="text-ink-2">{model.kind}</Td>
                <Td mono>{model.version}</Td>
                <Td right mono>
                  {formatCount(model.nodeCount)}
                </Td>
                <Td>
                  <Link to={`/models/${model.id}/findings`}>
                    <FindingTallyBadge tally={model.tally} showNone />
                  </Link>
                </Td>
                <Td className="whitespace-nowrap text-ink-2">
                  {model.updatedBy}, <LocalTime iso={model.updatedAt} />
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}

function EditsBlock({ park }: { park: ParkData }) {
  return (
    <Block title="Last edits">
      {park.edits.length === 0 ? (
        <p className="border-t border-ink pt-2 text-small text-ink-2">Nobody has edited a model since it came here.</p>
      ) : (
        <ol className="border-t border-ink">
          {park.edits.map((edit) => (
            <li
              key={`${edit.modelId} ${edit.seq}`}
              className="flex min-h-7 items-center gap-2 border-b border-hair text-small"
            >
              <span className="w-32 shrink-0 font-mono text-note text-ink-3">
                <LocalTime iso={edit.at} />
              </span>
              <span className="min-w-0 flex-1 truncate">
                <b className="font-semibold">{edit.author}</b>{" "}
                <span className="text-ink-2">{describeEdit(edit.label)} in</span>{" "}
                <Link to={`/models/${edit.modelId}/register`} className="hover:text-copper">
                  {edit.modelName}
                </Link>
              </span>
            </li>
          ))}
        </ol>
      )}
    </Block>
  );
}
