/**
 * An as-built comparison of a server with 20 000 own nodes, against what a plain node-opcua client needs to browse and read
 * the same nodes with the same attributes, one request after the other, 100 nodes and 1 000 attributes each.
 */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { AttributeIds, BrowseDirection, coerceNodeId, MessageSecurityMode, NodeClass, OPCUACertificateManager, OPCUAClient, SecurityPolicy, type ClientSession, type NodeId } from "node-opcua";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import { STRICT_TOLERANCE } from "~/domain/as-built/as-built";
import { compareAsBuilt } from "~/domain/as-built/compare-as-built";
import { getValue } from "~/domain/core/result";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { getLibrary } from "~/library/library.server";
import { getPackageFolder } from "~/library/published.server";
import { EndpointClient } from "~/opcua/client/endpoint-client.server";
import { ANONYMOUS, UNPROTECTED } from "~/opcua/client/endpoint-settings";
import { readAddressSpace } from "~/opcua/client/read-address-space.server";
import { forkChild, waitForMessage } from "./child";
import { compare, median, type BenchResult } from "./result";

const NAMESPACE = "http://merrow.example/bench/as-built/";
const OBJECTS = 200;
const VARIABLES = 99;
const ROUNDS = 3;
const header = { namespaceUris: [NAMESPACE], models: [{ modelUri: NAMESPACE, requiredModels: [] }] };

export async function measureAsBuilt(): Promise<BenchResult[]> {
  const scratch = mkdtempSync(join(tmpdir(), "ferrule-bench-"));
  const file = join(scratch, "many.NodeSet2.xml");
  const own = buildLayer(header, makeNodes());
  writeFileSync(file, writeNodeSet({ header, nodes: [...own.nodes.values()] }).xml);
  const child = forkChild("bare-server", [join(scratch, "server"), join(getPackageFolder(), "Opc.Ua.NodeSet2.xml"), file]);
  try {
    const { endpointUrl } = (await waitForMessage(child, (message) => (message as { kind?: string }).kind === "ready")) as { endpointUrl: string };
    const standard = getValue(await getLibrary().resolve([]))[0] as Layer;
    const ours: number[] = [];
    const plain: number[] = [];
    for (let round = 0; round < ROUNDS; round++) {
      ours.push(await time(() => compareLive(endpointUrl, scratch, standard, own)));
      plain.push(await time(() => readPlainly(endpointUrl, scratch)));
    }
    return [compare("as-built comparison of a server with 20 000 nodes", "ms", median(ours), median(plain), 1.5)];
  } finally {
    child.kill("SIGTERM");
    rmSync(scratch, { recursive: true, force: true });
  }
}

async function time(work: () => Promise<void>): Promise<number> {
  const since = performance.now();
  await work();
  return performance.now() - since;
}

function makeNodes(): Node[] {
  const nodes: Node[] = [];
  const add = (nodeClass: "Object" | "Variable", name: string, owner: Node | undefined): Node => {
    const nodeId = numericNodeId(NAMESPACE, nodes.length + 1);
    const common = { key: toNodeKey(nodeId), nodeId, order: nodes.length, browseName: { namespaceUri: NAMESPACE, name }, displayName: [{ text: name }] };
    const owned = owner ? { type: standardKey(47), target: owner.key, isForward: false } : { type: standardKey(35), target: standardKey(85), isForward: false };
    const typed = { type: standardKey(40), target: standardKey(nodeClass === "Object" ? 58 : 63), isForward: true };
    const node: Node = nodeClass === "Object" ? { ...common, nodeClass, references: [typed, owned] } : { ...common, nodeClass, dataType: standardKey(11), references: [typed, owned] };
    nodes.push(node);
    return node;
  };
  for (let i = 0; i < OBJECTS; i++) {
    const object = add("Object", `Machine${i}`, undefined);
    for (let k = 0; k < VARIABLES; k++) add("Variable", `Value${k}`, object);
  }
  return nodes;
}

