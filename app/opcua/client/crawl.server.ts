/**
 * Walks a whole server along its forward references, many nodes a request, within the server's own operation limits. It
 * answers what is there as the wire tells it; making nodes of it is the matter of read-address-space.
 */
import { AttributeIds, BrowseDescription, BrowseDirection, type BrowseResult, type ClientSession, coerceNodeId, type DataValue, type NodeId, type ReferenceDescription } from "node-opcua";

export type CrawlOptions = {
  readonly maxNodes: number;
  readonly onProgress?: (progress: { readonly found: number; readonly browsed: number }) => void;
  readonly shouldStop?: () => boolean;
};

export type CrawledNode = {
  readonly description: ReferenceDescription;
  readonly references: ReferenceDescription[];
};

/** Nodes by the text of their wire NodeId. `isComplete` is false when a limit or the caller ended the walk. */
export type Crawl = { readonly nodes: ReadonlyMap<string, CrawledNode>; readonly isComplete: boolean };

const ROOT = coerceNodeId("i=84");
const REFERENCES = coerceNodeId("i=31");
/** Sessions and subscriptions of the moment: they come and go while one looks. */
const SKIPPED = new Set(["ns=0;i=2274"]);
const PARALLEL = 3;
const DEFAULT_BATCH = 200;
const REFERENCES_A_NODE = 2_000;

export async function crawl(session: ClientSession, options: CrawlOptions): Promise<Crawl> {
  const batch = await readLimit(session, "i=11710", DEFAULT_BATCH);
  const nodes = new Map<string, CrawledNode>();
  const waiting: NodeId[] = [ROOT];
  const seen = new Set([ROOT.toString()]);
  let isStopped = false;

  const takeIn = (result: BrowseResult, id: NodeId): void => {
    const known = nodes.get(id.toString());
    for (const reference of result.references ?? []) {
      known?.references.push(reference);
      const target = reference.nodeId;
      const text = target.toString();
      if (seen.has(text) || SKIPPED.has(text) || target.serverIndex > 0 || target.namespaceUri) continue;
      if (seen.size >= options.maxNodes) {
        isStopped = true;
        continue;
      }
      seen.add(text);
      nodes.set(text, { description: reference, references: [] });
      waiting.push(target);
    }
  };

  const work = async (): Promise<void> => {
    while (waiting.length > 0 && !isStopped) {
      if (options.shouldStop?.()) {
        isStopped = true;
        return;
      }
      const ids = waiting.splice(0, batch);
      await browseAll(session, ids, takeIn);
      options.onProgress?.({ found: seen.size, browsed: seen.size - waiting.length });
    }
  };
  // The walk widens by itself: a worker that found nothing to do begins again when another has brought new nodes.
  while (waiting.length > 0 && !isStopped) {
    await Promise.all(Array.from({ length: Math.min(PARALLEL, Math.ceil(waiting.length / batch)) }, work));
  }
  return { nodes, isComplete: !isStopped };
}

async function browseAll(session: ClientSession, ids: readonly NodeId[], takeIn: (result: BrowseResult, id: NodeId) => void): Promise<void> {
  session.requestedMaxReferencesPerNode = REFERENCES_A_NODE;
  const results = await session.browse(ids.map(toDescription));
  for (const [i, result] of results.entries()) {
    const id = ids[i];
    if (!id) continue;
    takeIn(result, id);
    let point = result.continuationPoint;
    while (point && point.length > 0) {
      const next = await session.browseNext(point, false);
      takeIn(next, id);
      point = next.continuationPoint;
    }
  }
}

function toDescription(nodeId: NodeId): BrowseDescription {
  return new BrowseDescription({ nodeId, browseDirection: BrowseDirection.Forward, referenceTypeId: REFERENCES, includeSubtypes: true, nodeClassMask: 0, resultMask: 63 });
}

export type AttributeRequest = { readonly nodeId: NodeId; readonly attributeId: AttributeIds };

/** The answers in the order of the requests, asked in portions that the server takes. */
export async function readInPortions(session: ClientSession, requests: readonly AttributeRequest[]): Promise<DataValue[]> {
  const portion = await readLimit(session, "i=11705", 1_000);
  const portions: AttributeRequest[][] = [];
  for (let at = 0; at < requests.length; at += portion) portions.push(requests.slice(at, at + portion));
  const answers: DataValue[][] = [];
  let next = 0;
  const work = async (): Promise<void> => {
    for (let at = next++; at < portions.length; at = next++) answers[at] = await session.read(portions[at] ?? []);
  };
  await Promise.all(Array.from({ length: Math.min(PARALLEL, portions.length) }, work));
  return answers.flat();
}

/** A limit of the server's OperationLimits (OPC 10000-5 §6.3.11), 0 or nothing meaning that it has none. */
async function readLimit(session: ClientSession, nodeId: string, atMost: number): Promise<number> {
  const answer = await session.read({ nodeId, attributeId: AttributeIds.Value });
  const limit = answer.statusCode.isGoodish() ? Number(answer.value.value) : 0;
  return limit > 0 ? Math.min(limit, atMost) : atMost;
}
