/** Topics of the event stream that tell of test servers and of values on them. Registered once, at the start. */
import { isMember, type Caller } from "../auth/caller.server";
import { getSupervisor } from "../opcua/supervisor.server";
import { registerTopicProvider, type Dispose, type Emit } from "./event-hub.server";
import { followTestServers } from "./follow-test-servers.server";
import { findLiveTarget } from "./live-target.server";
import { openEndpoint } from "./live-endpoint.server";

const nothing: Dispose = () => undefined;

export async function registerLiveTopics(): Promise<void> {
  registerTopicProvider("test-servers", { authorise: (caller, topic) => isMember(caller, splitTopic(topic).id) });
  registerTopicProvider("test-server", { authorise: mayLook, open: openTestServer });
  registerTopicProvider("connection", { authorise: mayLook, open: openConnection, keepsNewestOnly: true });
  registerTopicProvider("value", { authorise: mayLook, open: openValue, keepsNewestOnly: true });
  await followTestServers();
}

/** `prefix:id` or `prefix:id:rest`; the rest may hold colons of its own. */
function splitTopic(topic: string): { id: string; rest: string } {
  const [, id = "", ...rest] = topic.split(":");
  return { id, rest: rest.join(":") };
}

async function mayLook(caller: Caller, topic: string): Promise<boolean> {
  const target = await findLiveTarget(splitTopic(topic).id);
  return target !== undefined && isMember(caller, target.organizationId);
}

/** Late listeners get the state as it is; the log comes with the page. */
function openTestServer(topic: string, emit: Emit): Dispose {
  const state = getSupervisor().get(splitTopic(topic).id);
  if (state) emit({ state });
  return nothing;
}

async function openConnection(topic: string, emit: Emit): Promise<Dispose> {
  const client = await openEndpoint(splitTopic(topic).id);
  if (!client.ok) return nothing;
  emit({ state: client.value.state });
  return client.value.onState((state) => emit({ state }));
}

async function openValue(topic: string, emit: Emit): Promise<Dispose> {
  const { id, rest } = splitTopic(topic);
  const client = await openEndpoint(id);
  return client.ok ? client.value.watch(rest, (sample) => emit(sample)) : nothing;
}
