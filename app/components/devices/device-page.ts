import type { DeviceDescription } from "~/domain/iodd/device-description";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { ShownProblem } from "../models/problem-list";

export type DevicePage = {
  readonly summary: DeviceSummary;
  readonly description: DeviceDescription;
  readonly problems: readonly ShownProblem[];
  /** All versions of the device, this one too, newest first. */
  readonly versions: readonly DeviceSummary[];
};
