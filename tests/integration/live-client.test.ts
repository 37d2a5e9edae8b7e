/**
 * The client side of Live against servers that it did not start: a test server of ours and a bare node-opcua server. Names,
 * ranges, units and states expected here are read off the NodeSet file; 4408652 is °C (OPC 10000-8 §5.6.4.2, code CEL).
 */
import { createServer, type AddressInfo } from "node:net";
import { join } from "node:path";
import { OPCUACertificateManager, OPCUAServer, MessageSecurityMode, SecurityPolicy } from "node-opcua";
import { nodesets } from "node-opcua-nodesets";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { getValue } from "~/domain/core/result";
import type { Sample } from "~/domain/live/sample";
import { callMethod, writeValue } from "~/opcua/client/act.server";
import { browseChildren, findPathTo } from "~/opcua/client/browse.server";
import { EndpointClient } from "~/opcua/client/endpoint-client.server";
import { ANONYMOUS, BROWSE_PAGE, PROTECTED, UNPROTECTED, type EndpointSettings } from "~/opcua/client/endpoint-settings";
import { readNode } from "~/opcua/client/read-node.server";
import { Supervisor } from "~/opcua/supervisor.server";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { makeSeed, makeTestFolder, removeTestFolders, startWinch, waitFor, WINCH_URI } from "../support/winch-server";

// Each test starts real processes; a busy machine takes its time over them.
vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

const pkiFolder = makeTestFolder("live-pki");
const winch = (local: string): string => `nsu=${WINCH_URI};${local}`;
const OBJECTS = "i=85";

let bundle: TestServerBundle;
let supervisor: Supervisor;
let settings: EndpointSettings;

beforeAll(async () => {
  bundle = await buildTestServer("live-client");
  supervisor = new Supervisor({ entry: bundle.entry });
  const state = await startWinch(supervisor, makeSeed("live"));
  expect(state.problems).toEqual([]);
  settings = {
    id: "live",
    endpointUrl: state.endpointUrl ?? "",
    security: PROTECTED,
    token: ANONYMOUS,
    certificate: supervisor.getCertificate("live"),
    pkiFolder,
  };
});

afterAll(async () => {
  await supervisor.stopAll();
  bundle.remove();
  removeTestFolders();
});

async function withClient<T>(work: (client: EndpointClient) => Promise<T>, change: Partial<EndpointSettings> = {}): Promise<T> {
  const client = new EndpointClient({ ...settings, ...change });
  try {
    return await work(client);
  } finally {
    await client.dispose();
  }
}

describe("browsing", () => {
  it("lists members with class, type, unit and range", async () => {
    await withClient(async (client) => {
      const top = getValue(await browseChildren(client, OBJECTS, null));
      expect(top.children.map((c) => c.displayName)).toContain("W1");
      expect(top.children.find((c) => c.displayName === "W1")).toMatchObject({ nodeId: winch("i=5001"), nodeClass: "Object", typeName: "WinchType", referenceType: "Organizes" });
      const members = getValue(await browseChildren(client, winch("i=5001"), null)).children;
      expect(members.find((c) => c.browseName === "Load")).toEqual({
        nodeId: winch("i=6100"),
        nodeClass: "Variable",
        browseName: "Load",
        displayName: "Load",
        referenceType: "HasComponent",
        isProperty: false,
        typeName: "AnalogUnitRangeType",
        unit: { text: "°C", description: "degree Celsius", unitId: 4408652 },
        range: { low: -20, high: 120 },
      });
      expect(members.find((c) => c.browseName === "ResetCounter")?.nodeClass).toBe("Method");
      expect(members.find((c) => c.browseName === "Manufacturer")?.isProperty).toBe(true);
    });
  });

  it("finds the way down to a node named in an address", async () => {
    await withClient(async (client) => {
      expect(getValue(await findPathTo(client, winch("i=6101")))).toEqual([OBJECTS, winch("i=5001"), winch("i=6100"), winch("i=6101")]);
    });
  });

  it("answers an unknown namespace and an unknown node with a problem", async () => {
    await withClient(async (client) => {
      expect(await browseChildren(client, "nsu=http://merrow.example/UA/None/;i=1", null)).toMatchObject({ ok: false, problems: [{ code: "endpoint.namespace-unknown" }] });
      expect(await readNode(client, winch("i=99999"))).toMatchObject({ ok: false, problems: [{ code: "endpoint.node-unknown" }] });
    });
  });

  it("reads a card with data type, states and access", async () => {
    await withClient(async (client) => {
      const fault = getValue(await readNode(client, winch("i=6120")));
      expect(fault).toMatchObject({ dataType: { name: "UInt16" }, typeName: "MultiStateValueDiscreteType", accessLevel: ["CurrentRead"] });
      expect(fault.states).toEqual([{ value: 0, text: "none" }, { value: 11, text: "slack rope" }, { value: 31, text: "overload" }]);
      const state = getValue(await readNode(client, winch("i=6110")));
      expect(state.states.map((s) => s.text)).toEqual(["Idle", "Hauling", "Braked"]);
      expect(["Idle", "Hauling", "Braked"]).toContain(state.sample?.text);
      const rope = getValue(await readNode(client, winch("s=Rope;Length=1")));
      expect(rope).toMatchObject({ accessLevel: ["CurrentRead", "CurrentWrite"], sample: { value: 12.5, status: { name: "Uncertain_SimulatedValue", severity: "uncertain" } } });
    });
  });
});

