/** Forms about models; checked in the browser while typing and again on the server. */
import { z } from "zod";
import { idPolicyFields as idPolicySchema } from "./id-policy-fields";

const maxUri = 400;

export const modelName = z.string("Write a name").trim().max(100, "At most 100 characters");

/** An absolute URI, as OPC 10000-3 §8.2.2 asks of namespaces; the namespaces of the standards body are not ours. */
export const namespaceUri = z
  .string("Write the namespace URI")
  .trim()
  .max(maxUri, `At most ${maxUri} characters`)
  .regex(
    /^[A-Za-z][A-Za-z0-9+.-]*:[^\s<>"{}|\\^`]+$/,
    "Write an absolute URI, as http://merrow.example/UA/RopeBraider/",
  )
  .refine(
    (uri) => !uri.toLowerCase().startsWith("http://opcfoundation.org/"),
    "This part of the namespace belongs to the standards body",
  );

export const modelVersion = z
  .string("Write a version")
  .trim()
  .regex(/^\d+\.\d+(\.\d+)?([-+][0-9A-Za-z.-]+)?$/, "Write figures with dots, as 1.0.0");

/** What a new model starts with: nothing, the five groups of a retrofitted machine, or a list of signals. */
const modelStarters = ["blank", "retrofit", "signals"] as const;
export type ModelStarter = (typeof modelStarters)[number];

export const newModelSchema = z.object({
  kind: z.enum(["types", "machines"]),
  start: z.enum(modelStarters).default("blank"),
  name: modelName,
  namespaceUri,
  version: modelVersion,
  required: z.array(z.string().max(maxUri)).max(50, "At most 50 models").default([]),
});
export type NewModelForm = z.infer<typeof newModelSchema>;

export const aboutModelSchema = z.discriminatedUnion("intent", [
  z.object({ intent: z.literal("rename"), name: modelName }),
  z.object({ intent: z.literal("set-version"), version: modelVersion }),
  z.object({
    intent: z.literal("set-required"),
    required: z.array(z.string().max(maxUri)).max(50, "At most 50 models").default([]),
  }),
  idPolicySchema,
  z.object({ intent: z.literal("delete") }),
]);
export type AboutModelForm = z.infer<typeof aboutModelSchema>;

export const importSchema = z.object({
  upload: z.string().max(100),
  into: z.enum(["model", "library"]),
  name: modelName.optional(),
  kind: z.enum(["types", "machines"]).optional(),
  namespaceUri: namespaceUri.optional(),
});
