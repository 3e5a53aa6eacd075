import { driveLetter } from "@/lib/commands/place";
import { deriveChipState } from "@/lib/core/chip-state";
import { crc32Hex } from "@/lib/core/digest";
import { driveLabel } from "@/lib/core/drive-label";
import type { Summary, SummaryChip } from "@/lib/core/summary-words";
import type { Policy } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { SummaryView } from "@/lib/views";
import { Case, CaseReturn, Customer, CustodyEntry, CustodyHead, Drive, type Read, type Transaction } from "@/models";
import { stateFacts } from "./chip-facts";
import { expectedItems, itemsOf } from "./closing";
import { type ChipRecord, chipRecords } from "./chip-records";
import { compositeBehind } from "./composite-behind";
import { openShare } from "./open-share";
import { people, type People } from "./people";
import { currentPolicy } from "./policy";
import { sealOver } from "./seals";
import { latestStartUps, sinceTransfer, startUpFacts } from "./start-up";
import { cellsOf } from "./strips";

/** What the customer sees: facts of this one case, no more of the workshop's people than who approved. */
export async function summaryByToken(token: string): Promise<SummaryView | null> {
  const share = await openShare(token);
  const found = share && (await Case.findByPk(share.caseId));
  const customer = found && (await Customer.findByPk(found.customerId));
  if (!share || !found || !customer) return null;
  const drives = await Drive.findAll({ where: { caseId: found.id }, order: ["position"] });
  const { records } = await chipRecords(drives.map((d) => d.id));
  const [who, policy] = [await people(), await currentPolicy()];
  const needed = records.filter((r) => r.chip.needsTransfer);
  const words = await summaryFacts(found.id, drives, records, policy);
  const sent = new Map(await Promise.all(drives.map(async (drive) => [drive.id, await sentEntry(drive.id, share.id)] as const)));
  return {
    workshop: env().workshop, caseRef: found.ref, customerName: customer.name, madeAt: share.createdAt.toISOString(), expiresAt: share.expiresAt.toISOString(),
    drives: await Promise.all(drives.map(async (drive) => ({
      letter: driveLetter(drive), label: driveLabel(drive),
      chips: await Promise.all(needed.filter((r) => r.drive.id === drive.id).map((record) => chipOf(record, policy, who))),
      startUp: words.drives.find((d) => d.letter === driveLetter(drive))?.startUp ?? null,
      head: await headAt(drive.id, sent.get(drive.id)),
    }))),
    comesBack: words.comesBack,
    seal: await sealOf([...sent.values()].find((entry) => entry !== undefined)),
    twoPersonRule: words.twoPersonRule,
  };
}

/** What page, PDF and mail say in words: of the chips that need transfer, the test and what comes back. */
export async function summaryFacts(caseId: string, drives: readonly Drive[], records: readonly ChipRecord[], policy: Policy, tx?: Transaction): Promise<Summary> {
  const tests = await latestStartUps(drives.map((d) => d.id), tx);
  const returned = await CaseReturn.findOne({ where: { caseId }, transaction: tx });
  return {
    drives: drives.map((drive) => {
      const mine = records.filter((r) => r.drive.id === drive.id);
      const test = sinceTransfer(tests.get(drive.id), mine);
      return { letter: driveLetter(drive), chips: mine.filter((r) => r.chip.needsTransfer).map((record) => chipFacts(record, policy).words), startUp: test && { ...startUpFacts(test), at: test.at.toISOString() } };
    }),
    twoPersonRule: policy.twoPersonRule && records.every((r) => r.approvals.every((a) => a.twoPersonRule)),
    comesBack: returned ? { items: itemsOf(returned), at: returned.at.toISOString() } : { items: await expectedItems(caseId, tx), at: null },
  };
}

function chipFacts(record: ChipRecord, policy: Policy) {
  const { state, label } = deriveChipState(stateFacts(record, policy));
  const transfer = record.transfers.at(-1) ?? null;
  const approval = transfer ? record.approvals.find((a) => a.id === transfer.approvalId) ?? null : record.standing;
  const equals = (read: Read) => read.counted && approval !== null && read.sha256.equals(approval.sha256);
  const agreeing = record.before.filter(equals);
  const backs = transfer ? record.backs.filter((r) => r.transferId === transfer.id && equals(r)) : [];
  const words: SummaryChip = {
    designator: record.chip.designator, verified: state === "verified", agreeingReads: agreeing.length, seatings: new Set(agreeing.map((r) => r.seating)).size,
    composite: compositeBehind(record, approval?.sha256.toString("hex") ?? null), readBacks: backs.length, readBy: [...new Set(agreeing.flatMap((r) => r.method ?? []))],
    writtenWith: transfer ? [transfer.programmer, transfer.toolVersion, transfer.adapter].filter(Boolean).join(", ") || null : null,
    approvedAt: approval?.givenAt.toISOString() ?? null, transferredAt: transfer?.at.toISOString() ?? null, transferKind: transfer?.kind ?? null,
    verifiedAt: state === "verified" ? verifiedAt(backs, policy) : null,
  };
  return { words, label, approval, image: agreeing.at(0) ?? null };
}

async function chipOf(record: ChipRecord, policy: Policy, who: People): Promise<SummaryView["drives"][number]["chips"][number]> {
  const { words, label, approval, image } = chipFacts(record, policy);
  const sha256 = approval?.sha256.toString("hex") ?? null;
  return {
    ...words, composite: compositeBehind(record, sha256), readBy: [...words.readBy], holds: record.chip.holds ?? null, sizeBytes: record.chip.sizeBytes, stateLabel: label,
    sha256, crc32: image ? crc32Hex(image.crc32) : null, approvedBy: approval ? who(approval.approvedBy).name : null,
    cells: sha256 && image && !record.unsound.has(sha256) ? await cellsOf(sha256, image.sizeBytes, 0, Math.max(image.sizeBytes, record.chip.sizeBytes)) : null,
  };
}

/** When the read-back came that made the policy's number of read-backs and seatings full. */
function verifiedAt(backs: Read[], policy: Policy): string | null {
  const inOrder = [...backs].sort((a, b) => a.storedAt.getTime() - b.storedAt.getTime());
  const last = inOrder.find((_, i) => i + 1 >= policy.readBacks && new Set(inOrder.slice(0, i + 1).map((r) => r.seating)).size >= policy.readBackSeatings) ?? inOrder.at(-1);
  return last?.storedAt.toISOString() ?? null;
}

/** The entry that says that the mail with this link went out. */
async function sentEntry(driveId: string, shareId: string): Promise<CustodyEntry | undefined> {
  const sent = await CustodyEntry.findAll({ where: { chainId: driveId, action: "summary.sent" }, order: ["seq"] });
  return sent.find((e) => e.body.includes(`"share":"${shareId}"`));
}

/** The log's head as the mail with this link names it. */
async function headAt(driveId: string, entry: CustodyEntry | undefined): Promise<{ seq: number; hash: string }> {
  if (entry) return { seq: entry.seq, hash: entry.hash.toString("hex") };
  // a drive that was recorded after the mail went out
  const head = await CustodyHead.findByPk(driveId);
  return { seq: head?.seq ?? 0, hash: head?.hash.toString("hex") ?? "0".repeat(64) };
}

/** The seal that was made in the same step: the first one over this very entry. */
async function sealOf(entry: CustodyEntry | undefined): Promise<SummaryView["seal"]> {
  if (!entry) return null;
  return sealOver(entry.hash.toString("hex"), (JSON.parse(entry.body.toString("utf8")) as { at: string }).at);
}
