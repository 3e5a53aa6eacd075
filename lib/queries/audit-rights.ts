import { casesOf, notFound } from "@/lib/commands/refuse";
import { may } from "@/lib/core/policy";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";

/** The audit pages and their files are for auditors, leads and admins. */
export function allowAudit(actor: Actor): void {
  if (!may(actor, "audit.read")) throw new AppError("forbidden", "The audit pages are for auditors, leads and admins. The log of each drive is open to you.");
}

/** What concerns the workshop as a whole is not there for an auditor who sees certain cases only. */
export function allowWorkshopAudit(actor: Actor): void {
  allowAudit(actor);
  if (casesOf(actor)) throw notFound("list");
}
