import { z } from "zod";
import { ROLES } from "@/lib/core/words";
import { MIN_PASSWORD_CHARACTERS } from "@/lib/limits";
import { email, line } from "./text";

export const userInput = z.strictObject({ email, name: line(120, "a name"), role: z.enum(ROLES, "Choose a role.") });
export type UserInput = z.infer<typeof userInput>;

export const userChange = z.strictObject({
  name: line(120, "a name").optional(),
  role: z.enum(ROLES).optional(),
  disabled: z.boolean().optional(),
  newPassword: z.boolean().optional(),
}).refine((c) => Object.keys(c).length > 0, "Name at least one field to change.");
export type UserChange = z.infer<typeof userChange>;

export const password = z.string({ error: "Give a password." }).min(MIN_PASSWORD_CHARACTERS, `A password has at least ${MIN_PASSWORD_CHARACTERS} characters; a few words are fine.`).max(1024, "At most 1024 characters.")
  .refine((s) => new Set(s).size >= 6, "Use more than a handful of different characters.");
export const passwordInput = z.strictObject({ current: z.string({ error: "Give your present password." }).min(1, "Give your present password.").max(1024), next: password });
export type PasswordInput = z.infer<typeof passwordInput>;

export const tokenInput = z.strictObject({ name: line(120, "a name for the token, such as the bench it is for") });

export const signInInput = z.object({ email: z.string().min(1, "Give your e-mail address."), password: z.string().min(1, "Give your password.") });
