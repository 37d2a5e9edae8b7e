/** The file of waivers that a pipeline reads: `{"waivers": […]}`. */
import { z } from "zod";
import type { Waiver } from "./waivers";

const waiverSchema: z.ZodType<Waiver> = z.object({
  rule: z.string().regex(/^R\d{3}$/),
  nodeId: z.string(),
  attribute: z.string().optional(),
  reason: z.string().min(1),
  person: z.string().min(1),
  date: z.string().min(1),
  fingerprint: z.string(),
});

export const waiverFileSchema = z.object({ waivers: z.array(waiverSchema) });

/** The file for a pipeline that honours what people have accepted in the application. */
export function toWaiverFile(waivers: readonly Waiver[]): z.infer<typeof waiverFileSchema> {
  return {
    waivers: waivers.map(({ rule, nodeId, attribute, reason, person, date, fingerprint }) => ({
      rule,
      nodeId,
      ...(attribute === undefined ? {} : { attribute }),
      reason,
      person,
      date,
      fingerprint,
    })),
  };
}
