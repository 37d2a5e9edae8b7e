/** Live sources: the poller over outages, and the OPC UA master that speaks the real protocol on loopback. */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { build } from "vite";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { problem } from "~/domain/core/result";
import type { LiveSource, SourceReading } from "~/domain/mapping/live-source";
import { getPackageFolder } from "~/library/published.server";
import { EndpointClient } from "~/opcua/client/endpoint-client.server";
import { ANONYMOUS, UNPROTECTED } from "~/opcua/client/endpoint-settings";
import { OpcUaSource } from "~/opcua/client/opc-ua-source.server";
import { startFakeMaster, type FakeMaster } from "~/opcua/fake-master/start-fake-master.server";
import { startDemoHall } from "~/sources/fakes/demo-hall.server";
import { openModbusUnits } from "~/sources/modbus-source.server";
import { Poller } from "~/sources/poller.server";
import { openRestMaster } from "~/sources/rest-source.server";
import { projectRoot } from "../support/source-files";

const good: SourceReading = { ok: true, value: { kind: "scalar", value: 1, status: 0 }, time: 1 };
const lost: SourceReading = { ok: false, status: 0x80310000, problem: problem("source.unreachable", { url: "x", message: "gone" }), time: 1 };

/** A source that answers what the test says, and counts. */
function makeSource() {
  const state = { answer: good, asked: 0 };
  const source: LiveSource = {
    read: async () => {
      state.asked++;
      await wait(5);
      return state.answer;
    },
    close: () => Promise.resolve(),
  };
  return { state, source };
}

describe("the poller", () => {
  test("tells when a source is lost, tries again with one probe at a time, and goes on when it is back", async () => {
    const { state, source } = makeSource();
    const poller = new Poller(source);
    const states: string[] = [];
    poller.onState((s) => states.push(s.kind));
    for (let n = 0; n < 20; n++) poller.add({ kind: "node", nodeId: `i=${n}` }, 20, () => undefined);
    const becomes = (kind: string) => vi.waitFor(() => expect(poller.state.kind).toBe(kind), { timeout: 10_000 });
    await becomes("connected");
    state.answer = lost;
    await becomes("lost");
    const before = state.asked;
    await wait(400);
    // The first pause is half a second: next to nothing is asked meanwhile.
    expect(state.asked - before).toBeLessThan(5);
    state.answer = good;
    await becomes("connected");
    expect(states).toEqual(["connected", "lost", "connected"]);
    const after = state.asked;
    await poller.close();
    await wait(60);
    expect(state.asked).toBe(after);
  });

  test("does not take an answer that says no for an outage, and stops with the last listener", async () => {
    const { state, source } = makeSource();
    const poller = new Poller(source);
    state.answer = { ok: false, status: 0x80890000, problem: problem("source.modbus-exception", {}), time: 1 };
    const end = poller.add({ kind: "node", nodeId: "i=1" }, 20, () => undefined);
    await vi.waitFor(() => expect(poller.state.kind).toBe("connected"), { timeout: 10_000 });
    end();
    expect(poller.isIdle).toBe(true);
    await poller.close();
  });
});

describe("the demo's field devices", () => {
  test("answer process data, identity, parameters and registers as the scenario has them", async () => {
    const hall = await startDemoHall(() => 1_000_000);
    try {
      const m1 = openRestMaster({ baseUrl: hall.masters[0]?.baseUrl ?? "" });
      const frame = await m1.read({ kind: "process-data", port: 4, alias: "B2_creel" });
      expect(frame).toMatchObject({ ok: true, value: { kind: "process-data", in: { isValid: true } } });
      expect(await m1.read({ kind: "port", port: 4, alias: "B2_creel" })).toMatchObject({ value: { status: 4, vendorId: 65_001, deviceId: 1030, serialNumber: "U30-26-102" } });
      expect(await m1.read({ kind: "registers", unitId: 1, table: "coil", address: 0, count: 1 })).toMatchObject({ ok: false, problem: { code: "source.item" } });
      const units = openModbusUnits({ host: hall.units.host, port: hall.units.port });
      expect(await units.read({ kind: "registers", unitId: 13, table: "holding-register", address: 0, count: 3 })).toMatchObject({ ok: true, value: { kind: "words" } });
      // The optional counter is absent on B1 and B2: an exception of the unit, no outage.
      expect(await units.read({ kind: "registers", unitId: 11, table: "holding-register", address: 14, count: 2 })).toMatchObject({ ok: false, problem: { code: "source.modbus-exception" } });
      await units.close();
    } finally {
      await hall.close();
    }
  });
});

