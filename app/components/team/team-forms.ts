/** Forms of the Team page; checked in the browser while typing and again on the server. */
import { z } from "zod";
import { roles, tokenScopes } from "~/auth/permissions";

const password = z
  .string("Choose a first password")
  .min(10, "At least 10 characters")
  .max(128, "At most 128 characters");
const held = z.array(z.enum(roles)).min(1, "Give at least one role").default([]);
const userId = z.string().max(100);

export const addPersonSchema = z.object({
  intent: z.literal("add-person"),
  name: z.string("Write the name").trim().max(100, "At most 100 characters"),
  email: z.email("Write an e-mail address").max(320, "That is too long"),
  password,
  roles: held,
});

const setRolesSchema = z.object({ intent: z.literal("set-roles"), userId, roles: held });
const removePersonSchema = z.object({ intent: z.literal("remove-person"), userId });
const setPasswordSchema = z.object({ intent: z.literal("set-password"), userId, password });
const createTokenSchema = z.object({
  intent: z.literal("create-token"),
  name: z.string("Say what it is for").trim().max(100, "At most 100 characters"),
  scopes: z.array(z.enum(tokenScopes)).default([]),
  days: z.coerce
    .number("Write a number of days")
    .int("Whole days")
    .min(1, "At least one day")
    .max(366, "At most 366 days"),
});
const revokeTokenSchema = z.object({ intent: z.literal("revoke-token"), tokenId: z.string().max(100) });

export const teamSchema = z.discriminatedUnion("intent", [
  addPersonSchema,
  setRolesSchema,
  removePersonSchema,
  setPasswordSchema,
  createTokenSchema,
  revokeTokenSchema,
]);
export type TeamIntent = z.infer<typeof teamSchema>;
