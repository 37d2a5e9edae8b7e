/** Messages between the demo (or a test) and the process of a made-up IO-Link master with an OPC UA server. */
import { z } from "zod";

export const fakePortSchema = z.object({
  port: z.number().int().min(1).max(64),
  vendorId: z.number().int(),
  deviceId: z.number().int(),
  serialNumber: z.string(),
  /** Octets of parameters by index. */
  parameters: z.record(z.string(), z.array(z.number().int().min(0).max(255))),
});

export const fakeMasterStartSchema = z.object({
  kind: z.literal("start"),
  masterName: z.string(),
  pkiFolder: z.string(),
  nodeSetFiles: z.array(z.string()).min(1),
  portCount: z.number().int().min(1).max(64),
  ports: z.array(fakePortSchema),
});

export const toFakeMasterSchema = z.discriminatedUnion("kind", [
  fakeMasterStartSchema,
  z.object({
    kind: z.literal("frames"),
    frames: z.array(z.object({ port: z.number().int(), octets: z.array(z.number().int().min(0).max(255)), isValid: z.boolean() })),
  }),
  z.object({ kind: z.literal("stop") }),
]);
export type ToFakeMaster = z.infer<typeof toFakeMasterSchema>;

export const fromFakeMasterSchema = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("ready"), endpointUrl: z.string() }),
  z.object({ kind: z.literal("failed"), detail: z.string() }),
]);
export type FromFakeMaster = z.infer<typeof fromFakeMasterSchema>;
