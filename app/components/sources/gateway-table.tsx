import { Plus, X } from "lucide-react";
import { useState, type FormEvent } from "react";
import { Button, IconButton } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { BoundMachine, GatewayView } from "~/services/read-sources.server";
import type { SourceActions } from "./use-source-actions";

type Props = { gateways: readonly GatewayView[]; machines: readonly BoundMachine[]; actions: SourceActions };

/** The OPC UA servers by which machines are published, and which machines. */
export function GatewayTable({ gateways, machines, actions }: Props) {
  const [editing, setEditing] = useState<string | undefined>(undefined);
  const free = machines.filter((machine) => machine.gatewayId === undefined);
  return (
    <div className="grid gap-2">
      {gateways.length > 0 ? (
        <TableScroll label="Gateways">
          <Table caption="Gateways and the machines that they publish" className="min-w-180">
            <thead>
              <tr>
                <Th>Gateway</Th>
                <Th>Endpoint</Th>
                <Th>Machines</Th>
                <Th>Note</Th>
                <Th>
                  <span className="sr-only">Actions</span>
                </Th>
              </tr>
            </thead>
            <tbody>
              {gateways.map((gateway) =>
                editing === gateway.id ? (
                  <tr key={gateway.id}>
                    <td colSpan={5} className="border-b border-hair bg-bench p-3">
                      <GatewayForm gateway={gateway} actions={actions} onDone={() => setEditing(undefined)} />
                    </td>
                  </tr>
                ) : (
                  <Tr key={gateway.id}>
                    <RowHead>{gateway.name}</RowHead>
                    <Td mono>{gateway.endpointUrl ?? "–"}</Td>
                    <Td>
                      <span className="flex flex-wrap items-center gap-1 py-0.5">
                        {gateway.machines.map((machine) => (
                          <Tag key={machine.machineKey}>
                            {machine.name}
                            {actions.blockedBy === undefined ? (
                              <button
                                type="button"
                                aria-label={`Take ${machine.name} from ${gateway.name}`}
                                className="text-ink-3 hover:text-error"
                                onClick={() =>
                                  void actions.send({
                                    intent: "assign-machine",
                                    value: { modelId: machine.modelId, machineKey: machine.machineKey },
                                  })
                                }
                              >
                                <X size={11} aria-hidden />
                              </button>
                            ) : null}
                          </Tag>
                        ))}
                        {free.length > 0 && actions.blockedBy === undefined ? (
                          <Select
                            aria-label={`Add a machine to ${gateway.name}`}
                            size="small"
                            className="w-36!"
                            value=""
                            onChange={(event) => {
                              const machine = free.find((one) => one.key === event.currentTarget.value);
                              if (machine)
                                void actions.send({
                                  intent: "assign-machine",
                                  value: { modelId: machine.modelId, machineKey: machine.key, gatewayId: gateway.id },
                                });
                            }}
                          >
                            <option value="">add a machine</option>
                            {free.map((machine) => (
                              <option key={machine.key} value={machine.key}>
                                {machine.name}
                              </option>
                            ))}
                          </Select>
                        ) : null}
                      </span>
                    </Td>
                    <Td className="text-ink-2">{gateway.note}</Td>
                    <Td right>
                      <Button
                        size="small"
                        tone="bare"
                        blockedBy={actions.blockedBy}
                        onClick={() => setEditing(gateway.id)}
                      >
                        Change
                      </Button>
                      <IconButton
                        icon={X}
                        size="small"
                        label={`Remove ${gateway.name}`}
                        {...((actions.blockedBy ?? (gateway.machines.length > 0 ? "it publishes machines" : undefined))
                          ? { blockedBy: actions.blockedBy ?? "it publishes machines" }
                          : {})}
                        onClick={() => void actions.send({ intent: "remove-gateway", id: gateway.id })}
                      />
                    </Td>
                  </Tr>
                ),
              )}
            </tbody>
          </Table>
        </TableScroll>
      ) : null}
      {editing === "new" ? (
        <div className="border border-rule bg-bench p-3">
          <GatewayForm gateway={undefined} actions={actions} onDone={() => setEditing(undefined)} />
        </div>
      ) : (
        <Button
          icon={Plus}
          className="justify-self-start"
          blockedBy={actions.blockedBy}
          onClick={() => setEditing("new")}
        >
          Gateway
        </Button>
      )}
    </div>
  );
}

function GatewayForm({
  gateway,
  actions,
  onDone,
}: {
  gateway: GatewayView | undefined;
  actions: SourceActions;
  onDone: () => void;
}) {
  const [name, setName] = useState(gateway?.name ?? "");
  const [endpointUrl, setEndpointUrl] = useState(gateway?.endpointUrl ?? "");
  const [note, setNote] = useState(gateway?.note ?? "");
  async function submit(event: FormEvent): Promise<void> {
    event.preventDefault();
    const value = { ...(gateway ? { id: gateway.id } : {}), name, endpointUrl: endpointUrl.trim() || null, note };
    if (await actions.send({ intent: "save-gateway", value })) onDone();
  }
  return (
    <form onSubmit={(event) => void submit(event)} className="grid grid-cols-[1fr_2fr_2fr_auto] items-end gap-3">
      <Field label="Name of the gateway">
        {(tied) => (
          <Input
            {...tied}
            required
            autoFocus
            maxLength={100}
            value={name}
            onChange={(event) => setName(event.currentTarget.value)}
          />
        )}
      </Field>
      <Field label="Endpoint" optional>
        {(tied) => (
          <Input
            {...tied}
            mono
            placeholder="opc.tcp://gateway.example:4840"
            value={endpointUrl}
            onChange={(event) => setEndpointUrl(event.currentTarget.value)}
          />
        )}
      </Field>
      <Field label="Note" optional>
        {(tied) => (
          <Input {...tied} value={note} maxLength={2_000} onChange={(event) => setNote(event.currentTarget.value)} />
        )}
      </Field>
      <span className="flex gap-2">
        <Button onClick={onDone}>Cancel</Button>
        <Button type="submit" tone="main" busy={actions.isBusy}>
          Save
        </Button>
      </span>
    </form>
  );
}
