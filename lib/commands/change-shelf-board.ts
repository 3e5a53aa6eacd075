import { type ShelfChip, shelfNumber, type ShelfRow } from "@/lib/core/shelf";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { chipsText } from "@/lib/queries/shelf-file";
import { shelfRows } from "@/lib/queries/shelf-view";
import type { ShelfChange } from "@/lib/schemas/shelf";
import { inTransaction, ShelfBoard, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import type { Change } from "./correct-facts";
import { allow, notFound } from "./refuse";
import { reserveFor } from "./reserve-for";

/** These change as they do; all else is a correction and needs a reason. */
const FREE = new Set(["place", "note", "reserved for"]);
const NAME: Record<string, string> = { boardNumber: "board number", controllerMarking: "controller marking", motorDriverMarking: "motor driver marking" };

/** Corrects a board of the shelf, keeps it for a case, retires it or brings it back: the row, and an entry with from, to and reason. */
export async function changeShelfBoard(actor: Actor, id: string, { changes: asked, reason = null }: ShelfChange): Promise<{ id: string; number: string }> {
  allow(actor, "shelf.change");
  // a retired board is kept for nobody
  const changes = asked.retired ? { ...asked, reservedFor: null } : asked;
  if (!(await ShelfBoard.findByPk(id))) throw notFound("shelf board");
  return inTransaction(async (tx) => {
    await lockChain(tx, WORKSHOP_CHAIN);
    const row = (await ShelfBoard.findByPk(id, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
    const [view] = await shelfRows([row], tx);
    const found = shelfChanges(view, changes);
    if (found.length === 0) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
    if (view.state === "taken") throw new AppError("rule-against", takenRefusal(view, "Correct the donor board on that drive's page."));
    if (view.state === "retired" && changes.retired !== false) throw new AppError("rule-against", `${view.number} is retired. Bring it back to the shelf first; then make the change.`);
    if (!reason && found.some((one) => !FREE.has(one.field))) throw new AppError("does-not-fit", "Give a reason for the correction.", { errors: [{ path: "reason", message: "Give a reason." }] });
    await writeShelfChange(tx, actor, row, changes, found, reason);
    return { id, number: view.number };
  });
}

export function takenRefusal({ number, taken }: Pick<ShelfRow, "number" | "taken">, next: string): string {
  return `${number} was taken${taken ? ` for Drive ${taken.letter} of case ${taken.ref}` : ""}. ${next}`;
}

/** What really changes, in the words of the log. A case's number is compared without its check character. */
export function shelfChanges(view: ShelfRow, wanted: ShelfChange["changes"]): Change[] {
  const found: Change[] = [];
  const put = (field: string, from: Change["from"], to: Change["to"]) => { if (from !== to) found.push({ field, from, to }); };
  const { chips, reservedFor, retired, ...facts } = wanted;
  for (const [field, to] of Object.entries(facts)) if (to !== undefined) put(NAME[field] ?? field, view[field as keyof typeof facts] ?? null, to);
  if (chips !== undefined) put("chips", chipsText(view.chips) || null, chipsText(chips as ShelfChip[]) || null);
  if (reservedFor !== undefined) put("reserved for", view.reservedFor?.ref ?? null, reservedFor?.replace(/\.[0-9a-z]$/i, "") ?? null);
  if (retired !== undefined) put("retired", view.state === "retired", retired);
  return found;
}

/** For whoever holds the lock of the workshop's chain. */
export async function writeShelfChange(tx: Transaction, actor: Actor, row: ShelfBoard, wanted: ShelfChange["changes"], found: Change[], reason: string | null): Promise<void> {
  const { chips, reservedFor, retired, ...facts } = wanted;
  const kept = found.some((one) => one.field === "reserved for") ? { reservedCaseId: (await reserveFor(reservedFor ?? null, tx))?.id ?? null } : {};
  await row.update({
    ...facts, ...(chips === undefined ? {} : { chips: JSON.stringify(chips) }), ...kept,
    ...(retired === undefined ? {} : retired ? { retiredAt: new Date(), retiredReason: reason } : { retiredAt: null, retiredReason: null }),
  }, { transaction: tx });
  await appendEntry(tx, WORKSHOP_CHAIN, actor, "shelf.changed", { type: "shelf-board", id: row.id }, { shelfBoard: row.id, number: shelfNumber(row.number), changes: found, reason });
}
