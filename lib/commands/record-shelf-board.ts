import { randomUUID } from "node:crypto";
import { shelfNumber } from "@/lib/core/shelf";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import type { ShelfInput } from "@/lib/schemas/shelf";
import { type Case, inTransaction, ShelfBoard, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { allow } from "./refuse";
import { reserveFor } from "./reserve-for";

/** Puts a donor board on the shelf under the next number. */
export async function recordShelfBoard(actor: Actor, input: ShelfInput): Promise<{ id: string; number: string }> {
  allow(actor, "shelf.change");
  return inTransaction(async (tx) => {
    // numbers are given out under this lock, one after the other
    await lockChain(tx, WORKSHOP_CHAIN);
    const kept = await reserveFor(input.reservedFor ?? null, tx);
    const row = await writeShelfBoard(tx, actor, await nextShelfNumber(tx), input, kept);
    return { id: row.id, number: shelfNumber(row.number) };
  });
}

export async function nextShelfNumber(tx: Transaction): Promise<number> {
  return (Number(await ShelfBoard.max("number", { transaction: tx })) || 0) + 1;
}

/** For whoever holds the lock of the workshop's chain. */
export async function writeShelfBoard(tx: Transaction, actor: Actor, number: number, input: ShelfInput, kept: Pick<Case, "id" | "ref"> | null): Promise<ShelfBoard> {
  const row = await ShelfBoard.create({
    id: randomUUID(), number, boardNumber: input.boardNumber, revision: input.revision ?? null, controllerMarking: input.controllerMarking ?? null, motorDriverMarking: input.motorDriverMarking ?? null,
    chips: JSON.stringify(input.chips), origin: input.origin ?? null, condition: input.condition ?? null, place: input.place ?? null, note: input.note ?? null, reservedCaseId: kept?.id ?? null, createdBy: actor.id, createdAt: new Date(),
  }, { transaction: tx });
  const subject = { type: "shelf-board", id: row.id } as const;
  await appendEntry(tx, WORKSHOP_CHAIN, actor, "shelf.recorded", subject, {
    shelfBoard: row.id, number: shelfNumber(number), boardNumber: row.boardNumber, revision: row.revision ?? null, origin: row.origin ?? null, place: row.place ?? null,
  });
  if (kept) await appendEntry(tx, WORKSHOP_CHAIN, actor, "shelf.changed", subject, { shelfBoard: row.id, number: shelfNumber(number), changes: [{ field: "reserved for", from: null, to: kept.ref }], reason: null });
  return row;
}
