import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, expect, it } from "vitest";
import { makeSummary } from "@/lib/report/make-summary";
import type { SummaryView } from "@/lib/views";

const folder = mkdtempSync(path.join(tmpdir(), "summary-pdf-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

type Chip = SummaryView["drives"][number]["chips"][number];
const cells = Array.from({ length: 256 }, (_, i) => "doodttzb"[Math.floor(i / 5) % 8]).join("");
const chip = (designator: string, more: Partial<Chip> = {}): Chip => ({
  designator, holds: "Adaptive data", sizeBytes: 524_288, verified: true, stateLabel: "Verified", sha256: "4f9a".repeat(16), crc32: "0dff38c8", agreeingReads: 3, seatings: 2, composite: null, readBacks: 2,
  approvedBy: "Ines Corvo", approvedAt: "2026-03-12T13:00:00Z", transferredAt: "2026-03-13T08:00:00Z", transferKind: "write", readBy: ["in-place"], writtenWith: "R2 programmer, 1.4.2, SOIC clip", verifiedAt: "2026-03-13T09:00:00Z", cells, ...more,
});
const summary = (chips: Chip[]): SummaryView => ({
  workshop: "Alder Lane Drive Bench", caseRef: "26-0183", customerName: "Harrow & Finch Surveyors", madeAt: "2026-03-16T10:00:00Z", expiresAt: "2026-06-14T10:00:00Z",
  drives: [{ letter: "A", label: "M2 4 TB, PN 4471-0093-B, serial WX41A77203", chips, startUp: { spins: true, ready: true, reportedSerial: "WX41A77203", serialMatches: true, attempts: 2, at: "2026-03-14T09:00:00Z" }, head: { seq: 42, hash: "c0de".repeat(16) } }],
  twoPersonRule: true, seal: { number: 7, sha256: "e1f2".repeat(16), keyId: "12ab".repeat(16) },
  comesBack: { items: ["Drive A, PN 4471-0093-B, serial WX41A77203", "Donor board fitted to Drive A, BX 40-3179 rev C", "Original board, BX 40-3179 rev C, without U3", "Removed donor chip U3", "Enclosure with its small board", "power supply", "USB cable"], at: "2026-03-15T09:00:00Z" },
});

function textOf(pdf: Buffer): { pages: number; text: string } {
  const file = path.join(folder, "summary.pdf");
  writeFileSync(file, pdf);
  const pages = Number(/Pages:\s+(\d+)/.exec(execFileSync("pdfinfo", [file], { encoding: "utf8" }))![1]);
  return { pages, text: execFileSync("pdftotext", ["-layout", file, "-"], { encoding: "utf8" }).replace(/\s+/g, " ") };
}

it("puts one drive with two chips on one A4 page, with every number whole", async () => {
  const link = `https://bench.example/summary/${"A".repeat(43)}`;
  const { pages, text } = textOf(await makeSummary(summary([chip("U12"), chip("U3", { transferKind: "chip-moved", readBy: ["in-place", "lifted"] })]), link, "Europe/Lisbon"));
  expect(pages).toBe(1);
  for (const said of [
    "4f9a".repeat(16), "c0de".repeat(16), "e1f2".repeat(16), link, "0DFF38C8", "on the board, with a clip and lifted off the board", "We wrote the image of U12 to the donor board (with R2 programmer, 1.4.2, SOIC clip)",
    "We took U3 off your board", "it spins, gets ready and reports the serial of its label", "Original board, BX 40-3179 rev C, without U3", "That the drive will keep starting, or that your files can be read",
  ]) expect(text).toContain(said);
});

it("says how far a chip is that is not verified, and shows no read-back of it", async () => {
  const { text } = textOf(await makeSummary(summary([chip("U12", { verified: false, stateLabel: "To read back", verifiedAt: null, readBacks: 0 })]), "https://bench.example/summary/x", "UTC"));
  expect(text).toContain("not verified yet");
  expect(text).toContain("Adaptive data, 512 KiB: To read back");
  expect(text).not.toContain("Read back from it");
});