describe("watching", () => {
  it("tells the first value at once and changes after it, from one monitored item for two listeners", async () => {
    await withClient(async (client) => {
      const seen: Sample[] = [];
      const also: Sample[] = [];
      const endFirst = client.watch(winch("i=6100"), (sample) => seen.push(sample));
      const endSecond = client.watch(winch("i=6100"), (sample) => also.push(sample));
      await waitFor(() => (seen.length >= 4 ? true : undefined));
      expect(new Set(seen.map((s) => s.value)).size).toBeGreaterThan(2);
      expect(also.length).toBeGreaterThan(2);
      expect(client.watchedCount).toBe(1);
      const items = await waitFor(() => {
        const [session] = supervisor.get("live")?.sessions ?? [];
        return session && session.monitoredItems > 0 ? session : undefined;
      });
      expect(items).toMatchObject({ monitoredItems: 1, subscriptions: 1 });
      endFirst();
      endSecond();
      expect(client.watchedCount).toBe(0);
      const before = seen.length;
      await waitFor(() => (supervisor.get("live")?.sessions[0]?.monitoredItems === 0 ? true : undefined));
      expect(seen.length).toBeLessThanOrEqual(before + 1);
    });
    // Nothing is left at the server: no session, and with it no subscription.
    await waitFor(() => (supervisor.get("live")?.sessions.length === 0 ? true : undefined));
  });

  it("tells each of many nodes once, also those that never change", async () => {
    await withClient(async (client) => {
      const members = getValue(await browseChildren(client, winch("i=5001"), null)).children.filter((c) => c.nodeClass === "Variable");
      const seen = new Set<string>();
      for (const { nodeId, displayName } of members) client.watch(nodeId, () => seen.add(displayName));
      await waitFor(() => (seen.size === members.length ? true : undefined), 60_000);
      expect([...seen].sort()).toEqual(members.map((member) => member.displayName).sort());
    });
  });

  it("shows a status where a node cannot be watched", async () => {
    await withClient(async (client) => {
      const seen: Sample[] = [];
      client.watch(winch("i=99999"), (sample) => seen.push(sample));
      const first = await waitFor(() => seen[0]);
      expect(first).toMatchObject({ value: null, status: { name: "Bad_NodeIdUnknown", severity: "bad" } });
    });
  });
});

describe("writing and calling", () => {
  const rope = winch("s=Rope;Length=1");

  it("writes one value, reads it back and tells what was there", async () => {
    await withClient(async (client) => {
      expect(getValue(await writeValue(client, rope, "7,25"))).toMatchObject({ isDone: true, status: "Good", before: { value: 12.5 }, after: { value: 7.25 } });
      expect(getValue(await writeValue(client, rope, "\u22123"))).toMatchObject({ before: { value: 7.25 }, after: { value: -3 } });
    });
  });

  it("refuses what the server does not allow or the type does not take", async () => {
    await withClient(async (client) => {
      expect(await writeValue(client, winch("i=6100"), "7")).toMatchObject({ ok: false, problems: [{ code: "endpoint.not-writable" }] });
      expect(await writeValue(client, rope, "much")).toMatchObject({ ok: false, problems: [{ code: "endpoint.input" }] });
    });
  });

  it("calls a Method with typed arguments", async () => {
    await withClient(async (client) => {
      const card = getValue(await readNode(client, winch("i=7002")));
      expect(card.inputArguments).toEqual([{ name: "RecipeNumber", builtInType: "UInt16", description: null }]);
      expect(getValue(await callMethod(client, winch("i=5001"), winch("i=7002"), ["12"]))).toEqual({
        status: "Good",
        isDone: true,
        outputs: [
          { name: "Accepted", text: "true" },
          { name: "RecipeNumber", text: "12" },
          { name: "Remark", text: "simulation" },
        ],
      });
      for (const wrong of ["-1", "65536", "1.5", "", "x"]) {
        expect(await callMethod(client, winch("i=5001"), winch("i=7002"), [wrong]), wrong).toMatchObject({ ok: false, problems: [{ code: "endpoint.input" }] });
      }
      expect(await callMethod(client, winch("i=5001"), winch("i=7002"), [])).toMatchObject({ ok: false, problems: [{ code: "endpoint.arguments" }] });
    });
  });
});

