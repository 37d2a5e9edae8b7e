/** Two versions of one device side by side: what a mapping or a person would notice. Pure. */
import type { DeviceDescription, Direction } from "~/domain/iodd/device-description";
import { chooseLayout } from "~/domain/mapping/choose-layout";
import { viewFrame, type FrameField } from "../frames/frame-fields";
import { formatErrorCode, formatEventCode, listParameters, type ParameterRow } from "./describe-device";

export type Difference = {
  readonly part: "identity" | "process data in" | "process data out" | "parameters" | "events" | "error types";
  readonly name: string;
  readonly before: string;
  readonly after: string;
  readonly change: "added" | "removed" | "changed";
};

/** Differences from `before` to `after`, in the order in which a reader cares. */
export function compareDescriptions(
  before: DeviceDescription,
  after: DeviceDescription,
  language = "en",
): Difference[] {
  return [
    ...compareMaps("identity", describeIdentity(before), describeIdentity(after)),
    ...compareMaps("process data in", describeFields(before, "in", language), describeFields(after, "in", language)),
    ...compareMaps("process data out", describeFields(before, "out", language), describeFields(after, "out", language)),
    ...compareMaps("parameters", describeParameters(before, language), describeParameters(after, language)),
    ...compareMaps("events", describeEvents(before), describeEvents(after)),
    ...compareMaps("error types", describeErrors(before), describeErrors(after)),
  ];
}

function compareMaps(
  part: Difference["part"],
  before: ReadonlyMap<string, string>,
  after: ReadonlyMap<string, string>,
): Difference[] {
  const names = new Set([...before.keys(), ...after.keys()]);
  return [...names].flatMap((name): Difference[] => {
    const old = before.get(name);
    const next = after.get(name);
    if (old === next) return [];
    const change = old === undefined ? "added" : next === undefined ? "removed" : "changed";
    return [{ part, name, before: old ?? "", after: next ?? "", change }];
  });
}

function describeIdentity(device: DeviceDescription): Map<string, string> {
  const { communication } = device;
  return new Map([
    ["vendor and device id", `${device.vendorId} / ${device.deviceId}`],
    ["variants", device.variants.map((variant) => variant.productId).join(", ")],
    ["profiles", device.profileCharacteristic.join(", ")],
    ["transmission rate", communication?.bitrate ?? ""],
    ["least cycle time", communication?.minCycleTime === undefined ? "" : `${communication.minCycleTime} µs`],
    ["IO-Link revision", communication?.ioLinkRevision ?? ""],
  ]);
}

function describeFields(device: DeviceDescription, direction: Direction, language: string): Map<string, string> {
  const found = new Map<string, string>();
  for (const layout of device.processData) {
    const image = layout[direction];
    if (!image) continue;
    const layoutName = chooseLayout(device, direction).ok ? "" : `${layout.id}: `;
    found.set(`${layoutName}length`, `${image.bitLength} bit`);
    for (const field of viewFrame(image, { profileCharacteristic: device.profileCharacteristic, language }).fields) {
      found.set(`${layoutName}${field.name}`, describeField(field));
    }
  }
  return found;
}

function describeField(field: FrameField): string {
  return [field.typeText, `bits ${field.bitText}`, field.scaleText, field.rangeText, field.unitText]
    .filter((part) => part !== "")
    .join(", ");
}

function describeParameters(device: DeviceDescription, language: string): Map<string, string> {
  return new Map(listParameters(device, language).map((row) => [nameParameter(row), describeParameter(row)]));
}

function nameParameter(row: ParameterRow): string {
  return row.subindex === 0 ? `${row.index} ${row.name}` : `${row.index}.${row.subindex} ${row.name}`;
}

function describeParameter({ type, access, scale, unit, values, defaultValue }: ParameterRow): string {
  return [type, access, scale, unit, values, defaultValue === "" ? "" : `default ${defaultValue}`]
    .filter((part) => part !== "")
    .join(", ");
}

function describeEvents(device: DeviceDescription): Map<string, string> {
  return new Map(device.events.map((event) => [formatEventCode(event.code), event.type ?? "listed"]));
}

function describeErrors(device: DeviceDescription): Map<string, string> {
  return new Map(device.errorTypes.map((error) => [formatErrorCode(error), "listed"]));
}
