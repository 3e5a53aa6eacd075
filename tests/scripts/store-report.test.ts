import { describe, expect, it } from "vitest";
import type { Logged } from "@/scripts/check/logged";
import { checkReads, type StoredImage } from "@/scripts/check/images";
import type { PlacedRead, Places } from "@/scripts/check/places";
import { type Damage, exitCode, page, type StoreReport } from "@/scripts/check/report";

const sha256 = "ab".repeat(32);
const image: StoredImage = { sha256, sizeBytes: 8192, crc32: "0000000f", erased: false };
const read: PlacedRead = { id: "read-1", driveId: "drive-1", name: "Case 26-0042, Drive A, Orig U12, Read 2", ...image };
const entry = { chain: "drive-1", seq: 5, ...image };
const places = (reads: PlacedRead[]): Places => ({ driveIds: ["drive-1"], chain: (id) => (id === "drive-1" ? "Case 26-0042, Drive A" : `Log ${id}`), reads, driveOfChip: new Map() });
const logged = (reads: [string, typeof entry][]): Pick<Logged, "reads"> => ({ reads: new Map(reads) });
const problems = (images: StoredImage[], reads: PlacedRead[], log: [string, typeof entry][]) => checkReads(images, places(reads), logged(log)).map((found) => found.problem);

describe("reads against the log", () => {
  it("agree when row, image and entry say the same", () => expect(problems([image], [read], [["read-1", entry]])).toEqual([]));
  it("name a read that points to another image than was stored", () => {
    const other = { ...image, sha256: "cd".repeat(32) };
    const [found] = checkReads([image, other], places([{ ...read, sha256: other.sha256 }]), logged([["read-1", entry]]));
    expect(found).toMatchObject({ place: read.name, seq: 5, problem: "read-differs-from-log" });
    expect(found.expected).toContain(sha256);
  });
  it("name a read that was put under another drive", () => expect(problems([image], [{ ...read, driveId: "drive-2" }], [["read-1", entry]])).toEqual(["read-differs-from-log"]));
  it("name a read that no entry stored", () => expect(problems([image], [read], [])).toEqual(["read-not-in-log"]));
  it("name a stored read whose row is gone", () => expect(problems([image], [], [["read-1", entry]])).toEqual(["read-missing"]));
  it("name a read without an image on record", () => expect(problems([], [read], [["read-1", entry]])).toEqual(["image-record"]));
});

describe("the report", () => {
  const damage: Damage = { place: "Case 26-0042, Drive A", seq: 7, problem: "signature", sentence: "The signature does not fit the entry.", chain: "drive-1", sha256: null, reads: [read.name] };
  const clean: StoreReport = {
    checkedAt: "2026-12-01T10:00:00.000Z", clean: true, chains: [{ chain: "drive-1", place: "Case 26-0042, Drive A", entries: 7, head: null, findings: 0 }], signatures: 7, keys: [],
    seals: { checked: 0, newest: null, heads: 0, keys: [] }, witness: null, against: [], notes: [],
    images: { checked: 1, bytes: 8192, damaged: 0, missing: 0, erased: 0 }, reads: 1, damage: [], notChecked: [], unknownFiles: 0,
  };

  it("ends with 0 when clean, 1 with damage, 2 when something could not be checked, and damage wins", () => {
    expect(exitCode(clean)).toBe(0);
    expect(exitCode({ damage: [damage], notChecked: [] })).toBe(1);
    expect(exitCode({ damage: [], notChecked: ["one image."] })).toBe(2);
    expect(exitCode({ damage: [damage], notChecked: ["one image."] })).toBe(1);
  });

  it("names drive, case, entry and read", () => {
    expect(page({ ...clean, damage: [damage] })).toContain("Case 26-0042, Drive A, entry 7: The signature does not fit the entry.\n    touches  Case 26-0042, Drive A, Orig U12, Read 2");
  });

  it("never says all clean when something was left out", () => {
    expect(page(clean)).toContain("All clean");
    expect(page({ ...clean, notChecked: ["one image."] })).not.toContain("All clean");
  });
});
