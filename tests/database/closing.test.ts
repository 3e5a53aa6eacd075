import { beforeAll, describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { startBundle } from "@/lib/commands/bundle-plan";
import { closeCase } from "@/lib/commands/close-case";
import { correctDrive } from "@/lib/commands/correct-drive";
import { handOutImage } from "@/lib/commands/hand-out-image";
import { recordBoard } from "@/lib/commands/record-board";
import { recordStartUp } from "@/lib/commands/record-start-up";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { reopenCase } from "@/lib/commands/reopen-case";
import { returnCase } from "@/lib/commands/return-case";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { sendSummary } from "@/lib/commands/send-summary";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { erasureDay } from "@/lib/core/closing";
import { env } from "@/lib/env";
import { benchRows } from "@/lib/queries/bench";
import { caseList } from "@/lib/queries/cases";
import { closingView } from "@/lib/queries/closing";
import { startUpsOfDrive } from "@/lib/queries/start-up";
import { dayIn } from "@/lib/queries/workshop-day";
import { Case, Drive, Mail, Read, StartUpTest } from "@/models";
import { flipped, logged, makeWrittenBench, readNamed, refusal, underPolicy } from "../support/bench-steps";
import { type Bench, lastEntry, makeReadyBench, makeUser, stateOf, store } from "../support/factory";

type Written = Awaited<ReturnType<typeof makeWrittenBench>>;
const TEST = { spins: true, ready: true, attempts: 1 };
const GOES_BACK = { items: ["Drive A", "Original board"], toPerson: "Lindmoor Veterinary Practice" };

async function makeVerifiedBench(): Promise<Written> {
  const bench = await makeWrittenBench();
  for (const seating of [1, 2]) await store(bench.technician, bench.chip.donorChipId, "after", bench.image, seating);
  expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("verified");
  return bench;
}
const labelOf = async ({ chip }: Pick<Bench, "chip">) => (await Drive.findByPk(chip.driveId))!.serial!;

describe("the start-up test", () => {
  it("waits for the read-backs of a write", async () => {
    const bench = await makeWrittenBench();
    const { technician, chip } = bench;
    expect(await refusal(recordStartUp(technician, chip.driveId, TEST))).toMatchObject({ status: 409, detail: expect.stringContaining("U12 (To read back) is not verified yet") });
    expect((await startUpsOfDrive(technician, chip.driveId)).refusal).toContain("U12 (To read back)");
    expect(await StartUpTest.count({ where: { driveId: chip.driveId } })).toBe(0);
    const auditor = await makeUser("auditor");
    expect(await refusal(recordStartUp(auditor, chip.driveId, TEST))).toMatchObject({ status: 403 });
  });

  it("is told whether the drive is the one on the label, and stops at another serial", async () => {
    const bench = await makeVerifiedBench();
    const { technician, lead, chip } = bench;
    const label = await labelOf(bench);
    expect(await recordStartUp(technician, chip.driveId, { ...TEST, reportedSerial: "NOT-THIS-ONE", note: "Powered off at once." })).toMatchObject({ serialMatches: false });
    expect(await lastEntry(chip.driveId, "start-up.tested")).toMatchObject({ spins: true, ready: true, serialMatches: false, reportedSerial: "NOT-THIS-ONE" });
    await returnCase(technician, chip.caseId, GOES_BACK);
    expect(await refusal(closeCase(lead, chip.caseId, { kind: "returned" }))).toMatchObject({ status: 409, detail: expect.stringContaining("Drive A reported another serial") });
    expect(await recordStartUp(technician, chip.driveId, { ...TEST, reportedSerial: label.toLowerCase().replaceAll("-", " "), attempts: 2 })).toMatchObject({ serialMatches: true });
    expect(await recordStartUp(technician, chip.driveId, { ...TEST, attempts: 2 })).toMatchObject({ serialMatches: null });
    expect((await startUpsOfDrive(technician, chip.driveId)).tests.map((t) => t.serialMatches)).toEqual([null, true, false]);
    await closeCase(lead, chip.caseId, { kind: "returned" });
  });

  it("makes a later difference a note, and no earlier one", async () => {
    const bench = await makeVerifiedBench();
    const { technician, chip, image } = bench;
    const before = new Date();
    await recordStartUp(technician, chip.driveId, TEST);
    await store(technician, chip.donorChipId, "after", flipped(image), 3);
    expect((await readNamed(bench, "after", 3)).findings).toEqual([expect.objectContaining({ severity: "note", advice: expect.stringContaining("drives rewrite their chips") })]);
    expect(await stateOf(technician, chip.chipId)).toBe("verified");
    expect(await logged(chip.driveId, "readback.differs")).toHaveLength(1);
    // stored late, but taken before the drive was started: it speaks of the write
    await store(technician, chip.donorChipId, "after", flipped(image, 99), 3, { takenAt: [before.toISOString()] });
    expect((await readNamed(bench, "after", 4)).findings[0].severity).toBe("blocks");
    expect(await stateOf(technician, chip.chipId)).toBe("failed");
  });

  it("counts for the transfer before it alone", async () => {
    const bench = await makeVerifiedBench();
    const { technician, chip, approvalId, image } = bench;
    await recordStartUp(technician, chip.driveId, TEST);
    await recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId });
    await store(technician, chip.donorChipId, "after", flipped(image), 1);
    expect(await stateOf(technician, chip.chipId)).toBe("failed");
  });

  it("may follow a moved chip at once", async () => {
    const { technician, lead, chip, image } = await makeReadyBench();
    const { id } = await approveImage(lead, chip.chipId, { sha256: (await Read.findOne({ where: { chipId: chip.chipId } }))!.sha256.toString("hex"), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] });
    await recordTransfer(technician, id, { kind: "chip-moved", donorChipId: chip.donorChipId });
    await recordStartUp(technician, chip.driveId, TEST);
    await store(technician, chip.donorChipId, "after", flipped(image), 1);
    expect(await stateOf(technician, chip.chipId)).toBe("written");
    expect((await closingView(technician, chip.caseId)).items).toEqual(expect.arrayContaining([expect.stringMatching(/^Original board, .*, without U12$/), "Removed donor chip U12"]));
  });
});

