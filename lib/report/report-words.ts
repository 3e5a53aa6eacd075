import type { Bus, Finding, Method, Role, SizeSource } from "@/lib/core/words";
import type { MarkKind } from "./marks";
import type { ReportBoard, ReportChip, ReportDrive, ReportErased, ReportRead } from "./report-facts";
import { sizeText } from "@/lib/core/quantity";

const MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

/** "12 Mar 2026, 13:48:05", always UTC, read from the text itself. */
export function momentText(iso: string): string {
  const found = /^(\d{4})-(\d\d)-(\d\d)T(\d\d:\d\d:\d\d)/.exec(iso);
  return found ? `${Number(found[3])} ${MONTHS[Number(found[2]) - 1]} ${found[1]}, ${found[4]}` : iso;
}

export function dayText(iso: string): string {
  return momentText(`${iso.slice(0, 10)}T00:00:00`).split(",")[0];
}

/** First 8, ellipsis, last 8. */
export function shortHash(hash: string): string {
  return `${hash.slice(0, 8)}…${hash.slice(-8)}`;
}

const BUS: Record<Bus, string> = { spi: "SPI", i2c: "I2C", microwire: "Microwire", other: "another bus" };
const SIZE_FROM: Record<SizeSource, string> = {
  marking: "taken from the marking", id: "taken from the chip’s identification bytes", sfdp: "taken from the chip’s own parameter table (SFDP)", typed: "typed in",
};
const METHOD: Record<Method, string> = { "in-place": "clip on the board", lifted: "chip lifted", socket: "chip in a socket" };
export const ROLE: Record<Role | "system", string> = { technician: "technician", lead: "lead", auditor: "auditor", admin: "admin", system: "the program itself" };
const FORMAT: Record<ReportRead["format"], string> = { raw: "raw image", "intel-hex": "Intel HEX text", "s-record": "S-record text" };
export const FIT: Record<NonNullable<ReportBoard["fit"]>["verdict"], { mark: MarkKind; text: string }> = {
  fits: { mark: "ok", text: "Fits: same board number." },
  caution: { mark: "caution", text: "Same board number, but look first." },
  "other-number": { mark: "block", text: "Another board number than the original’s." },
};

export function supplyText(millivolts: number | "unknown" | null): string {
  return typeof millivolts === "number" ? `${millivolts / 1000} V` : "supply unknown";
}

/** "SPI, 512 KiB (taken from the marking), SOIC-8, 3.3 V" */
export function chipKind(chip: ReportChip): string {
  return [BUS[chip.bus], `${sizeText(chip.sizeBytes)} (${SIZE_FROM[chip.sizeSource]})`, chip.package, supplyText(chip.supplyMillivolts)].filter(Boolean).join(", ");
}

/** "Donor board 1, BX 40-3179 rev C"; with a small letter inside a sentence. */
export function boardName(board: ReportBoard, inside = false): string {
  const which = board.role === "original" ? "original board" : `donor board ${board.label.replace(/^donor-/, "")}`;
  return `${inside ? which : which.charAt(0).toUpperCase() + which.slice(1)}, ${[board.boardNumber, board.revision].filter(Boolean).join(" ")}`;
}

export const driveName = (drive: ReportDrive) => `Drive ${drive.letter}`;

/** How a read came about, in one line. */
export function originText(read: ReportRead): string {
  if (read.derived) return `Derived, not read: made by ${read.derived.method}`;
  return [
    `Reader ${read.reader}`, read.toolVersion, read.adapter && `adapter ${read.adapter}`, read.method && METHOD[read.method], supplyText(read.supplyMillivolts),
    read.clockKilohertz === null ? null : `clock ${read.clockKilohertz} kHz`,
    read.controllerHeld === null ? null : read.controllerHeld ? "controller held in reset" : "controller not held in reset",
    FORMAT[read.format],
  ].filter(Boolean).join(", ");
}

export function findingMark(finding: Finding): MarkKind {
  if (finding.code === "verified") return "ok";
  return finding.severity === "blocks" ? "block" : finding.severity === "reason" ? "caution" : "note";
}

export function severityWord(finding: Finding): string {
  if (finding.code === "verified") return "In order";
  return finding.severity === "blocks" ? "Stands in the way" : finding.severity === "reason" ? "Needs a written reason" : "Good to know";
}

/** "Measured 99.1 %, threshold 98.5 %." or nothing. */
export function measuredText({ measured, threshold }: Finding): string {
  if (!measured && !threshold) return "";
  return ` Measured: ${measured ?? "not stated"}${threshold ? `; threshold: ${threshold}` : ""}.`;
}

const CAUSE: Record<string, string> = {
  lead: "by a lead", "differing-read": "a read that differs came in", "below-policy": "too few agreeing reads were left", "size-changed": "the chip’s size was corrected",
  "pair-changed": "another donor chip was paired", "image-damaged": "the stored image was damaged or missing", "approver-took-read": "the approver had taken a read",
};
export const causeText = (cause: string) => CAUSE[cause] ?? cause.replaceAll("-", " ");

/** "3 Mar 2027, 09:14, at the customer’s wish" */
export const erasedText = ({ at, cause }: ReportErased): string => `${momentText(at)} UTC, ${cause === "asked-for" ? "at the customer’s wish" : "when its keeping time was over"}`;