describe("an endpoint that is not there", () => {
  it("is an error within seconds, and no hung request", async () => {
    const port = await findFreePort();
    await withClient(
      async (client) => {
        const began = Date.now();
        await expect(browseChildren(client, OBJECTS, null)).rejects.toThrow();
        expect(Date.now() - began).toBeLessThan(9_000);
        expect(client.state).toBe("lost");
      },
      { endpointUrl: `opc.tcp://127.0.0.1:${port}` },
    );
  });

  it("is not taken for the server whose certificate is known", async () => {
    const other = await startWinch(supervisor, makeSeed("other"), { pkiFolder: makeTestFolder("other-pki") });
    await withClient((client) => expect(browseChildren(client, OBJECTS, null)).rejects.toThrow(), { endpointUrl: other.endpointUrl ?? "" });
    await supervisor.stop("other");
  });

  it("heals by itself: what was watched goes on when the server is back", async () => {
    const port = await findFreePort();
    let server = await startBareServer(port);
    await withClient(
      async (client) => {
        const states: string[] = [];
        client.onState((state) => states.push(state));
        const seen: Sample[] = [];
        client.watch("i=2258", (sample) => seen.push(sample));
        await waitFor(() => (seen.length >= 2 ? true : undefined));
        await server.shutdown();
        await waitFor(() => (client.state === "lost" ? true : undefined), 20_000);
        const before = seen.length;
        server = await startBareServer(port);
        await waitFor(() => (seen.length > before + 1 ? true : undefined), 30_000);
        expect(states).toEqual(["connected", "lost", "connected"]);
      },
      { endpointUrl: `opc.tcp://127.0.0.1:${port}`, security: UNPROTECTED, certificate: undefined },
    );
    await server.shutdown();
  });
});

describe("a bare server that this application did not start", () => {
  it("is browsed page by page where one node has more children than a page holds", async () => {
    const port = await findFreePort();
    const server = await startBareServer(port, BROWSE_PAGE * 2 + 7);
    await withClient(
      async (client) => {
        const top = getValue(await browseChildren(client, OBJECTS, null));
        const shelf = top.children.find((c) => c.displayName === "Shelf");
        let page = getValue(await browseChildren(client, shelf?.nodeId ?? "", null));
        const names = page.children.map((c) => c.displayName);
        while (page.continuation !== null) {
          page = getValue(await browseChildren(client, shelf?.nodeId ?? "", page.continuation));
          names.push(...page.children.map((c) => c.displayName));
        }
        expect(names).toHaveLength(BROWSE_PAGE * 2 + 7);
        expect(new Set(names).size).toBe(names.length);
      },
      { endpointUrl: `opc.tcp://127.0.0.1:${port}`, security: UNPROTECTED, certificate: undefined },
    );
    await server.shutdown();
  });
});

function findFreePort(): Promise<number> {
  return new Promise((resolve) => {
    const probe = createServer().listen(0, "127.0.0.1", () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}

async function startBareServer(port: number, items = 0): Promise<OPCUAServer> {
  const server = new OPCUAServer({
    host: "127.0.0.1",
    hostname: "127.0.0.1",
    port,
    nodesets: [nodesets.standard],
    serverCertificateManager: new OPCUACertificateManager({ rootFolder: join(pkiFolder, "bare"), automaticallyAcceptUnknownCertificate: true, disableFileWatchers: true }),
    securityPolicies: [SecurityPolicy.None],
    securityModes: [MessageSecurityMode.None],
  });
  await server.initialize();
  const space = server.engine.addressSpace;
  const namespace = space?.getOwnNamespace();
  if (space && namespace && items > 0) {
    const shelf = namespace.addObject({ browseName: "Shelf", organizedBy: space.rootFolder.objects });
    for (let i = 0; i < items; i++) namespace.addObject({ browseName: `Box${i}`, componentOf: shelf });
  }
  await server.start();
  return server;
}
