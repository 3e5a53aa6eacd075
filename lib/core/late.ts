/** A note about something that happened longer ago than this is marked late, with by how much. */
export const LATE_AFTER_HOURS = 12;

/** Whole hours from what happened to its note; undefined where the note came in time, or says nothing of when. */
export function lateByHours(happenedAt: Date | null, recordedAt: Date): number | undefined {
  if (!happenedAt) return undefined;
  const hours = (recordedAt.getTime() - happenedAt.getTime()) / 3_600_000;
  return hours > LATE_AFTER_HOURS ? Math.floor(hours) : undefined;
}
