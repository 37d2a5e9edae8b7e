/**
 * Writing and calling on a test server, for people who may. Each act stands in the audit with the value before and after
 * and the status, also when the server refused it; nothing travels over an unprotected connection.
 */
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { fail, problem, type Result } from "../domain/core/result";
import type { CallAnswer, WriteAnswer } from "../domain/live/live-action";
import type { TestServerState } from "../domain/simulation/test-server-state";
import { askEndpoint } from "./live-endpoint.server";

type Person = { readonly userId: string; readonly name: string };
type Input = string | number | boolean;

/** Writes one value. The caller has the permission `test-server.write`. */
export async function writeOnTestServer(server: TestServerState, by: Person, node: string, value: Input): Promise<Result<WriteAnswer>> {
  const result = await actOn(server, async () => {
    const { writeValue } = await import("../opcua/client/act.server");
    return askEndpoint(server.id, (client) => writeValue(client, node, value));
  });
  const outcome = result.ok ? { status: result.value.status, before: result.value.before.text, after: result.value.after.text } : { refused: result.problems[0]?.code ?? "" };
  await note(server, by, "live.write", { node, value, ...outcome });
  return result;
}

/** Calls one Method. The caller has the permission `test-server.write`. */
export async function callOnTestServer(server: TestServerState, by: Person, object: string, method: string, inputs: readonly Input[]): Promise<Result<CallAnswer>> {
  const result = await actOn(server, async () => {
    const { callMethod } = await import("../opcua/client/act.server");
    return askEndpoint(server.id, (client) => callMethod(client, object, method, inputs));
  });
  const outcome = result.ok ? { status: result.value.status, outputs: result.value.outputs } : { refused: result.problems[0]?.code ?? "" };
  await note(server, by, "live.call", { object, method, inputs, ...outcome });
  return result;
}

async function actOn<T>(server: TestServerState, act: () => Promise<Result<T>>): Promise<Result<T>> {
  return server.security.includes("basic256sha256") ? act() : fail(problem("endpoint.unprotected"));
}

async function note(server: TestServerState, by: Person, action: "live.write" | "live.call", details: Readonly<Record<string, unknown>>): Promise<void> {
  const subject = { kind: "test-server", id: server.id, name: server.applicationName };
  await writeBatch([addAuditStatement({ organizationId: server.organizationId, userId: by.userId, userName: by.name, action, subject, details })]);
}
