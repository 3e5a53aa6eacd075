import { countOf, sizeText } from "@/lib/core/quantity";
import type { AsSent } from "@/lib/core/words";
import { code, INK_3, plain, quiet, type Span, strong } from "./ink";
import type { ReportFacts, ReportReceipt, ReportReturn } from "./report-facts";
import { boardName, dayText, driveName, momentText } from "./report-words";
import type { Sheet } from "./sheet";
import { Table } from "./table";

/** The opening, where each chip stands, and chapter 1. */
export function opening(sheet: Sheet, { record }: ReportFacts): void {
  sheet.opening([
    ["Case", code(record.ref, { bold: true, size: 10 })],
    ["For", plain(record.customer.name)],
    ["Received", plain(record.receivedAt ? dayText(record.receivedAt) : "not received yet")],
    ["Bundle made", plain(`${momentText(record.madeAt)} UTC`)],
  ]);
}

export async function whereItStands(sheet: Sheet, { record, drawing }: ReportFacts): Promise<void> {
  const originals = record.drives.flatMap((drive) => drive.boards.filter((board) => board.role === "original").flatMap((board) => board.chips.map((chip) => ({ drive, board, chip }))));
  if (originals.length === 0) {
    sheet.paragraph([plain("No chip of this case is recorded yet.")]);
    return;
  }
  const table = new Table(sheet, [{ head: "Chip", width: 62 }, { head: "Of", width: 150 }, { head: "State", width: 92 }, { head: "What was found, and what comes next", width: 0 }], { name: "Where each chip stands" });
  for (const { drive, board, chip } of originals) {
    const state = drawing.states[chip.id];
    table.row([
      [strong(chip.designator, { face: "mono" })],
      [plain(`${driveName(drive)}, ${boardName(board, true)}`), quiet(`\n${[chip.holds, sizeText(chip.sizeBytes)].filter(Boolean).join(", ")}`, { size: 8.5 })],
      [strong(state?.label ?? "Not judged")], [plain(state?.sentence ?? "")],
    ]);
    await sheet.breathe();
  }
  table.end();
}

export function howToCheck(sheet: Sheet, { record, logKey, seal, twoPersonRule }: ReportFacts): void {
  sheet.heading(1, "What this is and how to check it", { number: "1" });
  sheet.paragraph([plain(
    "This report is for reading. It was made from the record of the case (data/case.json) and the custody logs that lie in the same bundle; they are what counts, and every line here can be found there. "
    + "To check the bundle, run “sh check.sh KEY-FINGERPRINT” in its folder, or drop it on the workshop’s page /verify: both compute every SHA-256 again, follow each log from entry to entry and verify every signature. "
    + "Take the fingerprint from a mail or a summary that you had before, not from this page: whoever could change the bundle could change this page too.",
  )]);
  sheet.facts([
    ["Log key", [code(logKey), quiet("\nSHA-256 of the public key that signs each entry and the bundle’s lists", { size: 8 })]],
    ["Seal", seal && [plain(`Seal ${seal.number}, SHA-256 `), code(seal.sha256), quiet("\nA signed statement of where every log of the workshop stood when the bundle was made", { size: 8 })]],
    ["Seal key", seal && [code(seal.keyFingerprint), quiet("\nSHA-256 of the public key that signs seals", { size: 8 })]],
    ...record.drives.map((drive) => [`Log of ${driveName(drive)}`, [plain(`up to entry ${drive.logUpTo.seq}, hash `), code(drive.logUpTo.hash)]] as const),
    ["Two people", [plain(twoPersonRule ? "Whoever took a read of a chip could not approve its image." : "The two-person rule was switched off: one person could read and approve.")]],
    ["Times", [plain("All times are UTC; sizes are in bytes, KiB (1,024 bytes) or MiB.")]],
  ]);
  sheet.paragraph([
    strong("What the words mean. ", { size: 8.5 }),
    quiet("A “read” is the whole content of a chip, saved as a file: Read 1 of the original, Own 1 of the donor chip’s own content, Back 1 after the transfer. A “seating” is one time the clip or the chip was put on, with a letter of its own. SHA-256 and CRC-32 are check numbers computed from the content: if one bit differed, they would be others. A read that is “set aside” stays on record but decides nothing. A “composite” is derived from several reads that differ: each bit is what most of them say.", { size: 8.5 }),
  ]);
}