async function compareLive(endpointUrl: string, scratch: string, standard: Layer, own: Layer): Promise<void> {
  const client = new EndpointClient({ id: "bench", endpointUrl, security: UNPROTECTED, token: ANONYMOUS, certificate: undefined, pkiFolder: join(scratch, "client") });
  try {
    const live = getValue(await readAddressSpace(client, { namespaceUris: [NAMESPACE], layers: [standard] }));
    const { verdict } = compareAsBuilt({
      released: AddressSpace.of([standard], own),
      releasedModels: [],
      served: { nodes: live.nodes, models: [], isComplete: live.isComplete },
      tolerance: STRICT_TOLERANCE,
    });
    if (verdict !== "as released" || live.nodes.length !== OBJECTS * (VARIABLES + 1)) throw new Error(`The server is ${verdict} with ${live.nodes.length} nodes`);
  } finally {
    await client.dispose();
  }
}

const ATTRIBUTES = {
  [NodeClass.Object]: [AttributeIds.Description, AttributeIds.EventNotifier],
  [NodeClass.Variable]: [
    AttributeIds.Description,
    AttributeIds.Value,
    AttributeIds.DataType,
    AttributeIds.ValueRank,
    AttributeIds.ArrayDimensions,
    AttributeIds.AccessLevel,
    AttributeIds.MinimumSamplingInterval,
    AttributeIds.Historizing,
  ],
} as const;

/** The plain way: the same walk from the root over all forward references, and the same attributes of the same nodes. */
async function readPlainly(endpointUrl: string, scratch: string): Promise<void> {
  const certificates = new OPCUACertificateManager({ rootFolder: join(scratch, "plain"), automaticallyAcceptUnknownCertificate: true, disableFileWatchers: true });
  const client = OPCUAClient.create({ clientCertificateManager: certificates, securityMode: MessageSecurityMode.None, securityPolicy: SecurityPolicy.None, endpointMustExist: false, connectionStrategy: { maxRetry: 0 } });
  await client.connect(endpointUrl);
  const session = await client.createSession();
  try {
    const found = await browsePlainly(session);
    const requests = found.flatMap(({ nodeId, nodeClass }) => (ATTRIBUTES[nodeClass as NodeClass.Object | NodeClass.Variable] ?? []).map((attributeId) => ({ nodeId, attributeId })));
    for (let at = 0; at < requests.length; at += 1_000) await session.read(requests.slice(at, at + 1_000));
  } finally {
    await session.close();
    await client.disconnect();
  }
}

async function browsePlainly(session: ClientSession): Promise<{ nodeId: NodeId; nodeClass: NodeClass }[]> {
  const namespaces = await session.readNamespaceArray();
  const own = namespaces.indexOf(NAMESPACE);
  const seen = new Set(["ns=0;i=84"]);
  const found: { nodeId: NodeId; nodeClass: NodeClass }[] = [];
  let waiting: NodeId[] = [coerceNodeId("i=84")];
  while (waiting.length > 0) {
    const batch = waiting.slice(0, 100);
    waiting = waiting.slice(100);
    const answers = await session.browse(batch.map((nodeId) => ({ nodeId, browseDirection: BrowseDirection.Forward, referenceTypeId: coerceNodeId("i=31"), includeSubtypes: true, nodeClassMask: 0, resultMask: 63 })));
    for (const answer of answers) {
      let references = answer.references ?? [];
      let point = answer.continuationPoint;
      while (point && point.length > 0) {
        const next = await session.browseNext(point, false);
        references = [...references, ...(next.references ?? [])];
        point = next.continuationPoint;
      }
      for (const { nodeId, nodeClass } of references) {
        if (seen.has(nodeId.toString())) continue;
        seen.add(nodeId.toString());
        if (nodeId.namespace === own) found.push({ nodeId, nodeClass });
        waiting.push(nodeId);
      }
    }
  }
  return found;
}
