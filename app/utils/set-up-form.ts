/** The form of the first start; checked in the browser while typing and again on the server. */
import { z } from "zod";

export const setUpFormSchema = z
  .object({
    code: z.string("Write the code from the console").trim().max(40, "The code is shorter than that"),
    organizationName: z.string("Write the organisation’s name").trim().max(100, "At most 100 characters"),
    name: z.string("Write your name").trim().max(100, "At most 100 characters"),
    email: z.email("Write an e-mail address, as ines@merrow.example").max(320, "That is too long"),
    password: z.string("Choose a password").min(10, "At least 10 characters").max(128, "At most 128 characters"),
    repeat: z.string("Write the password once more"),
  })
  .refine((form) => form.password === form.repeat, { path: ["repeat"], message: "The two passwords differ" });
