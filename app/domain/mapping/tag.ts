/** A value of a controller as a list names it. */
import { z } from "zod";
import { tagPlaceSchema } from "./mapping";

export const tagSchema = z.strictObject({
  name: z.string().min(1).max(1_000),
  /** Without a role: where it is read, once a role is chosen. */
  reference: tagPlaceSchema,
  /** IEC 61131-3 or OPC UA name, as the list gives it. */
  dataType: z.string().max(200).optional(),
  /** UN/CEFACT code. */
  unit: z.string().max(4).optional(),
  scale: z.number().optional(),
  offset: z.number().optional(),
  comment: z.string().max(2_000).optional(),
  /** Line of the file, the head being line 1. */
  line: z.number().int().min(1),
});

export type Tag = z.infer<typeof tagSchema>;
