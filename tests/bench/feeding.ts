/**
 * One minute of 50 ports with 40 fields each at 10 Hz: a made-up master in a process of its own, the poller here, mappings
 * and Variables in the test server's process, as in production. No frame may be lost between them, and the time from the
 * frame's arrival here to the Variable's change there is counted for every frame.
 */
import { fork } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { fileURLToPath } from "node:url";
import type { MachineFeed } from "~/domain/mapping/make-feed";
import type { FeedInput } from "~/domain/mapping/plan-readings";
import { getPackageFolder } from "~/library/published.server";
import { DELAY_STEPS, toParentSchema, type ToParentMessage } from "~/opcua/messages";
import { startFakeRestMaster } from "~/sources/fakes/fake-rest-master.server";
import { Poller } from "~/sources/poller.server";
import { openRestMaster } from "~/sources/rest-source.server";
import { answerParent, forkChild, waitForMessage } from "./child";
import { limit, record, type BenchResult } from "./result";

const PORTS = 50;
const FIELDS = 40;
const BITS = 6;
const OCTETS = 32;
const PERIOD_MS = 100;
const SECONDS = 60;
const NAMESPACE = "http://merrow.example/bench/Feed/";

export async function measureFeeding(): Promise<BenchResult[]> {
  const scratch = mkdtempSync(join(tmpdir(), "ferrule-bench-"));
  const master = forkChild("rest-master", []);
  try {
    const { baseUrl } = await waitForMessage<{ baseUrl: string }>(master);
    return await feed(scratch, baseUrl);
  } finally {
    master.kill();
    rmSync(scratch, { recursive: true, force: true });
  }
}

/** The master's process. */
export async function runRestMaster(): Promise<void> {
  const devices = Array.from({ length: PORTS }, (_, i) => ({
    port: i + 1,
    alias: aliasOf(i),
    vendorId: 65_001,
    deviceId: 9_999,
    productName: "Bench",
    serialNumber: String(i),
    readIn: (time: number) => ({ octets: Array.from({ length: OCTETS }, (_o, at) => (time / 7 + at * 13 + i) & 0xff), isValid: true }),
  }));
  const { baseUrl } = await startFakeRestMaster(devices);
  await answerParent({ baseUrl });
}

async function feed(scratch: string, baseUrl: string): Promise<BenchResult[]> {
  const file = join(scratch, "bench.NodeSet2.xml");
  writeFileSync(file, makeNodeSet());
  const child = fork(fileURLToPath(import.meta.resolve("./test-server.js")), [], { execArgv: [], silent: true, serialization: "advanced" });
  let told: Extract<ToParentMessage, { kind: "feed" }> | undefined;
  child.on("message", (raw) => {
    const message = toParentSchema.parse(raw);
    if (message.kind === "feed") told = message;
  });
  child.send(makeStart(scratch, file));
  await waitForMessage(child, (message) => (message as { kind?: string }).kind === "ready");
  const poller = new Poller(openRestMaster({ baseUrl, timeoutMs: 2_000 }));
  let sent = 0;
  const ends = Array.from({ length: PORTS }, (_, i) =>
    poller.add({ kind: "process-data", port: i + 1, alias: aliasOf(i) }, PERIOD_MS, (reading) => {
      if (!reading.ok || reading.value.kind !== "process-data" || !reading.value.in) return;
      const { octets, isValid } = reading.value.in;
      const input: FeedInput = { kind: "frame", machine: `P${i}`, role: "sensor", direction: "in", octets, isValid, time: reading.time };
      sent++;
      child.send({ kind: "inputs", inputs: [input] });
    }),
  );
  await wait(SECONDS * 1_000);
  for (const end of ends) end();
  await wait(2_500);
  await poller.close();
  const gone = new Promise<void>((resolve) => child.once("exit", () => resolve()));
  child.send({ kind: "stop" });
  await gone;
  if (!told) throw new Error("The test server told nothing of its feed");
  return toResults(told, sent);
}

