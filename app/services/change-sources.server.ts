/** Every change of sources, ports, gateways and what they publish, as one union that a page sends. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import type { Result } from "../domain/core/result";
import {
  assignMachine,
  assignMachineSchema,
  removeGateway,
  removeSource,
  saveGateway,
  saveGatewaySchema,
  savePort,
  savePortSchema,
  saveSource,
  saveSourceSchema,
} from "./save-source.server";

const id = z.string().min(1).max(50);

export const sourceIntentSchema = z.discriminatedUnion("intent", [
  z.strictObject({ intent: z.literal("save-source"), value: saveSourceSchema }),
  z.strictObject({ intent: z.literal("remove-source"), id }),
  z.strictObject({ intent: z.literal("save-port"), value: savePortSchema }),
  z.strictObject({ intent: z.literal("save-gateway"), value: saveGatewaySchema }),
  z.strictObject({ intent: z.literal("remove-gateway"), id }),
  z.strictObject({ intent: z.literal("assign-machine"), value: assignMachineSchema }),
]);

/** As a page writes it: what has a usual value may be left away. */
export type SourceIntentJson = z.input<typeof sourceIntentSchema>;

/** Problems: those of the change itself. */
export async function changeSources(
  caller: Caller,
  organizationId: string,
  change: z.infer<typeof sourceIntentSchema>,
): Promise<Result<unknown>> {
  switch (change.intent) {
    case "save-source":
      return saveSource(caller, organizationId, change.value);
    case "remove-source":
      return removeSource(caller, organizationId, change.id);
    case "save-port":
      return savePort(caller, organizationId, change.value);
    case "save-gateway":
      return saveGateway(caller, organizationId, change.value);
    case "remove-gateway":
      return removeGateway(caller, organizationId, change.id);
    case "assign-machine":
      return assignMachine(caller, organizationId, change.value);
  }
}
