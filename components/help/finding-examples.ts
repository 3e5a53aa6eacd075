import { makeComposite } from "@/lib/core/composite";
import { compositeFindings } from "@/lib/core/composite-findings";
import type { DiagnosisCode } from "@/lib/core/diagnose-cause";
import { diagnosePair } from "@/lib/core/diagnose-pair";
import { diagnoseReadBack, judgeReadBack, judgeRead, oneSeatingFinding, singleFindings, type JudgeInput, type ReadBackInput } from "@/lib/core/findings";
import { inspectWhole } from "@/lib/core/inspect";
import type { ChipOfImage } from "@/lib/core/single-findings";
import { DEFAULT_POLICY, type Severity } from "@/lib/core/words";
import { bitsLost, bitsReversed, dataLike, edited, EXAMPLE_BYTES, goodImage, joined } from "./example-images";

/** What the engine itself says of a spoiled image: the sentence that stands on the screen. */
export interface FindingExample {
  code: DiagnosisCode;
  /** null where two reads are compared */
  severity: Severity | null;
  message: string;
  advice: string;
}

const GOOD = goodImage();
const OTHER = joined(dataLike(0x1234567, 4096), dataLike(0x7654321, 4096));
const fill = (value: number, length = EXAMPLE_BYTES) => new Uint8Array(length).fill(value);
const ascii = (text: string) => new TextEncoder().encode(text);
const chip = (over: Partial<ChipOfImage> = {}): ChipOfImage => ({ sizeBytes: EXAMPLE_BYTES, sizeSource: "marking", ...over });

const single = (bytes: Uint8Array, of = chip()): FindingExample[] => singleFindings(inspectWhole(bytes), of);

function judged(over: Partial<JudgeInput>): FindingExample[] {
  return judgeRead({
    stage: "before", read: { sizeBytes: EXAMPLE_BYTES, sha256: "a", fileName: "read-2.bin", modifiedAt: "2026-03-12T09:14:05Z" }, chip: chip(), facts: inspectWhole(GOOD),
    policy: DEFAULT_POLICY, earlier: [], elsewhere: [], ...over,
  });
}
const elsewhere = (relation: "other-chip" | "other-drive" | "donor-content", sameSerial = false) =>
  judged({ elsewhere: [{ relation, readName: relation === "donor-content" ? "Own 1" : "Read 1", designator: relation === "other-chip" ? "U3" : "U12", caseRef: "26-0042", sameSerial }] });
const relative = (equalBytes: number) => judged({ family: { relatives: [{ readName: "Read 1", designator: "U12", caseRef: "26-0042", informativeBytes: 4000, equalBytes }], among: { informativeBytes: 4000, equalBytes: 3900 } } });

function pair(a: Uint8Array, b: Uint8Array): FindingExample[] {
  const { code, message, advice } = diagnosePair(a, b, inspectWhole(a), inspectWhole(b), { nameA: "Read 1", nameB: "Read 2", sizeBytes: EXAMPLE_BYTES }).diagnosis;
  return [{ code, severity: null, message, advice }];
}

function backFrom(bytes: Uint8Array, over: Partial<ReadBackInput> = {}): FindingExample[] {
  const differs = bytes !== GOOD;
  return judgeReadBack({
    facts: inspectWhole(bytes), read: { sha256: differs ? "b" : "a", sizeBytes: bytes.length }, approved: { sha256: "a", sizeBytes: EXAMPLE_BYTES }, donorSaved: ["d"], equalsAnd: false, otherApproved: null,
    comparison: null, diagnosis: diagnoseReadBack(bytes, GOOD, OTHER), ...over,
  });
}
/** A write that went wrong, and the same seen after the drive's first start. */
const back = (bytes: Uint8Array, over: Partial<ReadBackInput> = {}) => [...backFrom(bytes, over), ...backFrom(bytes, { ...over, poweredOn: true })];