describe("an IO-Link master with an OPC UA server (OPC 30120)", () => {
  const outDir = join(projectRoot, "node_modules/.cache", `ferrule-fake-master-${process.pid}`);
  let folder: string;
  let master: FakeMaster;
  let client: EndpointClient;

  beforeAll(async () => {
    folder = mkdtempSync(join(tmpdir(), "ferrule-master-"));
    await build({
      configFile: false,
      root: projectRoot,
      logLevel: "error",
      publicDir: false,
      resolve: { alias: { "~": join(projectRoot, "app") } },
      build: { ssr: true, target: "node20", outDir, emptyOutDir: true, rolldownOptions: { input: { "fake-master": join(projectRoot, "app/opcua/fake-master/main.ts") } } },
    });
    master = await startFakeMaster(join(outDir, "fake-master.js"), {
      masterName: "M4",
      pkiFolder: join(folder, "server"),
      portCount: 2,
      nodeSetFiles: ["Opc.Ua.NodeSet2.xml", "Opc.Ua.Di.NodeSet2.xml", "Opc.Ua.IOLink.NodeSet2.xml"].map((file) => join(getPackageFolder(), file)),
      ports: [{ port: 1, vendorId: 65_001, deviceId: 1004, serialNumber: "C04-1", parameters: { "24": [0x42, 0x31] } }],
    });
    client = new EndpointClient({ id: "master", endpointUrl: master.endpointUrl, security: UNPROTECTED, token: ANONYMOUS, certificate: undefined, pkiFolder: join(folder, "client") });
  });

  afterAll(async () => {
    await client.dispose();
    await master.close();
    rmSync(folder, { recursive: true, force: true });
    rmSync(outDir, { recursive: true, force: true });
  });

  test("gives raw process data with its validity, identity, an empty port and parameters", async () => {
    const source = new OpcUaSource(client, "M4");
    const octets = [0x00, 0xe7, 0x02, 0x82, 0x61, 0x27, 0x94, 0, 0, 0, 0, 0];
    master.setFrames([{ port: 1, octets, isValid: true }]);
    await wait(200);
    const read = await source.read({ kind: "process-data", port: 1 });
    expect(read.ok && read.value.kind === "process-data" && [...(read.value.in?.octets ?? [])]).toEqual(octets);
    expect(await source.read({ kind: "port", port: 1 })).toMatchObject({ value: { status: 4, vendorId: 65_001, deviceId: 1004, serialNumber: "C04-1" } });
    expect(await source.read({ kind: "port", port: 2 })).toMatchObject({ value: { kind: "port", status: 0 } });
    expect(await source.read({ kind: "parameter", port: 1, index: 24, subindex: 0 })).toMatchObject({ ok: true, value: { kind: "octets" } });
    // 0x8011: index not available (IODD standard definitions).
    expect(await source.read({ kind: "parameter", port: 1, index: 99, subindex: 0 })).toMatchObject({ ok: false, problem: { code: "source.refused", data: { code: 0x8011 } } });
    master.setFrames([{ port: 1, octets, isValid: false }]);
    await wait(200);
    expect(await source.read({ kind: "process-data", port: 1 })).toMatchObject({ value: { in: { isValid: false } } });
    expect(await source.read({ kind: "node", nodeId: "/IOLinkMasterSet/M4/Port1/Device/DeviceID" })).toMatchObject({ value: { value: 1004, status: 0 } });
    expect(await source.read({ kind: "node", nodeId: "/No/Such/Node" })).toMatchObject({ ok: false, problem: { code: "source.no-node" } });
  });
});