describe("the return", () => {
  it("is recorded once, goes into the log without a name, and is told to the customer", async () => {
    const { technician, chip } = await makeVerifiedBench();
    await returnCase(technician, chip.caseId, { ...GOES_BACK, carrier: "Hill Parcels", tracking: "HP 4471", sealNumber: "S-19" });
    const entry = (await lastEntry(chip.driveId, "case.returned"))!;
    expect(entry).toEqual({ caseRef: chip.ref, items: GOES_BACK.items, carrier: "Hill Parcels", tracking: "HP 4471", sealNumber: "S-19", note: null });
    const mail = (await Mail.findOne({ where: { subject: `What goes back to you for case ${chip.ref}` } }))!;
    expect(mail.kind).toBe("case-returned");
    expect(mail.textMasked).toContain("- Original board\n");
    expect(mail.textMasked).toContain("Tracking number: HP 4471");
    expect((await closingView(technician, chip.caseId)).returned).toMatchObject({ ...GOES_BACK, sealNumber: "S-19" });
    expect(await refusal(returnCase(technician, chip.caseId, GOES_BACK))).toMatchObject({ status: 409, detail: expect.stringContaining("recorded already") });
    expect((await benchRows(technician)).find((row) => row.caseId === chip.caseId)?.nextWhy).toBe("It has gone back: a lead closes the case.");
  });

  it("needs a parcel that came", async () => {
    const { technician, chip } = await makeReadyBench();
    await Case.update({ receivedAt: null, requestedAt: new Date() }, { where: { id: chip.caseId } });
    expect(await refusal(returnCase(technician, chip.caseId, GOES_BACK))).toMatchObject({ status: 409, detail: expect.stringContaining("has not come yet") });
  });
});

describe("release and close", () => {
  it("is a lead's, and waits for the return", async () => {
    const { technician, lead, chip } = await makeVerifiedBench();
    expect(await refusal(closeCase(technician, chip.caseId, { kind: "returned" }))).toMatchObject({ status: 403 });
    expect(await refusal(closeCase(lead, chip.caseId, { kind: "returned", reason: "Done here." }))).toMatchObject({ status: 409, detail: expect.stringContaining("Record the return first") });
    expect(await refusal(closeCase(lead, chip.caseId, { kind: "cancelled" }))).toMatchObject({ status: 409, detail: expect.stringContaining("Write the reason") });
  });

  it("needs a reason that stands beside the chips that are not verified", async () => {
    const { technician, lead, chip } = await makeReadyBench();
    await returnCase(technician, chip.caseId, GOES_BACK);
    expect(await refusal(closeCase(lead, chip.caseId, { kind: "returned" }))).toMatchObject({ status: 409, detail: "U12 is not verified. Write the reason for closing it all the same." });
    await closeCase(lead, chip.caseId, { kind: "returned", reason: "The customer wants it back now." });
    expect(await lastEntry(chip.driveId, "case.closed")).toMatchObject({ kind: "returned", unverified: ["U12"], reason: "The customer wants it back now." });
  });

  it("names the day of the erasure, in the workshop's days, and no later than the customer agreed to", async () => {
    const { technician, lead, chip } = await makeVerifiedBench();
    await returnCase(technician, chip.caseId, GOES_BACK);
    const { returnedAt } = (await Case.findByPk(chip.caseId))!;
    await underPolicy({ erasureDays: 30 }, async () => {
      const { eraseOn } = await closeCase(lead, chip.caseId, { kind: "returned" });
      expect(eraseOn).toBe(erasureDay(dayIn(env().timeZone, returnedAt!), 30));
      expect((await caseList(lead, { q: chip.ref, sort: "received", order: "desc", page: 1, pageSize: 25 })).items[0]).toMatchObject({ state: "closed", eraseOn });
    });
  });
});

