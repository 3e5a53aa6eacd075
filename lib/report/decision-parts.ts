import type { FindingCode } from "@/lib/core/words";
import { code, plain, quiet, strong } from "./ink";
import type { ReportApproval, ReportCase, ReportChip } from "./report-facts";
import { boardName, causeText, momentText } from "./report-words";
import { LEFT, type Sheet } from "./sheet";

function chipName(record: ReportCase, id: string): string {
  for (const drive of record.drives) {
    for (const board of drive.boards) {
      const chip = board.chips.find((one) => one.id === id);
      if (chip) return `${chip.designator} of ${boardName(board, true)}`;
    }
  }
  return `a chip with the id ${id}`;
}

export function requestParts(sheet: Sheet, chip: ReportChip): void {
  if (chip.approvalRequests.length === 0) return;
  sheet.heading(3, chip.approvalRequests.length === 1 ? "Approval asked for" : "Approvals asked for");
  for (const one of chip.approvalRequests) {
    sheet.paragraph([plain(`${one.askedBy.name}, ${momentText(one.askedAt)}${one.message ? `: ${one.message}` : ""}`)], { mark: "dash", gap: 2 });
    if (one.sentBack) sheet.paragraph([plain(`Sent back by ${one.sentBack.by.name}, ${momentText(one.sentBack.at)}${one.sentBack.reason ? `: ${one.sentBack.reason}` : ""}`)], { mark: "aside" });
  }
  sheet.space(4);
}

/** The sentence behind a finding's code, as it stood on a read of the chip. */
function answered(chip: ReportChip, of: string): string {
  const finding = chip.reads.flatMap((read) => read.findings).find((one) => one.code === (of as FindingCode));
  if (finding) return finding.message;
  return of === "one-seating" ? "All agreeing reads come from one seating." : `${of.replaceAll("-", " ")}.`;
}

export async function approvalParts(sheet: Sheet, record: ReportCase, chip: ReportChip): Promise<void> {
  if (chip.approvals.length === 0) return;
  sheet.heading(3, chip.approvals.length === 1 ? "Approval" : "Approvals", { keep: 90 });
  for (const approval of chip.approvals) {
    const holders = chip.reads.filter((read) => read.stage === "before" && read.sha256 === approval.sha256);
    sheet.paragraph([
      strong(`Approved by ${approval.approvedBy.name}, ${momentText(approval.givenAt)}. `),
      plain(`Cleared for writing to donor chip ${chipName(record, approval.donorChip)}.`),
    ], { mark: approval.revoked ? "aside" : "ok", gap: 2 });
    sheet.facts([
      ["Image", [code(approval.sha256), plain(approval.crc32 ? `\nCRC-32 ${approval.crc32.toUpperCase()}` : ""), plain(holders.length > 0 ? `, held by ${holders.map((read) => read.name).join(", ")}` : "")]],
      ["Derived", approval.composite ? [strong(`This image is ${approval.composite}, a composite: `), plain("nothing read it as a whole; each bit is what most of several reads say.")] : null],
      ["Statement", [plain(`“${approval.statement}”`)]],
      ...Object.entries(approval.reasons).map(([of, text], i) => [i === 0 ? "Reasons" : "", [plain(`${answered(chip, of)} `), strong(text)]] as const),
      ["Two people", [plain(twoPeople(approval))]],
      ["Revoked", approval.revoked ? [strong(`${momentText(approval.revoked.at)} by ${approval.revoked.by.name}`), plain(revokedText(approval.revoked))] : null],
    ], { x: LEFT + 13 });
    await sheet.breathe();
  }
}

function twoPeople({ twoPersonRule }: ReportApproval): string {
  return twoPersonRule ? "The rule was in force: whoever took a read of this chip could not approve its image." : "The rule was switched off: one person could read and approve.";
}

function revokedText({ cause, reason }: NonNullable<ReportApproval["revoked"]>): string {
  return `${cause ? ` (${causeText(cause)})` : ""}${reason ? `: ${reason}` : ""}`;
}

export async function transferParts(sheet: Sheet, record: ReportCase, chip: ReportChip): Promise<void> {
  if (chip.transfers.length === 0) return;
  sheet.heading(3, chip.transfers.length === 1 ? "Transfer" : "Transfers");
  for (const transfer of chip.transfers) {
    const approved = chip.approvals.find((one) => one.id === transfer.approval);
    const done = transfer.kind === "write" ? `The approved image was written to donor chip ${chipName(record, transfer.donorChip)}.` : `The chip itself was moved to the place of ${chipName(record, transfer.donorChip)}; the approved image is the safety copy.`;
    const tools = [transfer.programmer && `programmer ${transfer.programmer}`, transfer.toolVersion, transfer.adapter && `adapter ${transfer.adapter}`].filter(Boolean).join(", ");
    sheet.paragraph([strong(`${momentText(transfer.at)}, ${transfer.by.name}. `), plain(done), plain(tools ? ` With ${tools}.` : ""), plain(transfer.note ? ` “${transfer.note}”` : "")], { mark: "dash", gap: 1.5 });
    if (approved) sheet.paragraph([quiet("SHA-256 ", { size: 8 }), code(approved.sha256)], { x: LEFT + 13 });
    await sheet.breathe();
  }
}
