/** Topics of live sources: `source:<id>` tells its state, `source:<id>:<port>` the frames of one port as they come. */
import { mayDo, type Caller } from "../auth/caller.server";
import { findSourceRow, listPortRows } from "../db/repositories/sources.server";
import { portPlanSchema, sourceAddressSchema } from "../domain/mapping/source-settings";
import { registerTopicProvider, type Dispose, type Emit } from "./event-hub.server";
import { openSource, toLivePort } from "./live-sources.server";

const LEAST_PERIOD_MS = 200;

/** Registers once at the start. */
export function registerSourceTopics(): void {
  registerTopicProvider("source", { authorise, open, keepsNewestOnly: true });
}

function splitTopic(topic: string): { id: string; port: number } {
  const [, id = "", port = ""] = topic.split(":");
  return { id, port: Number(port) };
}

async function authorise(caller: Caller, topic: string): Promise<boolean> {
  const row = await findSourceRow(splitTopic(topic).id);
  return row !== undefined && mayDo(caller, "read", row.organizationId);
}

async function open(topic: string, emit: Emit): Promise<Dispose> {
  const { id, port } = splitTopic(topic);
  const row = await findSourceRow(id);
  if (!row) return () => undefined;
  const poller = await openSource(row.organizationId, id);
  if (!poller.ok) {
    emit({ state: { kind: "lost", since: Date.now(), message: poller.problems[0]?.code ?? "" } });
    return () => undefined;
  }
  emit({ state: poller.value.state });
  const endState = poller.value.onState((state) => emit({ state }));
  if (!(port > 0)) return endState;
  const { periodMs } = sourceAddressSchema.parse(row.address);
  const alias = await findAlias(row.organizationId, id, port);
  const item = { kind: "process-data", port, ...(alias === undefined ? {} : { alias }) } as const;
  const endFrames = poller.value.add(item, Math.max(LEAST_PERIOD_MS, periodMs), (reading) => emit(toLivePort(port, reading)));
  return () => {
    endState();
    endFrames();
  };
}

/** The name by which the master knows the device of a port, where the plan says one. */
export async function findAlias(organizationId: string, sourceId: string, port: number): Promise<string | undefined> {
  const row = (await listPortRows(organizationId)).find((p) => p.sourceId === sourceId && p.port === port);
  const alias = row && portPlanSchema.parse(row.plan).deviceAlias;
  return alias === "" ? undefined : alias;
}
