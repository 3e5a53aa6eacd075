import { caseFor, driveLetter } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { lateByHours } from "@/lib/core/late";
import type { Actor } from "@/lib/core/words";
import type { NoteView } from "@/lib/views";
import { Drive, Note } from "@/models";
import { people } from "./people";
import { seenBy } from "./seen-by";

/** The notes of a case, the oldest first; one that was corrected says by which. */
export async function notesOf(actor: Actor, caseId: string): Promise<{ items: NoteView[] }> {
  allow(actor, "case.read");
  await caseFor(actor, caseId);
  const [rows, drives, who] = await Promise.all([Note.findAll({ where: { caseId }, order: ["at", "id"] }), Drive.findAll({ where: { caseId } }), people()]);
  const letters = new Map(drives.map((drive) => [drive.id, driveLetter(drive)]));
  const place = new Map(rows.map((row, i) => [row.id, i + 1]));
  return seenBy(actor, {
    items: rows.map((row, i): NoteView => ({
      id: row.id, number: i + 1, text: row.text, drive: row.driveId ? letters.get(row.driveId) ?? null : null, by: who(row.byUserId), at: row.at.toISOString(),
      happenedAt: row.happenedAt?.toISOString() ?? null, lateByHours: lateByHours(row.happenedAt ?? null, row.at) ?? null,
      corrects: row.correctsId ? place.get(row.correctsId) ?? null : null, correctedBy: rows.filter((other) => other.correctsId === row.id).map((other) => place.get(other.id)!).at(-1) ?? null,
    })),
  });
}
