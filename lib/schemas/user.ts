import { z } from "zod";
import { type Role, ROLES } from "@/lib/core/words";
import { MIN_PASSWORD_CHARACTERS } from "@/lib/limits";
import { day, email, line, maybe, uuid } from "./text";

const role = z.enum(ROLES, "Choose a role.");
const name = line(120, "a name");
/** the last day of the account; null: it doesn't end */
const endsOn = maybe(day.refine((s) => s < "2100-01-01", "Give a day before the year 2100.")).optional();
/** ids of the only cases that the account may see; null: every case */
const cases = z.array(uuid).min(1, "Choose at least one case, or let the account see every case.").max(500, "At most 500 cases fit on one list.").nullable().optional();

interface Limits {
  role: Role;
  endsOn?: string | null;
  cases?: string[] | null;
}

/** What an account may carry, as it would stand after the change; a command, the form and the interface say the same. */
export function limitFaults({ role, endsOn, cases }: Limits): { path: "endsOn" | "cases"; message: string }[] {
  if (role !== "auditor") {
    return [
      ...(cases ? [{ path: "cases" as const, message: "Only an auditor's account can carry a case list. Make the role auditor, or take the list away." }] : []),
      ...(endsOn ? [{ path: "endsOn" as const, message: "Only an auditor's account can carry an end date. Make the role auditor, or leave the date empty." }] : []),
    ];
  }
  return cases && !endsOn ? [{ path: "endsOn", message: "An account with a case list needs a last day. Give one." }] : [];
}

export const userInput = z.strictObject({ email, name, role, endsOn, cases }).superRefine((input, context) => {
  for (const { path, message } of limitFaults(input)) context.addIssue({ code: "custom", path: [path], message });
});
export type UserInput = z.infer<typeof userInput>;

/** The form for an account that is there: the address stays. */
export const userForm = z.strictObject({ name, role, endsOn, cases }).superRefine((input, context) => {
  for (const { path, message } of limitFaults(input)) context.addIssue({ code: "custom", path: [path], message });
});
export type UserForm = z.infer<typeof userForm>;

export const userChange = z.strictObject({
  name: name.optional(),
  role: z.enum(ROLES).optional(),
  disabled: z.boolean().optional(),
  newPassword: z.boolean().optional(),
  endsOn,
  cases,
}).refine((c) => Object.keys(c).length > 0, "Name at least one field to change.");
export type UserChange = z.infer<typeof userChange>;

export const password = z.string({ error: "Give a password." }).min(MIN_PASSWORD_CHARACTERS, `A password has at least ${MIN_PASSWORD_CHARACTERS} characters; a few words are fine.`).max(1024, "At most 1024 characters.")
  .refine((s) => new Set(s).size >= 6, "Use more than a handful of different characters.");
export const passwordInput = z.strictObject({ current: z.string({ error: "Give your present password." }).min(1, "Give your present password.").max(1024), next: password });
export type PasswordInput = z.infer<typeof passwordInput>;

export const tokenInput = z.strictObject({ name: line(120, "a name for the token, such as the bench it is for") });

export const signInInput = z.object({ email: z.string().min(1, "Give your e-mail address."), password: z.string().min(1, "Give your password.") });