function wrapped(tool: number, page: number): Uint8Array {
  return edited(OTHER, (out) => GOOD.forEach((byte, at) => { out[at - (at % tool) + ((at % tool) % page)] = byte; }));
}

function composite(edits: readonly ((bytes: Uint8Array) => void)[]): FindingExample[] {
  return compositeFindings(makeComposite(edits.map((edit, i) => ({ sha256: String(i), bytes: edited(GOOD, edit), seating: 1 + (i % 2), number: i + 1 }))));
}
const THREE_BITS = [1, 2, 4].map((bit) => (bytes: Uint8Array) => { bytes[100] ^= bit; bytes[900 + bit] ^= 0x10; });
/** each read has a bit of its own right, and together they make a byte that none holds */
const NO_READ_HOLDS = (at: number) => [1, 2, 4].map((bit) => (bytes: Uint8Array) => { bytes[at] ^= bit; });

function slippedText(): Uint8Array {
  const lines = ascii(Array.from({ length: 60 }, (_, i) => `LINE ${String(i).padStart(4, "0")} of an example text`).join(" "));
  return bitsLost(edited(GOOD, (b) => b.set(lines.subarray(0, 2000), 3000)), 8, 1);
}

const RECORDS = ascii(`${Array.from({ length: 40 }, () => ":10000000000102030405060708090A0B0C0D0E0F78").join("\r\n")}\r\n:00000001FF\r\n`);
const PDF = ascii("%PDF-1.4\n1 0 obj\n<< /Type /Catalog >>\nendobj\nxref\n0 2\ntrailer\n<< /Root 1 0 R >>\nstartxref\n49\n%%EOF\n");
const randomLike = (length: number) => {
  const out = new Uint8Array(length);
  let state = 0x1d872b41;
  for (let i = 0; i < length; i += 1) {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    out[i] = state >>> 24;
  }
  return out;
};
const slipped = bitsLost(GOOD, 0x400 * 8, 1);

