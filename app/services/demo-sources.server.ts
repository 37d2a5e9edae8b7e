/**
 * The demo's field devices: fakes on loopback that speak the real protocols, started with the demo and ended with it. Each
 * start tells the sources of the demo where they listen now. What cannot start is told on the console; the rest goes on.
 */
import { join } from "node:path";
import { writeBatch, type Statement } from "../db/client.server";
import { listSourceRows, saveSourceStatement } from "../db/repositories/sources.server";
import { findOrganizationBySlug } from "../db/repositories/people.server";
import { startFakeMaster } from "../opcua/fake-master/start-fake-master.server";
import { getLibrary } from "../library/library.server";
import { encodeConditionMonitor, makeBraiderSignals } from "../sources/fakes/braider-signals";
import { startDemoHall } from "../sources/fakes/demo-hall.server";
import { getEnvironment } from "../utils/env.server";
import { logError } from "../utils/log.server";
import { findProjectRoot } from "../utils/project-root.server";
import { onShutdown } from "../utils/shutdown.server";
import { allowOwnFake } from "./live-sources.server";

const MASTER_NAMES = ["M1", "M2", "M3"];
const MODBUS_NAME = "Hall controllers and meters";
const OPC_UA_MASTER = "M4";
const BRAIDERS = [1, 2, 3, 4, 5, 6];
const FRAME_PERIOD_MS = 200;
const REQUIRED_FILES = [
  "http://opcfoundation.org/UA/",
  "http://opcfoundation.org/UA/DI/",
  "http://opcfoundation.org/UA/IOLink/",
];

/** Answers a line for the console. The OPC UA master takes some seconds and comes after the rest. */
export async function startDemoSources(slug: string): Promise<string> {
  const organization = await findOrganizationBySlug(slug);
  if (!organization) return "The demo has no organisation.";
  const hall = await startDemoHall();
  onShutdown("demo field devices", () => hall.close());
  const urls = hall.masters.map((master) => master.baseUrl);
  await setAddresses(organization.id, [
    ...MASTER_NAMES.map((name, i) => [name, { url: urls[i] ?? "" }] as const),
    [MODBUS_NAME, { host: hall.units.host, port: hall.units.port }],
  ]);
  for (const url of urls) allowOwnFake(new URL(url).host);
  allowOwnFake(`${hall.units.host}:${hall.units.port}`);
  void startOpcUaMaster(organization.id).catch((error: unknown) => logError(error, "the demo's OPC UA master"));
  return "Field devices of the demo: 3 REST masters, 12 Modbus units and an OPC UA master on 127.0.0.1 (all made up)";
}

async function startOpcUaMaster(organizationId: string): Promise<void> {
  const files = REQUIRED_FILES.flatMap((uri) => {
    const published = getLibrary()
      .list()
      .filter((e) => e.modelUri === uri && e.origin === "published");
    const [entry] = published.sort((a, b) => ((a.publicationDate ?? "") < (b.publicationDate ?? "") ? 1 : -1));
    return entry?.source.kind === "file" ? [entry.source.path] : [];
  });
  const master = await startFakeMaster(
    join(findProjectRoot(), "build/node/fake-master.js"),
    {
      masterName: OPC_UA_MASTER,
      pkiFolder: join(getEnvironment().dataFolder, "pki", "fake-master"),
      nodeSetFiles: files,
      portCount: 8,
      ports: BRAIDERS.map((braider) => ({
        port: braider,
        vendorId: 65_001,
        deviceId: 1004,
        serialNumber: `C04-26-${400 + braider}`,
        parameters: { "36": [0] },
      })),
    },
    (close) => onShutdown("demo OPC UA master", close),
  );
  const tell = (): void => {
    const time = Date.now();
    master.setFrames(
      BRAIDERS.map((braider) => ({
        port: braider,
        octets: encodeConditionMonitor(makeBraiderSignals(braider, time)),
        isValid: true,
      })),
    );
  };
  const timer = setInterval(tell, FRAME_PERIOD_MS);
  onShutdown("demo OPC UA master", async () => {
    clearInterval(timer);
    await master.close();
  });
  tell();
  allowOwnFake(new URL(master.endpointUrl.replace(/^opc\.tcp/, "http")).host);
  await setAddresses(organizationId, [[OPC_UA_MASTER, { url: master.endpointUrl }]]);
}

async function setAddresses(
  organizationId: string,
  addresses: readonly (readonly [name: string, address: Readonly<Record<string, unknown>>])[],
): Promise<void> {
  const rows = await listSourceRows(organizationId);
  const statements = addresses.flatMap(([name, address]): Statement[] => {
    const row = rows.find((r) => r.name === name);
    return row ? [saveSourceStatement({ ...row, address: { ...row.address, ...address } })] : [];
  });
  const [first, ...rest] = statements;
  if (first) await writeBatch([first, ...rest]);
}
