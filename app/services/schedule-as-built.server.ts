/** As-built reports on a schedule: made when they are due, and told by mail when the verdict is another than the last time. */
import { z } from "zod";
import { can } from "../auth/permissions";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { listDueSchedules, removeScheduleStatement, saveScheduleStatement, updateScheduleStatement, type ScheduleRow } from "../db/repositories/as-built-schedules.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { findEndpoint } from "../db/repositories/endpoints.server";
import { findModel, listRevisions, type ModelRow } from "../db/repositories/models.server";
import { listMemberships, listPeople } from "../db/repositories/people.server";
import { listReleases } from "../db/repositories/releases.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { logError } from "../utils/log.server";
import { onShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";
import { findLiveTarget } from "./live-target.server";
import { makeAsBuilt, type AsBuiltRun } from "./make-as-built.server";
import { listMailStatements } from "./queue-mail.server";
import { wakeOutbox } from "./run-outbox.server";

export const scheduleSchema = z.strictObject({
  endpointId: z.string().min(1).max(100),
  everyMinutes: z.coerce.number().int().min(5).max(10_080),
});

const LOOK_MS = 20_000;
/** Said of a run that could not be made. */
export const NOT_REACHED = "not reached";
const STRICT = { ignored: [], range: 0, areTextsChecked: false };

/** The first run is due at once. Problem: `as-built.endpoint`. */
export async function saveSchedule(author: Caller, model: ModelRow, { endpointId, everyMinutes }: z.infer<typeof scheduleSchema>): Promise<Result<null>> {
  const endpoint = await findEndpoint(endpointId);
  if (endpoint?.organizationId !== model.organizationId) return fail(problem("as-built.endpoint"));
  const row: ScheduleRow = { id: newId(), organizationId: model.organizationId, modelId: model.id, endpointId, everyMinutes, nextAt: new Date(), lastVerdict: null, lastAt: null, madeBy: author.userId };
  await writeBatch([saveScheduleStatement(row), audit(author, model, "as-built.schedule", { endpoint: endpoint.name, everyMinutes })]);
  return ok(null);
}

export async function removeSchedule(author: Caller, model: ModelRow, id: string): Promise<void> {
  await writeBatch([removeScheduleStatement(model.id, id), audit(author, model, "as-built.unschedule", {})]);
}

function audit(author: Pick<Caller, "userId" | "name">, model: ModelRow, action: string, details: Record<string, string | number>) {
  const subject = { kind: "model", id: model.id, name: model.name };
  return addAuditStatement({ organizationId: model.organizationId, userId: author.userId, userName: author.name, action, subject, details });
}

type Worker = { timer: NodeJS.Timeout | undefined; running: Promise<void> | undefined };
const getWorker = () => singleton<Worker>("as-built-schedules", () => ({ timer: undefined, running: undefined }));

export function startSchedules(): void {
  const worker = getWorker();
  worker.timer ??= setInterval(() => {
    worker.running ??= runDueSchedules(new Date())
      .catch((error: unknown) => void logError(error, "as-built schedules"))
      .finally(() => {
        worker.running = undefined;
      });
  }, LOOK_MS);
  worker.timer.unref();
  onShutdown("as-built schedules", () => {
    clearInterval(worker.timer);
    worker.timer = undefined;
  });
}

/** Runs what is due, one after the other: small controllers and this host are spared. */
export async function runDueSchedules(now: Date): Promise<void> {
  for (const schedule of await listDueSchedules(now)) {
    // Moved on before the run, so that a run that ends with the process is not begun for ever.
    await writeBatch([updateScheduleStatement(schedule.id, { nextAt: new Date(now.getTime() + schedule.everyMinutes * 60_000) })]);
    await runSchedule(schedule, now);
  }
}

async function runSchedule(schedule: ScheduleRow, now: Date): Promise<void> {
  const [model, target, author] = await Promise.all([findModel(schedule.modelId), findLiveTarget(schedule.endpointId), findAuthor(schedule)]);
  if (!model || !target || !author) return;
  const state = await findState(model);
  const made = await makeAsBuilt(author, model, target, { targetId: target.id, state, watchSeconds: 10, tolerance: STRICT });
  const run = made.ok ? made.value : undefined;
  const verdict = run?.verdict ?? NOT_REACHED;
  const mails = schedule.lastVerdict === null || schedule.lastVerdict === verdict ? [] : await listMails(model, target.name, schedule.lastVerdict, verdict, run);
  await writeBatch([updateScheduleStatement(schedule.id, { lastVerdict: verdict, lastAt: now }), ...mails]);
  if (mails.length > 0) wakeOutbox();
}

/** Whoever made the schedule; nobody once the person has left, or may no longer make reports. */
async function findAuthor({ organizationId, madeBy }: ScheduleRow): Promise<Caller | undefined> {
  const person = (await listPeople(organizationId)).find((one) => one.id === madeBy && can(one.roles, "as-built.record"));
  return person && { userId: person.id, name: person.name, email: person.email, memberships: await listMemberships(person.id) };
}

/** What is in force: the newest release that was not withdrawn, else the newest revision. */
async function findState(model: ModelRow): Promise<number> {
  const release = (await listReleases(model.id)).filter((row) => row.withdrawnAt === null).sort((a, b) => b.revision - a.revision)[0];
  return release?.revision ?? Math.max(0, ...(await listRevisions(model.id)).map((row) => row.number));
}

async function listMails(model: ModelRow, target: string, before: string, verdict: string, run: AsBuiltRun | undefined) {
  const people = (await listPeople(model.organizationId)).filter((person) => can(person.roles, "as-built.record"));
  return listMailStatements(model.organizationId, "as-built", people, {
    subject: `${target}: ${verdict}`,
    paragraphs: [`The server “${target}” was compared with ${model.name} on its schedule. The verdict was “${before}” the last time and is “${verdict}” now.`],
    link: run?.reportId ? { text: "The report", path: `/as-built/${run.reportId}` } : { text: "As-built reports", path: `/models/${model.id}/as-built` },
  });
}
