import { createHash } from "node:crypto";
import { describe } from "@/lib/core/custody-actions";
import { compareImages } from "@/lib/core/compare";
import { crc32Hex, crc32Of } from "@/lib/core/digest";
import { inspectWhole } from "@/lib/core/inspect";
import { DEFAULT_POLICY, type Finding, readName } from "@/lib/core/words";
import type { ReportChip, ReportEntry, ReportFacts, ReportRead } from "@/lib/report/report-facts";
import { allStacks, laneKey } from "@/lib/report/stacks";
import type { PersonView } from "@/lib/views";
import { likeFirmware } from "./firmware";

/** A case as plain data, with real images behind its digests: what a report is made from, without a database. */
const sha = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex");
/** Repeatable bytes that look like firmware, without the commands that factory.ts brings along. */
const firmware = (seed: string, length: number) => likeFirmware(Buffer.concat(Array.from({ length: Math.ceil(length / 32) }, (_, i) => createHash("sha256").update(`${seed} ${i}`).digest())).subarray(0, length));
const uuid = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, "0")}`;
const at = (minute: number) => new Date(Date.UTC(2026, 2, 12, 9, 0, 5) + minute * 60_000).toISOString();

export const MIRA: PersonView = { id: uuid(1), name: "Mira Hollis", role: "technician" };
export const INES: PersonView = { id: uuid(2), name: "Ines Okafor", role: "lead" };
const SIZE = 524_288;

export interface CaseShape {
  reads?: number;
  entries?: number;
  fileName?: string;
  designator?: string;
  text?: string;
}

export const LOST_CONTACT: Finding = {
  code: "lost-contact", severity: "blocks", message: "214 bytes differ from Read 1, all in 0x1F000–0x1FFFF: looks like lost contact.", advice: "Re-seat the clip and read again.", measured: "214 bytes", threshold: "1 byte",
};
export const ONE_SIDED: Finding = {
  code: "nearly-blank", severity: "reason", message: "99.3 % of the image is FF.", advice: "Look at the chip’s size and marking, then say in writing why it may be approved.", measured: "99.3 %", threshold: "99.9 %",
};

export function madeCase({ reads = 4, entries = 30, fileName = "u12 first try.bin", designator = "U12", text = "Three clean reads." }: CaseShape = {}): ReportFacts {
  const image = firmware("report", SIZE);
  image.fill(0xff, 360_448, 425_984);
  image.fill(0x00, 163_840, 196_608);
  image.write("Twinread text ".repeat(3000), 49_152);
  const odd = Buffer.from(image);
  for (let i = 0; i < 214; i += 1) odd[0x1f000 + i * 19] ^= 0xff;
  const images = new Map([image, odd].map((bytes) => [sha(bytes), bytes]));
  const donorImage = firmware("donor", SIZE);
  images.set(sha(donorImage), donorImage);

  const read = (n: number, stage: ReportRead["stage"], bytes: Buffer, more: Partial<ReportRead> = {}): ReportRead => ({
    name: readName(stage, n), path: `data/drives/1/original-U12/${stage}-${n}.bin`, id: uuid(1000 + n + ({ before: 0, donor: 3000, after: 6000 })[stage]), number: n, stage, seating: 1 + Math.floor(n / 3), sizeBytes: bytes.length,
    crc32: crc32Hex(crc32Of(bytes)), sha256: sha(bytes), counted: true, findings: [], originalFileName: fileName, format: "raw", reader: "Bench reader R2", method: "in-place", toolVersion: "2.11", adapter: "SOIC-8 clip",
    supplyMillivolts: 3300, clockKilohertz: 8000, controllerHeld: true, note: null, operator: MIRA, takenAt: at(n), modifiedAt: null, storedAt: at(n + 1), transferId: null, setAside: null, source: null, derived: null, ...more,
  });
  const before = Array.from({ length: reads }, (_, i) => (i === 1
    ? read(2, "before", odd, { counted: false, setAside: { reason: "The clip sat badly", by: MIRA, at: at(8) }, findings: [LOST_CONTACT] })
    : read(i + 1, "before", image, { findings: i === 2 ? [ONE_SIDED] : [] })));
  before.push(read(reads + 1, "before", odd, {
    counted: false, setAside: { reason: "The plain reads agree", by: INES, at: at(9) }, findings: [],
    derived: { method: "bit majority, n=3", voters: [1, 2, 3], excluded: [], disputedBytes: 214, weak: 3, constructed: 1, limit: "A majority shows what repeats, not what is true." },
  }));
  const chip = (id: number, more: Partial<ReportChip>): ReportChip => ({
    designator, id: uuid(id), bus: "spi", sizeBytes: SIZE, sizeSource: "marking", supplyMillivolts: 3300, package: "SOIC-8", marking: "MX 25-40", holds: "firmware and adaptive values", needsTransfer: true, pairedWith: null,
    recordedAt: at(0), reads: [], approvalRequests: [], approvals: [], transfers: [], ...more,
  });
  const board = { revision: "rev C", controllerMarking: "C7-2210", motorDriverMarking: "SMD-88", condition: "burnt at the connector", recordedAt: at(0) };
  const original = chip(10, {
    reads: before,
    approvalRequests: [{ id: uuid(30), askedBy: MIRA, askedAt: at(10), message: "Please look at Read 2.", sentBack: null }],
    approvals: [{
      id: uuid(31), sha256: sha(image), crc32: crc32Hex(crc32Of(image)), composite: null, donorChip: uuid(11), approvedBy: INES, givenAt: at(12), statement: text,
      reasons: { "nearly-blank": "This family keeps its parameters in few bytes." }, twoPersonRule: true, revoked: null,
    }],
    transfers: [{ id: uuid(32), approval: uuid(31), kind: "write", donorChip: uuid(11), programmer: "P1", toolVersion: "4.0", adapter: null, note: null, by: MIRA, at: at(15) }],
  });
  const backs = [1, 2].map((n) => read(n, "after", image, { transferId: uuid(32), findings: [{ code: "verified", severity: "note", message: "Equals the approved image in all 524,288 bytes.", advice: "" }] }));
  const donor = chip(11, { pairedWith: uuid(10), reads: [read(1, "donor", donorImage), read(2, "donor", donorImage), ...backs] });

  const log = logOf(entries, sha(image), text);
  const record: ReportFacts["record"] = {
    workshop: "Halden Street Data Workshop", madeAt: at(60), policy: DEFAULT_POLICY, ref: "26-0183", id: uuid(40), receivedAt: at(0), recordedBy: MIRA, damage: "Power surge; smell of burning at the connector", note: text, dueOn: "2026-03-20",
    closedAt: null, closedReason: null,
    receipt: { at: at(0), by: MIRA.name, condition: "One corner crushed, padding whole", carrier: "Marsh Post", tracking: "MP 7781 20", sealAsSent: "no", sealNumber: "S-90211", smallBoard: "yes", accessories: "a cable", differs: "Serial number is not so: 9KQ3-70BB-D2." },
    returned: { at: at(50), by: INES.name, to: "Lindmoor Veterinary Practice", items: ["Drive A", "Original board"], carrier: "Marsh Post", tracking: null, sealNumber: "S-90212", note: "The cable is in the same box." },
    customer: { name: "Lindmoor Veterinary Practice", email: "desk@lindmoor.example", phone: "+44 20 7946 0018", contact: "Zoë Šimková" },
    drives: [{
      number: 1, letter: "A", id: uuid(41), partNumber: "PN 4471-0093-B", model: null, serial: "9KQ3-61A2-F0", interface: "SATA", recordedAt: at(0), logUpTo: { seq: log.length, hash: log.at(-1)?.hash ?? "0".repeat(64) },
      startUpTests: [
        { at: at(40), by: MIRA.name, spins: true, ready: true, reportedSerial: "ZZ-1", serialMatches: false, attempts: 1, note: "Powered off at once." },
        { at: at(45), by: MIRA.name, spins: true, ready: true, reportedSerial: "9KQ3-61A2-F0", serialMatches: true, attempts: 2, note: null },
      ],
      boards: [
        { label: "original", id: uuid(42), role: "original", boardNumber: "BX 40-3179", ...board, fit: null, chips: [original] },
        { label: "donor-1", id: uuid(43), role: "donor", boardNumber: "BX 40-3179", ...board, condition: null, revision: "rev D", fit: { verdict: "caution", differences: ["Another revision: rev D; the original has rev C."], reason: null }, chips: [donor] },
      ],
    }],
  };
  const drawing: ReportFacts["drawing"] = {
    states: { [uuid(10)]: { label: "Verified", sentence: "Both read-backs equal the approved image in all 524,288 bytes. Pack the donor board with the drive." } },
    strips: Object.fromEntries([...images].map(([digest, bytes]) => [digest, inspectWhole(bytes).cells])), lanes: {},
  };
  for (const { rows } of allStacks(record)) {
    for (const [i, row] of rows.slice(1).entries()) {
      const { differingBytes, cells } = compareImages(images.get(rows[i].sha256)!, images.get(row.sha256)!);
      drawing.lanes[laneKey(rows[i], row)] = { differingBytes, cells };
    }
  }
  return { record, drawing, logs: [log], logKey: sha("log key"), seal: { number: 12, sha256: sha("seal"), keyFingerprint: sha("seal key") }, twoPersonRule: true };
}

function logOf(entries: number, digest: string, text: string): ReportEntry[] {
  const chip = { id: uuid(10), designator: "U12" };
  const kinds: [string, Record<string, unknown>][] = [
    ["read.set-aside", { read: { id: uuid(1), stage: "before", number: 2 }, chip, sha256: digest, reason: "The clip sat badly" }],
    ["read.counted-again", { read: { id: uuid(1), stage: "before", number: 2 }, chip, sha256: digest, reason: text }],
    ["approval.refused", { chip, sha256: digest, rule: "Whoever took a read of the original can’t approve its image. Ask another lead." }],
    ["log.assessed", { text: "Looked at every entry by hand." }],
    ["image.handed-out", { read: { id: uuid(1), stage: "before", number: 1 }, chip, sha256: digest, sizeBytes: SIZE, purpose: "write to the donor", to: { id: MIRA.id, name: MIRA.name }, reason: null }],
    ["images.checked", { images: 9, bytes: 9 * SIZE, damaged: 0, missing: 0, oldestBefore: null }],
  ];
  return Array.from({ length: entries }, (_, i) => {
    // hand-outs have a chapter of their own: a few are enough
    const [action, facts] = kinds[i % 6 === 4 && i > 60 ? 5 : i % 6];
    const who = action === "images.checked" ? { name: "Twinread", role: "system" as const } : i % 2 ? INES : MIRA;
    return { seq: i + 1, at: at(i), who: who.name, role: who.role, action, hash: sha(`entry ${i}`), facts: action === "image.handed-out" ? facts : null, ...describe(action, facts) };
  });
}
