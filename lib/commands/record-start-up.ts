import { randomUUID } from "node:crypto";
import { serialMatches } from "@/lib/core/start-up";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { chipRecords } from "@/lib/queries/chip-records";
import { currentPolicy } from "@/lib/queries/policy";
import { startUpRefusalOf } from "@/lib/queries/start-up";
import type { StartUpInput } from "@/lib/schemas/start-up";
import { Case, Drive, inTransaction, StartUpTest } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { requireCleanChain } from "./chain-gate";
import { driveFor } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/** The drive was powered with its donor board: what it did. From here on read-backs that differ are notes. */
export async function recordStartUp(actor: Actor, driveId: string, input: StartUpInput): Promise<{ id: string; serialMatches: boolean | null }> {
  allow(actor, "start-up.record");
  await driveFor(actor, driveId);
  return inTransaction(async (tx) => {
    await lockChain(tx, driveId);
    const drive = (await Drive.findByPk(driveId, { transaction: tx }))!;
    requireOpen((await Case.findByPk(drive.caseId, { transaction: tx }))!);
    await requireCleanChain(driveId, tx);
    const [policy, { records }] = [await currentPolicy(tx), await chipRecords([driveId], tx)];
    const refusal = startUpRefusalOf(records, policy);
    if (refusal) throw new AppError("rule-against", refusal);
    const reportedSerial = input.reportedSerial ?? null;
    const facts = { spins: input.spins, ready: input.ready, reportedSerial, serialMatches: serialMatches(drive.serial, reportedSerial), attempts: input.attempts, note: input.note ?? null };
    const test = await StartUpTest.create({ id: randomUUID(), driveId, ...facts, byUserId: actor.id, at: new Date() }, { transaction: tx });
    await appendEntry(tx, driveId, actor, "start-up.tested", { type: "drive", id: driveId }, { test: test.id, ...facts });
    return { id: test.id, serialMatches: facts.serialMatches };
  });
}
