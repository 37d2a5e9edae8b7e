/**
 * A whole live server read into nodes and compared with the file that it was started from. What is expected comes from that
 * file, read by the NodeSet reader, and from servers that node-opcua makes without us.
 */
import { readFileSync } from "node:fs";
import { nodesets } from "node-opcua-nodesets";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { formatNodeId } from "~/domain/address-space/node-id";
import { STRICT_TOLERANCE } from "~/domain/as-built/as-built";
import { compareAsBuilt } from "~/domain/as-built/compare-as-built";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { ANONYMOUS, PROTECTED } from "~/opcua/client/endpoint-settings";
import { EndpointClient } from "~/opcua/client/endpoint-client.server";
import { readAddressSpace, type LiveAddressSpace } from "~/opcua/client/read-address-space.server";
import { observeVariables } from "~/opcua/client/observe.server";
import { readServedModels } from "~/opcua/client/read-served-models.server";
import { Supervisor } from "~/opcua/supervisor.server";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { makeSeed, makeTestFolder, removeTestFolders, startWinch, winchFile, WINCH_URI } from "../support/winch-server";

vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

let bundle: TestServerBundle;
let supervisor: Supervisor;
let client: EndpointClient;
let live: LiveAddressSpace;
const standard = readLayer(nodesets.standard);
const winch = readLayer(winchFile);
const models = [{ modelUri: WINCH_URI }];

function readLayer(file: string): Layer {
  const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
  return buildLayer(header, nodes);
}

beforeAll(async () => {
  bundle = await buildTestServer("read-address-space");
  supervisor = new Supervisor({ entry: bundle.entry });
  const state = await startWinch(supervisor, makeSeed("walked"));
  expect(state.problems).toEqual([]);
  client = new EndpointClient({
    id: "walked",
    endpointUrl: state.endpointUrl ?? "",
    security: PROTECTED,
    token: ANONYMOUS,
    certificate: supervisor.getCertificate("walked"),
    pkiFolder: makeTestFolder("walk-pki"),
  });
  live = getValue(await readAddressSpace(client, { namespaceUris: [WINCH_URI], layers: [standard] }));
});

afterAll(async () => {
  await client.dispose();
  await supervisor.stopAll();
  bundle.remove();
  removeTestFolders();
});

function compare(released: Layer, nodes: readonly Node[] = live.nodes) {
  return compareAsBuilt({
    released: AddressSpace.of([standard], released),
    releasedModels: models,
    served: { nodes, models, isComplete: live.isComplete },
    tolerance: STRICT_TOLERANCE,
  });
}

/** The file with one node changed. */
function change(nodeId: string, edit: (node: Node) => Node | undefined): Layer {
  const nodes = [...winch.nodes.values()].flatMap((node) => (formatNodeId(node.nodeId) === nodeId ? (edit(node) ?? []) : node));
  return buildLayer(winch.header, nodes);
}

describe("a server started from a file", () => {
  it("has every node of the file, with the references of both directions", () => {
    expect(new Set(live.nodes.map((n) => formatNodeId(n.nodeId)))).toEqual(new Set([...winch.keysByNodeId.keys()]));
    expect(live.isComplete).toBe(true);
    const load = live.nodes.find((n) => n.key === `nsu=${WINCH_URI};i=6100`);
    expect(load).toMatchObject({ nodeClass: "Variable", browseName: { namespaceUri: WINCH_URI, name: "Load" }, dataType: "i=10" });
  });

  it("is as released", () => {
    const comparison = compare(winch);
    expect(comparison.differences).toEqual([]);
    expect(comparison.verdict).toBe("as released");
  });

  it("differs where the release says something else", () => {
    const load = `nsu=${WINCH_URI};i=6100`;
    expect(compare(change(load, (n) => ({ ...n, dataType: "i=11" }) as Node)).differences).toMatchObject([{ aspect: "data type", nodeId: load, released: "Double", found: "Float" }]);
    expect(compare(winch, live.nodes.filter((n) => n.key !== `nsu=${WINCH_URI};i=7001`)).differences[0]).toMatchObject({ aspect: "missing", nodeId: `nsu=${WINCH_URI};i=7001`, found: null });
  });

  it("says which namespaces it serves", async () => {
    const served = await readServedModels(client);
    expect(served.map((m) => m.modelUri)).toEqual(expect.arrayContaining(["http://opcfoundation.org/UA/", WINCH_URI]));
  });

  it("sends values that are uncertain, since they are simulated, and nothing for a node that is not there", async () => {
    const targets = [
      { nodeId: `nsu=${WINCH_URI};i=6100`, path: "W1/Load" },
      { nodeId: `nsu=${WINCH_URI};i=999999`, path: "W1/Nowhere" },
    ];
    const [load, nowhere] = await observeVariables(client, targets, { milliseconds: 2_000 });
    expect(load?.samples).toBeGreaterThan(1);
    expect(load).toMatchObject({ badFor: 0, worstStatus: "UncertainSimulatedValue" });
    expect(nowhere).toMatchObject({ samples: 0 });
  });

  it("is not shown when the walk was cut", async () => {
    const cut = await readAddressSpace(client, { namespaceUris: [WINCH_URI], layers: [standard], maxNodes: 50 });
    expect(cut).toMatchObject({ ok: true, value: { isComplete: false }, problems: [{ code: "endpoint.walk-cut" }] });
  });
});
