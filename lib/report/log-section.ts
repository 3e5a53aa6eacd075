import { readName, type Stage } from "@/lib/core/words";
import { code, COPPER, plain, quiet, strong, TRACE, INK_3 } from "./ink";
import { drawVia } from "./marks";
import type { ReportEntry, ReportFacts } from "./report-facts";
import { driveName, momentText, shortHash } from "./report-words";
import { LEFT, type Sheet } from "./sheet";
import { Table } from "./table";

/** Actions that chapter 5 lists: images that left, and things that went from hand to hand. */
export const LISTED: readonly string[] = ["image.handed-out", "item.handed-over", "item.received"];

const text = (value: unknown) => (typeof value === "string" ? value : "");

function imageLeft(facts: Record<string, unknown>): { what: string; to: string; sha256: string } {
  const read = facts.read as { stage: Stage; number: number } | undefined;
  const chip = facts.chip as { designator: string } | undefined;
  const to = facts.to as { name: string } | undefined;
  return { what: [read && readName(read.stage, read.number), chip && `of ${chip.designator}`].filter(Boolean).join(" "), to: to?.name ?? "", sha256: text(facts.sha256) };
}

/** Chapter 5. */
export async function handOuts(sheet: Sheet, { record, logs }: ReportFacts): Promise<void> {
  sheet.heading(1, "Hand-outs", { number: "5" });
  const listed = logs.flatMap((log, i) => log.filter((entry) => entry.facts !== null).map((entry) => ({ entry, drive: record.drives[i] })));
  const images = listed.filter(({ entry }) => entry.action === "image.handed-out");
  const items = listed.filter(({ entry }) => entry.action !== "image.handed-out");
  sheet.paragraph([plain(images.length === 0 ? "No image of this case was handed out by itself." : "An image that leaves the house is recorded before its first byte does.")]);
  if (images.length > 0) {
    const table = new Table(sheet, [{ head: "Time, UTC", width: 112 }, { head: "What", width: 104 }, { head: "By, to", width: 130 }, { head: "For what", width: 0 }], { name: "Images handed out" });
    for (const { entry, drive } of images) {
      const out = imageLeft(entry.facts ?? {});
      const reason = text(entry.facts?.reason);
      table.row([[plain(momentText(entry.at), { size: 8.5 })], [plain(`${out.what}, ${driveName(drive)}`)], [plain(`${entry.who}, to ${out.to}`)], [plain(`${text(entry.facts?.purpose)}${reason ? `: ${reason}` : ""}`)]], { keep: 18 });
      table.below((cell) => sheet.paragraph([quiet("SHA-256 ", { size: 8 }), code(out.sha256)], { x: LEFT + 14, element: cell, type: "TD" }));
      await sheet.breathe();
    }
    table.end();
  }
  if (items.length === 0) return;
  sheet.heading(3, "From hand to hand");
  const table = new Table(sheet, [{ head: "Time", width: 104 }, { head: "Drive", width: 52 }, { head: "What happened", width: 0 }], { name: "Hand-overs" });
  for (const { entry, drive } of items) {
    table.row([[plain(momentText(entry.at), { size: 8.5 })], [plain(driveName(drive))], [plain(entry.sentence)]]);
    await sheet.breathe();
  }
  table.end();
}

const TRACE_AT = LEFT + 6;

/** Chapter 6: every entry up to the head that left with the bundle. */
export async function custodyLogs(sheet: Sheet, { record, logs }: ReportFacts): Promise<void> {
  sheet.heading(1, record.drives.length === 1 ? "The custody log" : "The custody logs", { number: "6" });
  sheet.paragraph([plain("Each entry carries the SHA-256 of the one before and is signed. A ring is an entry, a square says that something differed, a full disc that something was signed or verified, a thin ring that something was set aside. Hashes are short here; data/drives/N/custody.jsonl has each entry in full.")]);
  for (const [i, drive] of record.drives.entries()) {
    const log = logs[i] ?? [];
    sheet.heading(2, `${driveName(drive)}: ${log.length} ${log.length === 1 ? "entry" : "entries"}`, { number: `6.${i + 1}`, keep: 80 });
    const table = new Table(sheet, [{ head: "", width: 18 }, { head: "No.", width: 36, align: "right" }, { head: "Time, UTC", width: 66 }, { head: "Who", width: 86 }, { head: "What happened", width: 212 }, { head: "Hash", width: 0 }], { name: `Custody log of ${driveName(drive)}` });
    for (const [at, entry] of log.entries()) {
      table.row(cellsOf(entry), { beside: (top, bottom, first) => via(sheet, entry, { top, bottom, first, begins: at === 0, ends: at === log.length - 1 }) });
      await sheet.breathe();
    }
    table.end();
    sheet.paragraph([strong(`Head of ${driveName(drive)}: entry ${drive.logUpTo.seq}, `, { color: COPPER }), code(drive.logUpTo.hash)]);
  }
}

function cellsOf(entry: ReportEntry) {
  const size = 8.5;
  const [day, clock] = momentText(entry.at).split(", ");
  const said = entry.kind === "signed" ? strong(entry.sentence, { size }) : plain(entry.sentence, { size, ...(entry.kind === "set-aside" ? { color: INK_3 } : {}) });
  return [
    [], [plain(String(entry.seq), { size })], [plain(`${day}\n${clock ?? ""}`, { size: 8 })],
    [plain(entry.who, { size }), ...(entry.role === "system" ? [] : [quiet(`, ${entry.role}`, { size: 8 })])],
    [said], [code(shortHash(entry.hash), { size: 7.5, color: INK_3 })],
  ];
}

function via(sheet: Sheet, entry: ReportEntry, { top, bottom, first, begins, ends }: { top: number; bottom: number; first: boolean; begins: boolean; ends: boolean }): void {
  const middle = top + 9;
  const from = begins && first ? middle : top;
  const to = ends ? Math.max(from, first ? middle : top) : bottom;
  if (to > from) sheet.doc.moveTo(TRACE_AT, from).lineTo(TRACE_AT, to).lineWidth(1.6).stroke(TRACE);
  if (first) drawVia(sheet.doc, entry.kind, TRACE_AT, middle);
}
