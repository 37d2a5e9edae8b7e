/** Reads for the pages of releases and of what was delivered where. */
import { mayDo, type Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import { findSigningKeyById, listDeliveries, listGatewayNames, listOrganizationReleases, listReleases, type DeliveryRow, type ReleaseRow } from "../db/repositories/releases.server";
import { findReview } from "../db/repositories/reviews.server";

export type DeliveryLine = {
  readonly id: string;
  readonly gateway: string;
  readonly state: DeliveryRow["state"];
  readonly hash: string;
  readonly note: string;
  readonly sent: Act;
  readonly loaded: Act | null;
  readonly proved: Act | null;
};
type Act = { readonly by: string; readonly at: string };

export type ReleaseSummary = {
  readonly id: string;
  readonly modelId: string;
  readonly model: string;
  readonly version: string;
  readonly modelVersion: string;
  readonly publicationDate: string;
  readonly revision: number;
  readonly rating: ReleaseRow["rating"];
  readonly bundleHash: string;
  readonly bundleSize: number;
  readonly fileName: string;
  readonly by: string;
  readonly at: string;
  readonly withdrawn: { readonly by: string; readonly at: string; readonly reason: string } | null;
};

export function toReleaseSummary(release: ReleaseRow, model: string): ReleaseSummary {
  const { id, modelId, version, modelVersion, publicationDate, revision, rating, bundleHash, bundleSize, fileName } = release;
  return {
    id,
    modelId,
    model,
    version,
    modelVersion,
    publicationDate,
    revision,
    rating,
    bundleHash,
    bundleSize,
    fileName,
    by: release.releasedBy,
    at: release.at.toISOString(),
    withdrawn: release.withdrawnAt
      ? { by: release.withdrawnBy ?? "", at: release.withdrawnAt.toISOString(), reason: release.withdrawnReason ?? "" }
      : null,
  };
}

/** The releases of one model, newest first. */
export async function readModelReleases(model: Pick<ModelRow, "id" | "name">): Promise<ReleaseSummary[]> {
  return (await listReleases(model.id)).map((release) => toReleaseSummary(release, model.name));
}

export async function readReleases(organizationId: string): Promise<ReleaseSummary[]> {
  return (await listOrganizationReleases(organizationId)).map(({ release, model }) => toReleaseSummary(release, model));
}

export type ReleasePage = {
  readonly release: ReleaseSummary;
  readonly notes: string;
  readonly namespaceUri: string;
  readonly files: ReleaseRow["files"];
  readonly required: ReleaseRow["required"];
  readonly key: { readonly id: string; readonly publicKey: string };
  readonly previous: { readonly id: string; readonly version: string } | null;
  readonly review: { readonly id: string; readonly number: number; readonly title: string } | null;
  readonly deliveries: readonly DeliveryLine[];
  readonly gateways: readonly { readonly id: string; readonly name: string }[];
  readonly mayRelease: boolean;
  readonly mayProve: boolean;
};

export async function readRelease(caller: Caller, model: ModelRow, release: ReleaseRow): Promise<ReleasePage> {
  const [key, releases, review, deliveries, gateways] = await Promise.all([
    findSigningKeyById(release.keyId),
    listReleases(model.id),
    release.reviewId === null ? undefined : findReview(release.reviewId),
    listDeliveries([release.id]),
    listGatewayNames(model.organizationId),
  ]);
  const previous = releases.find((other) => other.id === release.previousId);
  return {
    release: toReleaseSummary(release, model.name),
    notes: release.notes,
    namespaceUri: model.namespaceUri,
    files: release.files,
    required: release.required,
    key: { id: release.keyId, publicKey: key?.publicKey ?? "" },
    previous: previous ? { id: previous.id, version: previous.version } : null,
    review: review ? { id: review.id, number: review.number, title: review.title } : null,
    deliveries: deliveries.map(toDeliveryLine),
    gateways,
    mayRelease: mayDo(caller, "release", model.organizationId),
    mayProve: mayDo(caller, "as-built.record", model.organizationId),
  };
}

export function toDeliveryLine(row: DeliveryRow): DeliveryLine {
  const act = (by: string | null, at: Date | null): Act | null => (by !== null && at ? { by, at: at.toISOString() } : null);
  return {
    id: row.id,
    gateway: row.gatewayName,
    state: row.state,
    hash: row.bundleHash,
    note: row.note,
    sent: { by: row.sentBy, at: row.sentAt.toISOString() },
    loaded: act(row.loadedBy, row.loadedAt),
    proved: act(row.provedBy, row.provedAt),
  };
}

export type GatewayState = {
  readonly gatewayId: string;
  readonly gateway: string;
  readonly model: string;
  /** The newest release sent, and the newest proved; they differ while proof is owed. */
  readonly delivered: { readonly releaseId: string; readonly version: string; readonly state: DeliveryRow["state"]; readonly at: string; readonly isWithdrawn: boolean };
  readonly proved: { readonly releaseId: string; readonly version: string; readonly at: string } | null;
};

/** Delivered against proved, for each gateway and model. */
export async function readGatewayStates(organizationId: string): Promise<GatewayState[]> {
  const releases = new Map((await listOrganizationReleases(organizationId)).map((row) => [row.release.id, row]));
  const states = new Map<string, GatewayState>();
  for (const delivery of await listDeliveries([...releases.keys()])) {
    const found = releases.get(delivery.releaseId);
    if (!found) continue;
    const id = `${delivery.gatewayId} ${found.release.modelId}`;
    const known = states.get(id);
    const proved = delivery.state === "proved" ? { releaseId: found.release.id, version: found.release.version, at: (delivery.provedAt ?? delivery.sentAt).toISOString() } : null;
    if (known) {
      if (!known.proved && proved) states.set(id, { ...known, proved });
      continue;
    }
    states.set(id, {
      gatewayId: delivery.gatewayId,
      gateway: delivery.gatewayName,
      model: found.model,
      delivered: {
        releaseId: found.release.id,
        version: found.release.version,
        state: delivery.state,
        at: delivery.sentAt.toISOString(),
        isWithdrawn: found.release.withdrawnAt !== null,
      },
      proved,
    });
  }
  return [...states.values()].sort((a, b) => a.gateway.localeCompare(b.gateway) || a.model.localeCompare(b.model));
}

/** The deliveries of one release, newest first. */
export async function listReleaseDeliveries(release: Pick<ReleaseRow, "id">): Promise<DeliveryLine[]> {
  return (await listDeliveries([release.id])).map(toDeliveryLine);
}
