import { driveFor } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { deriveChipState } from "@/lib/core/chip-state";
import { type StartUpFacts, startUpRefusal } from "@/lib/core/start-up";
import type { Actor } from "@/lib/core/words";
import type { PersonView } from "@/lib/views";
import { StartUpTest, type Transaction } from "@/models";
import { stateFacts } from "./chip-facts";
import { chipRecords } from "./chip-records";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { seenBy } from "./seen-by";

export interface StartUpView extends StartUpFacts {
  id: string;
  note: string | null;
  by: PersonView;
  at: string;
}

export interface DriveStartUps {
  /** newest first */
  tests: StartUpView[];
  /** why it may not be started yet */
  refusal: string | null;
  label: string | null;
  closed: boolean;
}

/** The start-up tests of a drive, and whether one may be made now. */
export async function startUpsOfDrive(actor: Actor, driveId: string): Promise<DriveStartUps> {
  allow(actor, "case.read");
  const { drive, case: found } = await driveFor(actor, driveId);
  const [who, policy, { records }] = [await people(), await currentPolicy(), await chipRecords([driveId])];
  const rows = await StartUpTest.findAll({ where: { driveId }, order: [["at", "DESC"]] });
  return seenBy(actor, {
    tests: rows.map((row) => ({ id: row.id, ...startUpFacts(row), note: row.note ?? null, by: who(row.byUserId), at: row.at.toISOString() })),
    refusal: startUpRefusal(records.filter((r) => r.chip.needsTransfer).map((record) => ({
      designator: record.chip.designator, transferKind: record.transfers.at(-1)?.kind ?? null, ...deriveChipState(stateFacts(record, policy)),
    }))),
    label: drive.serial ?? null, closed: Boolean(found.closedAt),
  });
}

export function startUpFacts(row: StartUpTest): StartUpFacts {
  return { spins: row.spins, ready: row.ready, reportedSerial: row.reportedSerial ?? null, serialMatches: row.serialMatches ?? null, attempts: row.attempts };
}

/** The latest test of each of these drives. */
export async function latestStartUps(driveIds: string[], tx?: Transaction): Promise<Map<string, StartUpTest>> {
  const rows = await StartUpTest.findAll({ where: { driveId: driveIds }, order: [["at", "ASC"]], transaction: tx });
  return new Map(rows.map((row) => [row.driveId, row]));
}
