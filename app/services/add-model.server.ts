/** Storing a new model: its row, revision 0, ledger, first sheet and audit row, in one batch or not at all. */
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, toBlob } from "../db/repositories/blobs.server";
import {
  addModelStatement,
  addRevisionStatement,
  addSheetStatement,
  findModelByNamespace,
  type ModelRow,
} from "../db/repositories/models.server";
import { HIGHEST_LEASED_IDENTIFIER, raiseLedgerStatement } from "../db/repositories/node-ids.server";
import type { ModelKind } from "../db/schema/models";
import { getOwnNamespace } from "../domain/address-space/model-header";
import type { Node } from "../domain/address-space/node";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { writePack, type PackContent } from "../domain/nodeset/pack";
import { newId } from "../utils/ids.server";
import { describeHeader } from "./describe-header.server";
import { publish } from "./event-hub.server";
import { choosePins } from "./pins.server";
import { makeSheet } from "./save-sheet.server";

export type NewModel = {
  readonly name: string;
  readonly kind: ModelKind;
  readonly content: PackContent;
  readonly message: string;
  /** A branch of another model, and the state that both have in common. */
  readonly variant?: { readonly of: ModelRow; readonly baseHash: string };
  /** The imported file, kept byte for byte. */
  readonly file?: { readonly name: string; readonly bytes: Uint8Array };
};

/** Problem: `model.namespace-taken`, also when another request was quicker by a moment. */
export async function addModel(author: Caller, organizationId: string, intent: NewModel): Promise<Result<ModelRow>> {
  const { content, name, kind, file, variant } = intent;
  const now = new Date();
  const namespaceUri = getOwnNamespace(content.header);
  const taken = (holder: ModelRow) => fail(problem("model.namespace-taken", { namespaceUri, name: holder.name }));
  const before = await findModelByNamespace(organizationId, namespaceUri);
  if (before && !variant) return taken(before);
  const pack = await toBlob(writePack(content));
  const fileBlob = file ? await toBlob(file.bytes) : undefined;
  const model: ModelRow = {
    id: newId(),
    organizationId,
    name,
    kind,
    namespaceUri,
    ...describeHeader(content.header),
    headSeq: 0,
    nodeCount: content.nodes.length,
    pins: variant ? variant.of.pins : kind === "machines" ? await choosePins(organizationId, content.header, []) : null,
    variantOf: variant?.of.id ?? null,
    variantBaseHash: variant?.baseHash ?? null,
    createdAt: now,
    createdBy: author.name,
    updatedAt: now,
    updatedBy: author.name,
  };
  try {
    await writeBatch([
      addModelStatement(model),
      addBlobStatement(pack, now),
      ...(fileBlob ? [addBlobStatement(fileBlob, now)] : []),
      addRevisionStatement({
        modelId: model.id,
        number: 0,
        seq: 0,
        packHash: pack.hash,
        fileHash: fileBlob?.hash ?? null,
        fileName: file?.name ?? null,
        message: intent.message,
        author: author.name,
        at: now,
        nodeCount: content.nodes.length,
      }),
      raiseLedgerStatement(organizationId, namespaceUri, findHighestIdentifier(content.nodes, namespaceUri)),
      addSheetStatement(makeSheet(model.id, "Overview", 0, author.name)),
      addAuditStatement({
        organizationId,
        userId: author.userId,
        userName: author.name,
        action: file ? "model.import" : variant ? "model.branch" : "model.create",
        subject: { kind: "model", id: model.id, name },
        details: { namespaceUri, nodes: content.nodes.length, ...(file ? { file: file.name } : {}) },
      }),
    ]);
  } catch (error) {
    const quicker = await findModelByNamespace(organizationId, namespaceUri);
    if (quicker && !variant) return taken(quicker);
    throw error;
  }
  publish(`models:${organizationId}`, { id: model.id, change: "added" });
  return ok(model);
}

function findHighestIdentifier(nodes: readonly Node[], namespaceUri: string): number {
  let highest = 0;
  for (const { nodeId } of nodes) {
    if (nodeId.namespaceUri !== namespaceUri || typeof nodeId.identifier !== "number") continue;
    if (nodeId.identifier <= HIGHEST_LEASED_IDENTIFIER) highest = Math.max(highest, nodeId.identifier);
  }
  return highest;
}
