import { driveFor } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { deriveChipState } from "@/lib/core/chip-state";
import { type StartUpFacts, startUpRefusal } from "@/lib/core/start-up";
import type { Actor, Policy } from "@/lib/core/words";
import type { DriveStartUps } from "@/lib/views";
import { StartUpTest, type Transaction } from "@/models";
import { stateFacts } from "./chip-facts";
import { type ChipRecord, chipRecords } from "./chip-records";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { seenBy } from "./seen-by";

/** The start-up tests of a drive, and whether one may be made now. */
export async function startUpsOfDrive(actor: Actor, driveId: string): Promise<DriveStartUps> {
  allow(actor, "case.read");
  const { drive, case: found } = await driveFor(actor, driveId);
  const who = await people();
  const rows = await StartUpTest.findAll({ where: { driveId }, order: [["at", "DESC"]] });
  return seenBy(actor, {
    tests: rows.map((row) => ({ id: row.id, ...startUpFacts(row), note: row.note ?? null, by: who(row.byUserId), at: row.at.toISOString() })),
    driveId, refusal: startUpRefusalOf((await chipRecords([driveId])).records, await currentPolicy()),
    label: drive.serial ?? null, closed: Boolean(found.closedAt),
  });
}

/** Why a drive with these chips may not be started yet, or null. */
export function startUpRefusalOf(records: readonly ChipRecord[], policy: Policy): string | null {
  return startUpRefusal(records.filter((r) => r.chip.needsTransfer).map((record) => ({
    designator: record.chip.designator, transferKind: record.transfers.at(-1)?.kind ?? null, ...deriveChipState(stateFacts(record, policy)),
  })));
}

export function startUpFacts(row: StartUpTest): StartUpFacts {
  return { spins: row.spins, ready: row.ready, reportedSerial: row.reportedSerial ?? null, serialMatches: row.serialMatches ?? null, attempts: row.attempts };
}

/** Null where the board took another image or chip after this test: it says nothing about what is on it now. */
export function sinceTransfer(test: StartUpTest | undefined, records: readonly ChipRecord[]): StartUpTest | null {
  return test && records.every(({ transfers }) => transfers.every((transfer) => transfer.at < test.at)) ? test : null;
}

/** The latest test of each of these drives. */
export async function latestStartUps(driveIds: string[], tx?: Transaction): Promise<Map<string, StartUpTest>> {
  const rows = await StartUpTest.findAll({ where: { driveId: driveIds }, order: [["at", "ASC"]], transaction: tx });
  return new Map(rows.map((row) => [row.driveId, row]));
}
