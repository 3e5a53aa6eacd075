import { randomUUID } from "node:crypto";
import { lateByHours } from "@/lib/core/late";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { NoteInput } from "@/lib/schemas/note";
import { Drive, inTransaction, Note } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { allow, notFound } from "./refuse";

/** A clock of somebody's own may run a little ahead. */
const AHEAD_MS = 5 * 60_000;

/** What somebody wants written down; never changed afterwards, a correction is a note of its own. A closed case takes notes too. */
export async function addNote(actor: Actor, caseId: string, input: NoteInput): Promise<{ id: string; lateByHours: number | null }> {
  allow(actor, "note.add");
  await caseFor(actor, caseId);
  const happenedAt = input.happenedAt ? new Date(input.happenedAt) : null;
  const now = new Date();
  if (happenedAt && happenedAt.getTime() > now.getTime() + AHEAD_MS) throw new AppError("does-not-fit", "This time has not come yet. A note tells of what has happened.", { errors: [{ path: "happenedAt", message: "This time has not come yet." }] });
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    const driveId = input.driveId ?? null;
    if (driveId && !(await Drive.findOne({ where: { id: driveId, caseId }, transaction: tx }))) throw notFound("drive");
    const corrects = input.corrects ?? null;
    if (corrects && !(await Note.findOne({ where: { id: corrects, caseId }, transaction: tx }))) throw notFound("note");
    const note = await Note.create({ id: randomUUID(), caseId, driveId, text: input.text, happenedAt, correctsId: corrects, byUserId: actor.id, at: now }, { transaction: tx });
    const late = lateByHours(happenedAt, now);
    await appendToCase(tx, driveId ? [driveId] : chains, actor, "note.added", { type: "note", id: note.id }, {
      caseRef: found.ref, note: note.id, text: input.text, happenedAt: happenedAt?.toISOString() ?? null, lateByHours: late, corrects,
    });
    return { id: note.id, lateByHours: late ?? null };
  });
}