type Line = readonly [string, Span[] | null];

const AS_SENT: Record<AsSent, string> = { yes: "as it was sent", no: "not as it was sent", none: "none was there" };

function receiptLines(receipt: ReportReceipt | null): Line[] {
  if (!receipt) return [];
  const { carrier, tracking, sealAsSent, sealNumber, smallBoard, accessories, condition, differs } = receipt;
  return [
    ["Parcel", [plain([condition, carrier && `by ${carrier}`, tracking && `tracking ${tracking}`].filter(Boolean).join("; "))]],
    ["Seal", [plain(`${AS_SENT[sealAsSent]}${sealNumber ? `, number ${sealNumber}` : ""}`)]],
    ["Small board", [plain(smallBoard === "yes" ? "the enclosure came with its small board" : smallBoard === "no" ? "the enclosure’s small board did not come" : "no enclosure")]],
    ["With it", accessories ? [plain(accessories)] : null],
    ["Not as asked", differs ? [plain(differs)] : null],
  ];
}

function returnLines(returned: ReportReturn | null): Line[] {
  if (!returned) return [];
  const { at, by, to, items, carrier, tracking, sealNumber, note } = returned;
  const way = [carrier && `by ${carrier}`, tracking && `tracking ${tracking}`, sealNumber && `seal ${sealNumber}`].filter(Boolean).join(", ");
  return [["Returned", [plain(`${momentText(at)}, to ${to}${way ? `, ${way}` : ""}; sent by ${by}`), quiet(`\n${items.join("; ")}${note ? `. ${note}` : ""}`, { size: 8.5 })]]];
}

export function parties(sheet: Sheet, { record, logs }: ReportFacts): void {
  sheet.heading(1, "Parties", { number: "2" });
  const { customer } = record;
  sheet.facts([
    ["Customer", [strong(customer.name)]],
    ["E-mail", [plain(customer.email)]],
    ["Phone", customer.phone ? [plain(customer.phone)] : null],
    ["Contact", customer.contact ? [plain(customer.contact)] : null],
    ["Workshop", [strong(record.workshop)]],
    ["Requested", record.requestedAt ? [plain(momentText(record.requestedAt))] : null],
    ["Received", [plain(`${record.receivedAt ? momentText(record.receivedAt) : "not yet"}${record.recordedBy ? `, recorded by ${record.recordedBy.name}` : ""}`)]],
    ...receiptLines(record.receipt ?? null),
    ["Damage", [plain(record.damage)]],
    ["Note", record.note ? [plain(record.note)] : null],
    ["Due", record.dueOn ? [plain(dayText(record.dueOn))] : null],
    ...returnLines(record.returned ?? null),
    ["Closed", record.closedAt ? [plain(`${momentText(record.closedAt)}${record.closedReason ? `: ${record.closedReason}` : ""}`)] : null],
  ]);
  const people = new Map<string, { name: string; role: string; entries: number; first: string; last: string }>();
  for (const entry of logs.flat()) {
    const role = entry.role === "system" ? "the program itself" : entry.role;
    const key = `${role}:${entry.who}`;
    const known = people.get(key) ?? { name: entry.who, role, entries: 0, first: entry.at, last: entry.at };
    known.entries += 1;
    if (entry.at < known.first) known.first = entry.at;
    if (entry.at > known.last) known.last = entry.at;
    people.set(key, known);
  }
  sheet.heading(3, "Who acted, as the logs say");
  const table = new Table(sheet, [{ head: "Name", width: 130 }, { head: "Role", width: 96 }, { head: "Entries", width: 50, align: "right" }, { head: "First, UTC", width: 118 }, { head: "Last, UTC", width: 0 }], { name: "Who acted" });
  for (const one of people.values()) table.row([[plain(one.name)], [plain(one.role)], [plain(String(one.entries))], [plain(momentText(one.first))], [plain(momentText(one.last))]]);
  table.end();
  sheet.paragraph([quiet(`Policy when the bundle was made: at least ${countOf(record.policy.reads, "agreeing read")} from ${countOf(record.policy.seatings, "seating")}, then ${countOf(record.policy.readBacks, "equal read-back")} from ${countOf(record.policy.readBackSeatings, "seating")}.`, { size: 8.5, color: INK_3 })]);
}

