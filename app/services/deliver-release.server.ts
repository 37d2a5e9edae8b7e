/** A bundle handed to a gateway, and how far it has come: sent, loaded, proved. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import type { ModelRow } from "../db/repositories/models.server";
import { addDeliveryStatement, findDelivery, listGatewayNames, updateDeliveryStatement, type DeliveryRow, type ReleaseRow } from "../db/repositories/releases.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { tell } from "./ask-review.server";
import { auditRelease } from "./release-revision.server";

export const deliverSchema = z.strictObject({ gatewayId: z.string().min(1).max(100), note: z.string().trim().max(1000).default("") });

/** Problems: `release.withdrawn`, `delivery.no-gateway`. */
export async function deliverRelease(
  author: Caller,
  model: ModelRow,
  release: ReleaseRow,
  { gatewayId, note }: z.infer<typeof deliverSchema>,
): Promise<Result<DeliveryRow>> {
  if (release.withdrawnAt !== null) return fail(problem("release.withdrawn", { by: release.withdrawnBy ?? "" }));
  const gateway = (await listGatewayNames(release.organizationId)).find((row) => row.id === gatewayId);
  if (!gateway) return fail(problem("delivery.no-gateway"));
  const delivery: DeliveryRow = {
    id: newId(),
    releaseId: release.id,
    gatewayId,
    gatewayName: gateway.name,
    bundleHash: release.bundleHash,
    state: "sent",
    sentBy: author.name,
    sentAt: new Date(),
    loadedBy: null,
    loadedAt: null,
    provedBy: null,
    provedAt: null,
    note,
  };
  await writeBatch([
    addDeliveryStatement(delivery),
    auditRelease(author, release, model, "release.deliver", { gateway: gateway.name, hash: release.bundleHash }),
  ]);
  tell(model);
  return ok(delivery);
}

/** `loaded` is said by whoever loaded it; `proved` follows from an as-built report. Problem: `delivery.state`. */
export async function advanceDelivery(
  author: Pick<Caller, "userId" | "name">,
  model: ModelRow,
  release: ReleaseRow,
  deliveryId: string,
  state: "loaded" | "proved",
): Promise<Result<null>> {
  const delivery = await findDelivery(deliveryId);
  if (delivery?.releaseId !== release.id) return fail(problem("request.not-found"));
  if (delivery.state === "proved" || delivery.state === state) return fail(problem("delivery.state", { state: delivery.state }));
  const now = new Date();
  const change = state === "loaded" ? { loadedBy: author.name, loadedAt: now } : { provedBy: author.name, provedAt: now };
  const caller: Caller = { email: "", memberships: [], ...author };
  await writeBatch([
    updateDeliveryStatement(delivery.id, { state, ...change }),
    auditRelease(caller, release, model, state === "loaded" ? "release.loaded" : "release.proved", { gateway: delivery.gatewayName, hash: delivery.bundleHash }),
  ]);
  tell(model);
  return ok(null);
}
