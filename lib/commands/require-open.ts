import { AppError } from "@/lib/errors";
import type { Case } from "@/models";

/** A closed case takes notes only. Ask it after the chain is locked, with the case loaded in that transaction. */
export function requireOpen(found: Case): void {
  if (found.closedAt) throw new AppError("rule-against", `Case ${found.ref} is closed. Reopen it first; then make the change.`);
}