/** Every example, with whatever else the engine says of the same image. */
function all(): FindingExample[] {
  const half = joined(GOOD.subarray(0, 4096), GOOD.subarray(0, 4096));
  const small = (at: number, length: number) => edited(fill(0xff), (b) => b.set(dataLike(7, length), at));
  return [
    ...single(fill(0xff)), ...single(fill(0)), ...single(fill(0x5a)), ...single(edited(fill(0xff, 65_536), (b) => b.fill(0x21, 0, 65)), chip({ sizeBytes: 65_536 })), ...single(edited(fill(0xff), (b) => b.fill(0x21, 0, 7))),
    ...single(joined(fill(0, 64), GOOD)), ...single(half), ...single(joined(GOOD, GOOD)), ...single(OTHER.map((_, i) => OTHER[i & ~0x100])), ...single(edited(OTHER.map((_, i) => OTHER[i & ~0x100]), (b) => { b[0x150] ^= 1; })),
    ...single(joined(small(0, 256).subarray(0, 256), small(0, 256).subarray(0, 256), fill(0xff, EXAMPLE_BYTES - 512))),
    ...single(fill(0).map((_, i) => [0x20, 0x40, 0x13][i % 3])), ...single(GOOD.subarray(0, 4096)), ...single(joined(GOOD, fill(0xff, 512))),
    ...single(slippedText()), ...single(RECORDS, chip({ sizeBytes: RECORDS.length })), ...single(PDF, chip({ sizeBytes: PDF.length })), ...single(edited(GOOD, (b) => b.set([0x1f, 0x8b]))),
    ...single(randomLike(65_536), chip({ sizeBytes: 65_536 })), ...single(OTHER.map((byte) => byte | 0x10)), ...single(OTHER.subarray(0, 512).map((byte) => byte | 0x10), chip({ sizeBytes: 512 })),
    ...single(GOOD, chip({ contradiction: "Its id says 1 MiB, and the chip is recorded with 8 KiB as typed." })),
    ...judged({ chip: chip({ sizeBytes: 8191 }), facts: inspectWhole(GOOD.subarray(0, 8191)) }),
    ...elsewhere("other-chip"), ...elsewhere("other-drive"), ...elsewhere("other-drive", true), ...elsewhere("donor-content"), ...relative(3999), ...relative(1000),
    ...judged({ earlier: [{ number: 1, stage: "before", sha256: "a", fileName: "read-2.bin", modifiedAt: "2026-03-12T09:14:05Z", counted: true }] }),
    ...[oneSeatingFinding({ ...DEFAULT_POLICY, seatings: 1 }, [{ seating: 1 }, { seating: 1 }, { seating: 1 }])].filter((one) => one !== null),
    ...pair(GOOD, GOOD), ...pair(GOOD, OTHER.subarray(0, 5000)), ...pair(GOOD, slipped), ...pair(GOOD, bitsLost(GOOD, 0x400 * 8, 8)), ...pair(GOOD, joined(Uint8Array.of(3, 0, 0, 0), GOOD.subarray(0, EXAMPLE_BYTES - 4))),
    ...pair(GOOD, joined(GOOD.subarray(512), GOOD.subarray(0, 512))), ...pair(GOOD, GOOD.map((_, i) => GOOD[i ^ 1])), ...pair(GOOD, GOOD.map(bitsReversed)), ...pair(GOOD, GOOD.map((byte) => ~byte)),
    ...pair(OTHER, OTHER.map((_, i) => OTHER[(i & ~0x3) | ((i & 1) << 1) | ((i >> 1) & 1)])), ...pair(GOOD, edited(GOOD, (b) => b.fill(0xff, 0x300, 0x340))),
    ...pair(GOOD, edited(GOOD, (b) => { for (let i = 0; i < 40; i += 1) b[i * 70] ^= 1 << (i % 8); })), ...pair(OTHER, OTHER.map((byte, i) => (i % 50 === 0 ? byte & (byte - 1) : byte))),
    ...pair(OTHER, edited(OTHER, (b) => { for (const at of [0x400, 0xc00, 0x1400]) b.set(dataLike(at, 256), at); })),
    ...pair(OTHER, edited(OTHER, (b) => { for (let at = 0x200; at < 0x1800; at += 0x400) b.set(dataLike(at + 3, 6), at); })), ...pair(OTHER, edited(OTHER, (b) => b.set(dataLike(99, 6), 0))),
    ...pair(GOOD, edited(GOOD, (b) => b.set([b[900] ^ 0x33, b[901] ^ 0x33, b[902] ^ 0x33], 900))),
    ...composite(THREE_BITS), ...composite(NO_READ_HOLDS(100)), ...composite(NO_READ_HOLDS(4100)),
    ...back(GOOD), ...back(OTHER, { donorSaved: ["b"] }), ...back(GOOD.map((byte, i) => byte & OTHER[i]), { equalsAnd: true }), ...back(fill(0xff)), ...back(wrapped(64, 32)),
    ...back(joined(GOOD.subarray(0, 4096), OTHER.subarray(4096))), ...back(edited(GOOD, (b) => { b[10] ^= 1; b[500] ^= 8; b[2000] ^= 2; })), ...back(OTHER, { otherApproved: { designator: "U12", caseRef: "26-0042" } }),
    ...back(edited(GOOD, (b) => b.set([b[900] ^ 0x33, b[901] ^ 0x33, b[902] ^ 0x33], 900))),
  ];
}

let known: Map<DiagnosisCode, FindingExample[]> | null = null;

/** The engine's own sentences by code, one for each severity that it gives; made once. */
export function findingExamples(): ReadonlyMap<DiagnosisCode, readonly FindingExample[]> {
  if (known) return known;
  known = new Map();
  for (const { code, severity, message, advice } of all()) {
    const there = known.get(code) ?? [];
    if (!there.some((one) => one.severity === severity)) known.set(code, [...there, { code, severity, message, advice }]);
  }
  return known;
}

