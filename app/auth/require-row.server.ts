/** Rows of an organisation that routes name by id: what is not the caller's does not exist. */
import { findDeviceRow, type DeviceRow } from "../db/repositories/devices.server";
import { findSourceRow, type SourceRow } from "../db/repositories/sources.server";
import { assertMay, requireCaller, type Caller } from "./caller.server";
import type { Action } from "./permissions";

export async function requireDevice(request: Request, id: string | undefined, action: Action): Promise<{ caller: Caller; device: DeviceRow }> {
  const caller = await requireCaller(request);
  const device = id === undefined ? undefined : await findDeviceRow(id);
  assertMay(caller, action, device?.organizationId);
  return { caller, device: device as DeviceRow };
}

export async function requireSource(request: Request, id: string | undefined, action: Action): Promise<{ caller: Caller; source: SourceRow }> {
  const caller = await requireCaller(request);
  const source = id === undefined ? undefined : await findSourceRow(id);
  assertMay(caller, action, source?.organizationId);
  return { caller, source: source as SourceRow };
}
