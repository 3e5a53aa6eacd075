import { driveLetter } from "@/lib/commands/place";
import { deriveChipState } from "@/lib/core/chip-state";
import { crc32Hex } from "@/lib/core/digest";
import { driveLabel } from "@/lib/core/drive-label";
import type { Policy } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { SummaryView } from "@/lib/views";
import { Case, Customer, CustodyEntry, CustodyHead, Drive, type Read } from "@/models";
import { stateFacts } from "./chip-facts";
import { type ChipRecord, chipRecords } from "./chip-records";
import { compositeBehind } from "./composite-behind";
import { openShare } from "./open-share";
import { people, type People } from "./people";
import { currentPolicy } from "./policy";
import { sealOver } from "./seals";
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
  const sent = new Map(await Promise.all(drives.map(async (drive) => [drive.id, await sentEntry(drive.id, share.id)] as const)));
  return {
    workshop: env().workshop, caseRef: found.ref, customerName: customer.name, madeAt: share.createdAt.toISOString(), expiresAt: share.expiresAt.toISOString(),
    drives: await Promise.all(drives.map(async (drive) => ({
      letter: driveLetter(drive), label: driveLabel(drive),
      chips: await Promise.all(needed.filter((r) => r.drive.id === drive.id).map((record) => chipOf(record, policy, who))),
      head: await headAt(drive.id, sent.get(drive.id)),
    }))),
    seal: await sealOf([...sent.values()].find((entry) => entry !== undefined)),
    twoPersonRule: policy.twoPersonRule && records.every((r) => r.approvals.every((a) => a.twoPersonRule)),
  };
}

async function chipOf(record: ChipRecord, policy: Policy, who: People): Promise<SummaryView["drives"][number]["chips"][number]> {
  const { state, label } = deriveChipState(stateFacts(record, policy));
  const transfer = record.transfers.at(-1) ?? null;
  const approval = transfer ? record.approvals.find((a) => a.id === transfer.approvalId) ?? null : record.standing;
  const equals = (read: Read) => read.counted && approval !== null && read.sha256.equals(approval.sha256);
  const agreeing = record.before.filter(equals);
  const backs = transfer ? record.backs.filter((r) => r.transferId === transfer.id && equals(r)) : [];
  const image = agreeing.at(0) ?? null;
  const sha256 = approval?.sha256.toString("hex") ?? null;
  return {
    designator: record.chip.designator, holds: record.chip.holds ?? null, sizeBytes: record.chip.sizeBytes, verified: state === "verified", stateLabel: label,
    sha256, crc32: image ? crc32Hex(image.crc32) : null, agreeingReads: agreeing.length, seatings: new Set(agreeing.map((r) => r.seating)).size,
    composite: compositeBehind(record, sha256), readBacks: backs.length,
    approvedBy: approval ? who(approval.approvedBy).name : null, approvedAt: approval?.givenAt.toISOString() ?? null,
    transferredAt: transfer?.at.toISOString() ?? null, transferKind: transfer?.kind ?? null, verifiedAt: state === "verified" ? verifiedAt(backs, policy) : null,
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
