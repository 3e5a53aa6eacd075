import { describe, expect, it } from "vitest";
import { describe as sentenceOf } from "@/lib/core/custody-actions";
import { driveWarnings, foldedSerial, type KnownDrive } from "@/lib/core/drive-warnings";
import { encryptionCaution } from "@/lib/core/encryption";
import { crossedPairs, crossing, leftBehind, leftBehindOf, proposedOriginal, siblingsOf, siblingWords, unitOf, unverifiedChips } from "@/lib/core/two-chips";
import type { ChipStateCode } from "@/lib/core/words";

const known = (more: Partial<KnownDrive>): KnownDrive => ({ caseId: "other", caseRef: "26-0002", letter: "A", partNumber: "PN 4471-0093-B", serial: "QF-2207-51", ...more });
const typed = { partNumber: "PN 4471-0093-B", serial: "qf-2207-51 " };
const codes = (drive: { partNumber: string | null; serial: string | null }, others: KnownDrive[]) => driveWarnings(drive, "mine", others).map((one) => one.code);

describe("label data of a drive", () => {
  it("with the serial of a drive in another case is a caution that names the case and nobody", () => {
    const [warning, ...more] = driveWarnings(typed, "mine", [known({}), known({ letter: "B" })]);
    expect(more).toEqual([]);
    expect(warning).toMatchObject({ code: "serial-elsewhere", kind: "caution", title: "Duplicate serial in another case: 26-0002.", cases: [{ id: "other", ref: "26-0002" }] });
  });

  it("that this case has already, with the same part number, is one drive recorded twice", () => {
    expect(codes(typed, [known({ caseId: "mine" })])).toEqual(["same-drive-here"]);
    expect(codes(typed, [known({ caseId: "mine", partNumber: "PN 9" })])).toEqual([]);
    expect(codes({ ...typed, partNumber: null }, [known({ caseId: "mine", partNumber: null })])).toEqual(["same-drive-here"]);
  });

  it("that differs in look-alike characters only, or has both of such a pair, gets a hint and no caution", () => {
    const alike = driveWarnings({ partNumber: null, serial: "QF-22O7-5I" }, "mine", [known({})]);
    expect(alike.map((one) => [one.code, one.kind])).toEqual([["serial-looks-alike", "note"]]);
    expect(driveWarnings({ partNumber: null, serial: "AO0-7" }, "mine", []).map((one) => one.kind)).toEqual(["note"]);
    expect(codes({ partNumber: null, serial: "AO-7" }, [])).toEqual([]);
    expect(foldedSerial(" qb o1-l ")).toBe("Q801-1");
  });

  it("without a serial warns of nothing", () => {
    expect(codes({ partNumber: "PN 4471-0093-B", serial: null }, [known({})])).toEqual([]);
  });
});

const chip = (designator: string, state: ChipStateCode, more: object = {}) => ({ id: designator, designator, boardRole: "original" as const, needsTransfer: true, state: { state, label: state === "unread" ? "To read" : state }, pair: null, ...more });

describe("a board with two chips", () => {
  const two = [chip("U12", "approved"), chip("U14", "unread")];

  it("is one unit, named with how far each chip is", () => {
    expect(unitOf(two)).toHaveLength(2);
    expect(siblingWords("U12", siblingsOf(two, "U12"))).toBe("U12 belongs together with U14: both are transferred. Now U14: To read.");
    expect(siblingWords("U1", siblingsOf([...two, chip("U1", "ready")], "U1"))).toContain("all 3 are transferred");
  });

  it("leaves out a chip kept for reference and one that stands alone", () => {
    expect(unitOf([two[0], chip("U14", "unread", { needsTransfer: false })])).toEqual([]);
    expect(siblingsOf([two[0]], "U12")).toEqual([]);
    expect(siblingWords("U12", [])).toBeNull();
  });

  it("warns while one is cleared and the other is not even read", () => {
    expect(leftBehind(two)).toBe("U12 is cleared and U14 is not read yet. Read U14 before the board goes on a drive.");
    expect(leftBehindOf(two[1], siblingsOf(two, "U14"))).toContain("U12 is cleared and U14 is not read yet.");
    expect(leftBehind([chip("U12", "ready"), two[1]])).toBeNull();
    expect(leftBehind([two[0], chip("U14", "needs-reads")])).toBeNull();
    expect(leftBehindOf(two[0], [])).toBeNull();
  });

  it("proposes the original of equal name, and doubts a pair whose names cross", () => {
    const originals = [chip("U12", "unread"), chip("U14", "unread")];
    expect(proposedOriginal("u14", originals)?.designator).toBe("U14");
    expect(proposedOriginal("U14", [originals[0], chip("U14", "unread", { pair: { designator: "U14" } })])).toBeNull();
    expect(crossing("U14", originals[0], originals)).toBe("Two chips swapped? Donor U14 would take the image of U12, and the original has a U14 of its own.");
    expect(crossing("U15", originals[0], originals)).toBeNull();
    expect(crossing("u12", originals[0], originals)).toBeNull();
    expect(crossedPairs([chip("U12", "unread", { pair: { designator: "U14" } }), chip("U14", "unread", { pair: { designator: "U12" } })])).toHaveLength(2);
  });

  it("needs both verified before a case is done", () => {
    const open = unverifiedChips([{ letter: "A", boards: [{ chips: [chip("U12", "verified"), chip("U14", "written"), chip("U1", "unread", { needsTransfer: false }), chip("U12", "unread", { boardRole: "donor" })] }] }]);
    expect(open.map((one) => `${one.letter} ${one.designator}`)).toEqual(["A U14"]);
  });
});

it("says of an encrypted drive what to keep together, and nothing of another", () => {
  expect(encryptionCaution("yes")?.title).toContain("keep the enclosure’s small board and the drive together");
  expect(encryptionCaution("suspected")?.title).toContain("Perhaps");
  expect([encryptionCaution("none"), encryptionCaution(null)]).toEqual([null, null]);
});

describe("the log", () => {
  const drive = { caseRef: "26-0001", letter: "A", partNumber: "PN 1", model: null, serial: null, interface: null, caseReceivedAt: "2026-03-12T08:00:00Z" };
  const board = { role: "original", boardNumber: "BX 1", revision: null, controllerMarking: null, motorDriverMarking: null, condition: null, fit: null };
  it("reads entries from before these facts were asked for, and says the new ones", () => {
    expect(sentenceOf("drive.recorded", drive).sentence).toBe("Recorded Drive A of case 26-0001, PN 1");
    expect(sentenceOf("drive.recorded", { ...drive, capacity: "2 TB", made: null, firmware: null, encryption: "suspected" }).sentence).toContain("encryption suspected");
    expect(sentenceOf("board.recorded", board).sentence).toBe("Recorded the original board BX 1");
    expect(sentenceOf("board.recorded", { ...board, dataInController: true }).sentence).toContain("its unique data lies inside the main controller");
  });
  it("says that a chip was placed, and keeps every other correction in full", () => {
    const chipRef = { chip: { id: "7a1f0c51-7b5f-4c39-9a1e-0d2d6f2f6a11", designator: "U12" } };
    const x = { field: "placeX", from: null, to: 410 };
    expect(sentenceOf("chip.corrected", { ...chipRef, changes: [x, { field: "placeY", from: null, to: 205 }], reason: "Placed on the picture" }).sentence).toBe("Placed U12 on the picture of its board");
    expect(sentenceOf("chip.corrected", { ...chipRef, changes: [x, { field: "package", from: null, to: "SOIC-8" }], reason: "Looked" }).sentence).toContain("package from nothing to SOIC-8");
  });
});
