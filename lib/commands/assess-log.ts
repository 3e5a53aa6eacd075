import type { Actor } from "@/lib/core/words";
import { inTransaction } from "@/models";
import { appendEntry } from "./append-entry";
import { driveFor } from "./place";
import { allow } from "./refuse";

/** An auditor has looked at a log that does not check out and says what to think of it. */
export async function assessLog(actor: Actor, driveId: string, input: { text: string }): Promise<{ seq: number; hash: string }> {
  allow(actor, "assessment.record");
  await driveFor(actor, driveId);
  return inTransaction((tx) => appendEntry(tx, driveId, actor, "log.assessed", { type: "drive", id: driveId }, { text: input.text }));
}
