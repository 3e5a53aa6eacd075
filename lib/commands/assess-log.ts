import type { Actor } from "@/lib/core/words";
import { Drive, inTransaction } from "@/models";
import { appendEntry } from "./append-entry";
import { allow, notFound } from "./refuse";

/** An auditor has looked at a log that does not check out and says what to think of it. */
export async function assessLog(actor: Actor, driveId: string, input: { text: string }): Promise<{ seq: number; hash: string }> {
  allow(actor, "assessment.record");
  if (!(await Drive.findByPk(driveId))) throw notFound("drive");
  return inTransaction((tx) => appendEntry(tx, driveId, actor, "log.assessed", { type: "drive", id: driveId }, { text: input.text }));
}
