/** The plan of an organisation's sources, as checks and documents need it; kept until something of it changes. */
import { listDeviceRows, type DeviceRow } from "../db/repositories/devices.server";
import { listPortRows, listSourceRows } from "../db/repositories/sources.server";
import { countProcessDataBits, type PlannedSource } from "../domain/mapping/make-wiring";
import { portPlanSchema, sourceAddressSchema, type SourceKind } from "../domain/mapping/source-settings";
import { singleton } from "../utils/singleton.server";
import { loadDeviceDescription } from "./device-library.server";

type Kept = { readonly stamp: string; readonly sources: readonly PlannedSource[] };

const getKept = () => singleton("planned-sources", () => new Map<string, Kept>());
const getBits = () => singleton("process-data-bits", () => new Map<string, Promise<number>>());

/** The same list as before while nothing changed, so that the checker is not asked again. */
export async function loadPlannedSources(organizationId: string): Promise<readonly PlannedSource[]> {
  const [sources, ports, devices] = await Promise.all([listSourceRows(organizationId), listPortRows(organizationId), listDeviceRows(organizationId)]);
  const stamp = JSON.stringify([sources, ports, devices.map((d) => d.id)]);
  const kept = getKept().get(organizationId);
  if (kept?.stamp === stamp) return kept.sources;
  const planned: PlannedSource[] = [];
  for (const row of sources) {
    const own = ports.filter((p) => p.sourceId === row.id);
    planned.push({
      id: row.id,
      name: row.name,
      kind: row.kind as SourceKind,
      address: sourceAddressSchema.parse(row.address),
      ports: await Promise.all(
        own.map(async ({ port, plan }) => {
          const parsed = portPlanSchema.parse(plan);
          const device = devices.find((d) => d.id === parsed.deviceDescriptionId);
          return { port, plan: parsed, device: device && (await describe(device)) };
        }),
      ),
    });
  }
  getKept().set(organizationId, { stamp, sources: planned });
  return planned;
}

async function describe(row: DeviceRow) {
  const known = getBits().get(row.descriptionHash) ?? loadDeviceDescription(row).then(countProcessDataBits);
  getBits().set(row.descriptionHash, known);
  return { name: row.deviceName, vendorId: row.vendorId, deviceId: row.deviceId, processDataBits: await known };
}