describe("a closed case", () => {
  let bench: Written;
  beforeAll(async () => {
    bench = await makeVerifiedBench();
    await returnCase(bench.technician, bench.chip.caseId, GOES_BACK);
    await closeCase(bench.lead, bench.chip.caseId, { kind: "returned" });
  });

  const tries: [string, (b: Written) => Promise<unknown>][] = [
    ["a read", ({ technician, chip, image }) => store(technician, chip.chipId, "before", image, 3)],
    ["a read-back", ({ technician, chip, image }) => store(technician, chip.donorChipId, "after", image, 3)],
    ["setting a read aside", async (b) => setReadAside(b.lead, (await readNamed(b, "before", 1)).id, { reason: "Tried on a closed case." })],
    ["a revocation", ({ lead, approvalId }) => revokeApproval(lead, approvalId, { reason: "Tried on a closed case." })],
    ["a transfer", ({ technician, approvalId, chip }) => recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId })],
    ["a start-up test", ({ technician, chip }) => recordStartUp(technician, chip.driveId, TEST)],
    ["a return", ({ technician, chip }) => returnCase(technician, chip.caseId, GOES_BACK)],
    ["a board", ({ technician, chip }) => recordBoard(technician, chip.driveId, { role: "donor", boardNumber: "BX 40-3179", revision: "rev C" })],
    ["a correction", ({ technician, chip }) => correctDrive(technician, chip.driveId, { changes: { interface: "SATA" }, reason: "Tried on a closed case." })],
  ];
  it.each(tries)("refuses %s", async (_, run) => {
    const before = (await logged(bench.chip.driveId, "read.stored")).length;
    expect(await refusal(run(bench))).toMatchObject({ code: "rule-against", status: 409, detail: expect.stringMatching(/is closed\. Reopen it first/) });
    expect((await logged(bench.chip.driveId, "read.stored")).length).toBe(before);
  });

  it("has left the bench, and can't be closed twice", async () => {
    expect((await benchRows(bench.technician)).some((row) => row.caseId === bench.chip.caseId)).toBe(false);
    expect(await refusal(closeCase(bench.lead, bench.chip.caseId, { kind: "returned" }))).toMatchObject({ status: 409, detail: expect.stringContaining("closed already") });
  });

  it("still gives out images, bundles and the summary", async () => {
    await handOutImage(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "The insurer asked for it." });
    await startBundle(bench.lead, bench.chip.caseId);
    await sendSummary(bench.lead, bench.chip.caseId);
    const mail = (await Mail.findOne({ where: { subject: `Verification summary of case ${bench.chip.ref}` } }))!;
    expect(mail.kind).toBe("summary");
    expect(mail.textMasked).toMatch(/We wrote the image of U12 to the donor board/);
    expect(mail.textMasked).toContain("We have not started the drive with the donor board.");
    expect(mail.textMasked).toMatch(/What comes back to you\n\nSent or handed over on .*: Drive A; Original board\./);
    expect(mail.textMasked).toContain("What this does not promise\n\n- That the drive will start or keep starting");
  });

  it("is opened again by a lead with a reason, and then takes changes", async () => {
    const { technician, lead, chip, image } = bench;
    expect(await refusal(reopenCase(technician, chip.caseId, { reason: "It came back." }))).toMatchObject({ status: 403 });
    await reopenCase(lead, chip.caseId, { reason: "It came back." });
    expect(await Case.findByPk(chip.caseId)).toMatchObject({ closedAt: null, closedKind: null, eraseOn: null });
    expect(await lastEntry(chip.driveId, "case.reopened")).toMatchObject({ reason: "It came back." });
    await store(technician, chip.chipId, "before", image, 3);
    expect(await refusal(reopenCase(lead, chip.caseId, { reason: "Twice." }))).toMatchObject({ status: 409 });
  });
});