function toResults({ inputs, changes, histogram }: Extract<ToParentMessage, { kind: "feed" }>, sent: number): BenchResult[] {
  const wanted = (PORTS * SECONDS * 1_000) / PERIOD_MS;
  let below = 0;
  const step = histogram.findIndex((count) => (below += count) >= 0.99 * inputs);
  return [
    record("frames of 50 ports read in a minute", `of ${wanted}`, sent),
    // A port's very last exchange may fall behind the minute.
    limit("frames that were not exchanged in time", "frames", Math.max(0, wanted - sent), PORTS),
    limit("frames lost on the way to the test server", "frames", sent - inputs, 0),
    limit("Variables that did not change with their frame", "values", Math.max(0, inputs * FIELDS - changes), 0),
    limit("delay of a frame to its Variables, p99 at most", "ms", DELAY_STEPS[step] ?? Number.POSITIVE_INFINITY, 50),
  ];
}

function aliasOf(index: number): string {
  return `port_${index + 1}`;
}

function makeStart(scratch: string, file: string): object {
  return {
    kind: "start",
    id: "bench",
    applicationName: "Bench (simulation)",
    applicationUri: "urn:ferrule:simulation:bench",
    pkiFolder: join(scratch, "pki"),
    host: "127.0.0.1",
    port: 0,
    security: ["none"],
    userName: "tester",
    password: "hawser",
    simulatedQuality: "good",
    nodeSetFiles: [join(getPackageFolder(), "Opc.Ua.NodeSet2.xml"), file],
    simulation: [],
    methods: [],
    maxSessions: 20,
    feed: Array.from({ length: PORTS }, (_, i) => makeMachine(i)),
  };
}

function makeMachine(index: number): MachineFeed {
  const fields = Array.from({ length: FIELDS }, (_, f) => f);
  const items = fields.map((f) => ({ subindex: f + 1, bitOffset: f * BITS, type: { kind: "UIntegerT" as const, bitLength: BITS, singleValues: [], ranges: [] } }));
  return {
    machine: `P${index}`,
    unbound: [],
    ranges: {},
    layouts: [{ role: "sensor", direction: "in", profileCharacteristic: [], image: { id: "PD", bitLength: OCTETS * 8, type: { kind: "RecordT", bitLength: OCTETS * 8, items }, info: {} } }],
    mapping: {
      machineType: "BenchType",
      roles: [{ role: "sensor", kind: "io-link-device" }],
      rows: fields.map((f) => ({ target: `F${f}`, source: { kind: "process-data", role: "sensor", direction: "in", subindex: f + 1 }, transforms: [], period: PERIOD_MS })),
    },
    nodes: fields.map((f) => ({ target: `F${f}`, nodeId: `nsu=${NAMESPACE};i=${idOf(index, f)}`, builtInType: "UInt32" })),
  };
}

function idOf(port: number, field: number): number {
  return 1_000 * (port + 1) + field + 1;
}

function makeNodeSet(): string {
  const objects = Array.from({ length: PORTS }, (_, i) => {
    const owner = `ns=1;i=${1_000 * (i + 1)}`;
    const variables = Array.from({ length: FIELDS }, (_f, f) => `<UAVariable NodeId="ns=1;i=${idOf(i, f)}" BrowseName="1:F${f}" DataType="UInt32" ParentNodeId="${owner}"><DisplayName>F${f}</DisplayName><References><Reference ReferenceType="HasComponent" IsForward="false">${owner}</Reference><Reference ReferenceType="HasTypeDefinition">i=63</Reference></References></UAVariable>`);
    return `<UAObject NodeId="${owner}" BrowseName="1:P${i}"><DisplayName>P${i}</DisplayName><References><Reference ReferenceType="Organizes" IsForward="false">i=85</Reference><Reference ReferenceType="HasTypeDefinition">i=58</Reference></References></UAObject>${variables.join("")}`;
  });
  const aliases = `<Alias Alias="UInt32">i=7</Alias><Alias Alias="HasComponent">i=47</Alias><Alias Alias="Organizes">i=35</Alias><Alias Alias="HasTypeDefinition">i=40</Alias>`;
  return `<?xml version="1.0" encoding="utf-8"?><UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd"><NamespaceUris><Uri>${NAMESPACE}</Uri></NamespaceUris><Models><Model ModelUri="${NAMESPACE}" Version="1.0.0" PublicationDate="2026-11-02T00:00:00Z"><RequiredModel ModelUri="http://opcfoundation.org/UA/"/></Model></Models><Aliases>${aliases}</Aliases>${objects.join("")}</UANodeSet>`;
}
