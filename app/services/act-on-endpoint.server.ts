/**
 * Writing and calling on a server, for people who may. Each act stands in the audit with the value before and after and
 * the status, also when the server refused it; nothing travels over an unprotected connection, and what is no test server
 * of ours has to be named once more by whoever acts.
 */
import { assertMay, type Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { fail, problem, type Result } from "../domain/core/result";
import type { CallAnswer, WriteAnswer } from "../domain/live/live-action";
import type { LiveTarget } from "../domain/live/live-target";
import { askEndpoint } from "./live-endpoint.server";
import { requireLiveTarget } from "./live-target.server";

type Input = string | number | boolean;

/** Throws 404 or 403 as assertMay does: endpoints ask for another permission than test servers of ours. */
export async function requireActingTarget(caller: Caller, id: string | undefined): Promise<LiveTarget> {
  const target = await requireLiveTarget(caller, id, "read");
  assertMay(caller, target.kind === "test-server" ? "test-server.write" : "endpoint.write", target.organizationId);
  return target;
}

/** Writes one value. `confirmed` is the target's name as the person gave it. */
export async function writeOnTarget(target: LiveTarget, by: Caller, node: string, value: Input, confirmed?: string): Promise<Result<WriteAnswer>> {
  const result = await actOn(target, confirmed, async () => {
    const { writeValue } = await import("../opcua/client/act.server");
    return askEndpoint(target.id, (client) => writeValue(client, node, value));
  });
  const outcome = result.ok ? { status: result.value.status, before: result.value.before.text, after: result.value.after.text } : { refused: result.problems[0]?.code ?? "" };
  await note(target, by, "live.write", { node, value, ...outcome });
  return result;
}

/** Calls one Method. `confirmed` is the target's name as the person gave it. */
export async function callOnTarget(target: LiveTarget, by: Caller, object: string, method: string, inputs: readonly Input[], confirmed?: string): Promise<Result<CallAnswer>> {
  const result = await actOn(target, confirmed, async () => {
    const { callMethod } = await import("../opcua/client/act.server");
    return askEndpoint(target.id, (client) => callMethod(client, object, method, inputs));
  });
  const outcome = result.ok ? { status: result.value.status, outputs: result.value.outputs } : { refused: result.problems[0]?.code ?? "" };
  await note(target, by, "live.call", { object, method, inputs, ...outcome });
  return result;
}

async function actOn<T>(target: LiveTarget, confirmed: string | undefined, act: () => Promise<Result<T>>): Promise<Result<T>> {
  if (!target.isProtected) return fail(problem("endpoint.unprotected"));
  if (target.kind === "endpoint" && confirmed !== target.name) return fail(problem("endpoint.unconfirmed", { name: target.name }));
  return act();
}

async function note(target: LiveTarget, by: Caller, action: "live.write" | "live.call", details: Readonly<Record<string, unknown>>): Promise<void> {
  const subject = { kind: target.kind, id: target.id, name: target.name };
  await writeBatch([addAuditStatement({ organizationId: target.organizationId, userId: by.userId, userName: by.name, action, subject, details })]);
}
