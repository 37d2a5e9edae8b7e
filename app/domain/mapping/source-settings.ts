/**
 * Sources of an organisation: what they are, how they are reached, and the plan of their ports. Secrets are never part of
 * it. Numbers of ports and masters start at 1 (JSON integration for IO-Link), Modbus addresses at 0.
 */
import { z } from "zod";

export const sourceKinds = [
  /** IO-Link master that speaks the community's JSON integration. */
  "rest-master",
  /** IO-Link master with an OPC UA server after OPC 30120. */
  "opc-ua-master",
  /** IO-Link master whose process data is read through a controller. */
  "controller-master",
  /** Units behind one Modbus TCP address. */
  "modbus-unit",
  "opc-ua-server",
  "rest-service",
  /** A controller whose values are known by name only. */
  "tag-server",
] as const;
export type SourceKind = (typeof sourceKinds)[number];

const url = z
  .string()
  .trim()
  .max(2_000)
  .refine((text) => /^(?:https?|opc\.tcp):\/\/[^\s/]+/i.test(text), "Begins with http://, https:// or opc.tcp://");

export const sourceAddressSchema = z.strictObject({
  url: url.optional(),
  host: z.string().trim().min(1).max(255).optional(),
  port: z.int().min(1).max(65_535).optional(),
  unitId: z.int().min(0).max(255).optional(),
  masterNumber: z.int().min(1).max(255).optional(),
  /** How many ports the master has. */
  portCount: z.int().min(1).max(64).optional(),
  /** Name of the master below IOLinkMasterSet (OPC 30120 §10.1). */
  masterName: z.string().trim().max(200).optional(),
  timeoutMs: z.int().min(100).max(60_000).default(2_000),
  periodMs: z.int().min(10).max(3_600_000).default(500),
});

export const sourceSchema = z.strictObject({
  name: z.string().trim().min(1).max(100),
  kind: z.enum(sourceKinds),
  address: sourceAddressSchema,
  note: z.string().trim().max(2_000).default(""),
});

export type SourceAddress = z.infer<typeof sourceAddressSchema>;
export type SourceSettings = z.infer<typeof sourceSchema>;

/** Port modes after the OPC 30120 NodeSet; DI and DO are the C/Q line as a plain input or output. */
export const portModes = ["IOL_AUTOSTART", "IOL_MANUAL", "DI", "DO", "DEACTIVATED"] as const;

export const portPlanSchema = z.strictObject({
  /** A: pins 2 and 5 free for the maker; B: a second, isolated supply on them. */
  portClass: z.enum(["A", "B"]).default("A"),
  mode: z.enum(portModes).default("IOL_AUTOSTART"),
  /** Milliseconds; absent: as fast as the device allows. */
  cycleMs: z.number().positive().max(60_000).optional(),
  deviceDescriptionId: z.string().max(200).optional(),
  vendorId: z.int().min(1).max(65_535).optional(),
  deviceId: z.int().min(1).max(16_777_215).optional(),
  deviceAlias: z.string().trim().max(200).optional(),
  serialNumber: z.string().trim().max(200).optional(),
  note: z.string().trim().max(2_000).optional(),
});

export type PortPlan = z.infer<typeof portPlanSchema>;

export function isIoLinkMaster(kind: SourceKind): boolean {
  return kind === "rest-master" || kind === "opc-ua-master" || kind === "controller-master";
}

/** What an address of the kind must say; the names of what is missing. */
export function listMissingAddress({ kind, address }: Pick<SourceSettings, "kind" | "address">): (keyof SourceAddress)[] {
  const needed: readonly (keyof SourceAddress)[] =
    kind === "modbus-unit"
      ? ["host", "port"]
      : kind === "rest-master"
        ? ["url", "portCount"]
        : kind === "opc-ua-master"
          ? ["url", "portCount"]
          : kind === "controller-master"
            ? ["portCount"]
            : kind === "tag-server"
              ? []
              : ["url"];
  return needed.filter((name) => address[name] === undefined);
}
