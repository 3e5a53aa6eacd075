import { caseFor, driveLetter } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { boardName } from "@/lib/core/board-name";
import { deriveChipState } from "@/lib/core/chip-state";
import { type ClosingFacts, returnItems } from "@/lib/core/closing";
import { driveLabel } from "@/lib/core/drive-label";
import type { Actor } from "@/lib/core/words";
import type { ClosingView } from "@/lib/views";
import { Board, type Case, CaseReturn, Customer, Drive, Receipt, Request, type Transaction } from "@/models";
import { stateFacts } from "./chip-facts";
import { chipRecords, type ChipRecord } from "./chip-records";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { seenBy } from "./seen-by";
import { latestStartUps, sinceTransfer, startUpFacts, startUpRefusalOf } from "./start-up";

/** The end of a case as its page shows it. */
export async function closingView(actor: Actor, caseId: string): Promise<ClosingView> {
  allow(actor, "case.read");
  const found = await caseFor(actor, caseId);
  const drives = await Drive.findAll({ where: { caseId }, order: ["position"] });
  const ids = drives.map((d) => d.id);
  const [tests, policy, { records }] = [await latestStartUps(ids), await currentPolicy(), await chipRecords(ids)];
  const inside = new Set((await Board.findAll({ where: { driveId: ids, role: "original", dataInController: true }, attributes: ["driveId"] })).map((board) => board.driveId));
  const who = await people();
  const row = await CaseReturn.findOne({ where: { caseId } });
  const customer = await Customer.findByPk(found.customerId);
  return seenBy(actor, {
    facts: await closingFacts(found),
    drives: drives.map((drive) => {
      const mine = records.filter((r) => r.drive.id === drive.id);
      const test = sinceTransfer(tests.get(drive.id), mine);
      return { id: drive.id, letter: driveLetter(drive), test: test ? startUpFacts(test) : null, refusal: startUpRefusalOf(mine, policy), noChip: inside.has(drive.id), onlyKept: mine.length > 0 && mine.every((r) => !r.chip.needsTransfer) };
    }),
    items: await expectedItems(caseId), customerName: customer?.name ?? "",
    returned: row ? { items: itemsOf(row), toPerson: row.toPerson, carrier: row.carrier ?? null, tracking: row.tracking ?? null, sealNumber: row.sealNumber ?? null, note: row.note ?? null, by: who(row.byUserId), at: row.at.toISOString() } : null,
    closed: found.closedAt ? { at: found.closedAt.toISOString(), kind: found.closedKind ?? null, reason: found.closedReason ?? null } : null,
    eraseOn: found.eraseOn ?? null, keepDays: await keepDays(caseId),
  });
}

/** What decides whether the case can be closed. */
export async function closingFacts(found: Case, tx?: Transaction): Promise<ClosingFacts> {
  const drives = await Drive.findAll({ where: { caseId: found.id }, order: ["position"], transaction: tx });
  const ids = drives.map((d) => d.id);
  const [policy, { records }, tests] = [await currentPolicy(tx), await chipRecords(ids, tx), await latestStartUps(ids, tx)];
  const several = drives.length > 1;
  return {
    received: found.receivedAt !== null, returned: Boolean(found.returnedAt),
    chips: records.filter((r) => r.chip.needsTransfer).map((record) => ({
      name: several ? `${record.chip.designator} of Drive ${driveLetter(record.drive)}` : record.chip.designator, state: deriveChipState(stateFacts(record, policy)).state,
    })),
    otherSerial: drives.filter((drive) => tests.get(drive.id)?.serialMatches === false).map((drive) => `Drive ${driveLetter(drive)}`),
  };
}

/** Days that images are kept after the return: what the customer agreed to, where the workshop has changed it to more since. */
export async function keepDays(caseId: string, tx?: Transaction): Promise<number> {
  const { erasureDays } = await currentPolicy(tx);
  const request = await Request.findOne({ where: { caseId }, attributes: ["answers"], transaction: tx });
  const agreed: unknown = request ? (JSON.parse(request.answers) as { keepDays?: unknown }).keepDays : undefined;
  return typeof agreed === "number" ? Math.min(agreed, erasureDays) : erasureDays;
}

export function itemsOf(row: CaseReturn): string[] {
  return (JSON.parse(row.items) as unknown[]).filter((one): one is string => typeof one === "string");
}

/** What usually goes back, from what is on record. */
export async function expectedItems(caseId: string, tx?: Transaction): Promise<string[]> {
  const drives = await Drive.findAll({ where: { caseId }, order: ["position"], transaction: tx });
  const ids = drives.map((d) => d.id);
  const boards = await Board.findAll({ where: { driveId: ids, role: "original" }, order: ["createdAt"], transaction: tx });
  const { records } = await chipRecords(ids, tx);
  const receipt = await Receipt.findOne({ where: { caseId }, transaction: tx });
  return returnItems({
    drives: drives.map((drive) => {
      const done = records.filter((r) => r.drive.id === drive.id && r.transfers.length > 0);
      const moved = done.filter((r) => r.transfers.at(-1)!.kind === "chip-moved");
      const original = boards.find((board) => board.driveId === drive.id);
      const donor = done.find((r) => r.donor)?.donor?.board;
      return {
        letter: driveLetter(drive), label: driveLabel(drive), original: original ? named(original) : null, donor: donor ? named(donor) : null,
        moved: moved.map((r) => r.chip.designator), replaced: moved.map(replacedChip).filter((one) => one !== null),
      };
    }),
    smallBoard: receipt?.smallBoard === "yes", accessories: receipt?.accessories ?? null,
  });
}

const named = (board: Board) => boardName({ boardNumber: board.boardNumber, revision: board.revision ?? null });
const replacedChip = (record: ChipRecord) => record.donor?.chip.designator ?? null;
