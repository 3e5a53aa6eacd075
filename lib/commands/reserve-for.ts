import { readCaseRef } from "@/lib/core/case-number";
import { AppError } from "@/lib/errors";
import { Case, type Transaction } from "@/models";

/** The case that a board of the shelf is to be kept for, as its number was typed; null for none. A closed case keeps nothing. */
export async function reserveFor(text: string | null, tx: Transaction): Promise<Case | null> {
  if (text === null) return null;
  const refuse = (message: string) => new AppError("does-not-fit", message, { errors: [{ path: "changes.reservedFor", message }] });
  const reading = readCaseRef(text);
  if (reading.kind === "check-character-differs") throw refuse(`The check character of ${text} doesn't fit. Look at the label and type the number again.`);
  if (reading.kind !== "ref") throw refuse(`${text} is no case number. A case number looks like 26-0042.`);
  const found = await Case.findOne({ where: { ref: reading.ref }, transaction: tx });
  if (!found) throw refuse(`There is no case ${reading.ref}. Check the number.`);
  if (found.closedAt) throw refuse(`Case ${found.ref} is closed. Keep the board for an open case, or for none.`);
  return found;
}
