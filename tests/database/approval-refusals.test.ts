import { afterEach, describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { askForApproval, sendBack } from "@/lib/commands/ask-for-approval";
import { changePolicy } from "@/lib/commands/change-policy";
import { correctChip } from "@/lib/commands/correct-chip";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { type Actor, DEFAULT_POLICY, type Policy } from "@/lib/core/words";
import { currentPolicy } from "@/lib/queries/policy";
import { Approval } from "@/models";
import { approve, freshImage, lastEntry, logOf, makeChip, makeReady, makeReadyBench, makeUser, readsOf, refusalOf, sha256, stateOf, store } from "../support/factory";
import { damageImage, loseImage } from "../support/tamper";

let admin: Actor | undefined;
async function setPolicy(change: Partial<Policy>): Promise<void> {
  admin ??= await makeUser("admin");
  await changePolicy(admin, { ...DEFAULT_POLICY, ...change, secondFactor: false });
}
afterEach(async () => {
  if (JSON.stringify(await currentPolicy()) !== JSON.stringify(DEFAULT_POLICY)) await setPolicy({});
});

/** Refused by this rule, which the log then names too; no approval came of it. */
async function expectRefused(call: Promise<unknown>, chip: { chipId: string; driveId: string }, rule: RegExp): Promise<void> {
  expect(await refusalOf(call)).toEqual({ code: "rule-against", detail: expect.stringMatching(rule) });
  expect((await lastEntry(chip.driveId, "approval.refused"))?.rule).toMatch(rule);
  expect(await Approval.count({ where: { chipId: chip.chipId, revokedAt: null } })).toBe(0);
}

describe("an approval is refused", () => {
  it("to everyone but a lead", async () => {
    const { technician, chip, image } = await makeReadyBench();
    for (const who of [technician, await makeUser("auditor"), await makeUser("admin")]) {
      expect(await refusalOf(approve(who, chip, image))).toEqual({ code: "forbidden", detail: expect.stringMatching(/^Only a lead can approve an image/) });
    }
  });

  it("to the lead who took a read, also when that read is set aside", async () => {
    const { technician, lead, chip, image } = await makeReadyBench();
    const { reads: [mine] } = await store(lead, chip.chipId, "before", image, 2);
    await expectRefused(approve(lead, chip, image), chip, /^You took a read of this chip, and whoever took one, set aside or not, can’t approve its image\. Ask another lead\.$/);
    await setReadAside(lead, mine.id, { reason: "Not mine to take." });
    await expectRefused(approve(lead, chip, image), chip, /^You took a read of this chip/);
    await approve(await makeUser("lead"), chip, image);
    expect(await stateOf(technician, chip.chipId)).toBe("approved");
  });

  it("not to that lead where the two-person rule is switched off, and the log then says so", async () => {
    await setPolicy({ twoPersonRule: false });
    const lead = await makeUser("lead");
    const [chip, image] = [await makeChip(lead), freshImage()];
    await makeReady(lead, chip, image);
    await approve(lead, chip, image);
    expect(await lastEntry(chip.driveId, "approval.given")).toMatchObject({ twoPersonRule: false, readsTakenBy: [{ id: lead.id }] });
    // one more read of theirs is then no cause to revoke it
    await store(lead, chip.chipId, "before", image, 3);
    expect(await stateOf(lead, chip.chipId)).toBe("approved");
  });

  it("not to a lead who took reads of the donor only", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const [chip, image] = [await makeChip(technician), freshImage()];
    for (const seating of [1, 1]) await store(lead, chip.donorChipId, "donor", freshImage().fill(0xff), seating);
    for (const seating of [1, 1, 2]) await store(technician, chip.chipId, "before", image, seating);
    await approve(lead, chip, image);
  });

  it("while nothing is read", async () => {
    const lead = await makeUser("lead");
    const chip = await makeChip(lead);
    await expectRefused(approve(lead, chip, freshImage()), chip, /^To read: Nothing read yet\. Take 3 reads in 2 seatings\.$/);
  });

  it("below the policy's reads and seatings, with what is missing", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const [chip, image] = [await makeChip(technician), freshImage()];
    for (const seating of [1, 1, 1]) await store(technician, chip.chipId, "before", image, seating);
    await expectRefused(approve(lead, chip, image), chip, /^To read: 3 of 3 reads, 1 of 2 seatings: read again in a new seating\.$/);
    await setPolicy({ reads: 5 });
    await store(technician, chip.chipId, "before", image, 2);
    await expectRefused(approve(lead, chip, image), chip, /^To read: 4 of 5 reads, 2 of 2 seatings: read again\.$/);
  });

  it("while reads disagree, with where", async () => {
    const { technician, lead, chip, image } = await makeReadyBench();
    const odd = Buffer.from(image);
    odd[0x123] ^= 8;
    await store(technician, chip.chipId, "before", odd, 2);
    await expectRefused(approve(lead, chip, image), chip, /^Reads disagree: Read 4 differs/);
  });

  it("while a finding blocks, whatever reasons are given", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const chip = await makeChip(technician);
    const blank = Buffer.alloc(8192, 0xff);
    await makeReady(technician, chip, blank);
    await expectRefused(approve(lead, chip, blank, { blank: "I am sure that it is blank." }), chip, /^Something stands against it: Read 1: All FF\./);
  });

  it("of another image than the agreed one, also of one that was agreed on before", async () => {
    const { technician, lead, chip, image } = await makeReadyBench();
    await expectRefused(approve(lead, chip, freshImage()), chip, /^The agreed image changed meanwhile\./);
    const newer = freshImage();
    for (const read of await readsOf(technician, chip.chipId, "before")) await setReadAside(technician, read.id, { reason: "Clip was on the wrong chip." });
    for (const seating of [2, 3, 3]) await store(technician, chip.chipId, "before", newer, seating);
    await expectRefused(approve(lead, chip, image), chip, /^The agreed image changed meanwhile\. Open the chip again and look at its reads\.$/);
    await approve(lead, chip, newer);
  });

  it("for another donor chip than the paired one", async () => {
    const { lead, chip, image } = await makeReadyBench();
    await expectRefused(approve(lead, { ...chip, donorChipId: chip.chipId }, image), chip, /^The donor chip is no longer the paired one\./);
  });

  it("without a pair", async () => {
    const { technician, lead, chip, image } = await makeReadyBench();
    await correctChip(technician, chip.donorChipId, { changes: { pairedWith: null }, reason: "Taken for another drive." });
    await expectRefused(approve(lead, chip, image), chip, /^No donor chip is paired\. Pair one of equal size first\.$/);
  });

  it("for a donor chip of another size", async () => {
    const { technician, lead, chip, image } = await makeReadyBench();
    await correctChip(technician, chip.donorChipId, { changes: { sizeBytes: 16_384 }, reason: "Read the marking again." });
    await expectRefused(approve(lead, chip, image), chip, /^The donor chip holds 16 KiB, the original 8 KiB\. Pair a chip of equal size\.$/);
  });

  it("while the donor's own content is not saved by two equal full-size reads", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const [chip, image] = [await makeChip(technician), freshImage()];
    for (const seating of [1, 1, 2]) await store(technician, chip.chipId, "before", image, seating);
    const rule = /^The donor’s own content isn’t saved yet\./;
    await store(technician, chip.donorChipId, "donor", Buffer.alloc(8192, 0xff));
    await expectRefused(approve(lead, chip, image), chip, rule);
    const { reads: [odd] } = await store(technician, chip.donorChipId, "donor", Buffer.alloc(8192, 0xfe));
    await store(technician, chip.donorChipId, "donor", Buffer.alloc(8192, 0xff));
    await expectRefused(approve(lead, chip, image), chip, rule);
    await setReadAside(technician, odd.id, { reason: "The clip slipped." });
    await approve(lead, chip, image);
  });

  it("while two short reads of the donor agree", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const [chip, image] = [await makeChip(technician), freshImage()];
    await makeReady(technician, chip, image, freshImage(8192));
    for (const read of await readsOf(technician, chip.chipId, "donor")) await setReadAside(technician, read.id, { reason: "Other board." });
    for (const seating of [1, 1]) await store(technician, chip.donorChipId, "donor", Buffer.alloc(4096, 0xff), seating);
    await expectRefused(approve(lead, chip, image), chip, /^The donor’s own content isn’t saved yet\./);
  });

  it("of an image that is damaged or missing in the store", async () => {
    for (const spoil of [damageImage, loseImage]) {
      const { lead, chip, image } = await makeReadyBench();
      const mend = spoil(sha256(image));
      try {
        expect(await refusalOf(approve(lead, chip, image))).toEqual({ code: "rule-against", detail: expect.stringMatching(/^The stored image [0-9a-f]{8}… is (damaged|missing)/) });
        expect(await Approval.count({ where: { chipId: chip.chipId } })).toBe(0);
      } finally {
        mend();
      }
    }
  });

  it("while another one stands", async () => {
    const { lead, chip, image } = await makeReadyBench();
    await approve(lead, chip, image);
    expect(await refusalOf(approve(await makeUser("lead"), chip, image))).toEqual({ code: "rule-against", detail: "An approval of this chip stands already. Revoke it before giving another." });
  });

  it("on a donor's chip, and on none at all", async () => {
    const { lead, chip, image } = await makeReadyBench();
    const input = { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Clean.", reasons: {}, lookedAt: [] };
    expect(await refusalOf(approveImage(lead, chip.donorChipId, input))).toMatchObject({ code: "does-not-fit" });
    expect(await refusalOf(approveImage(lead, chip.driveId, input))).toMatchObject({ code: "not-found" });
  });
});

describe("an approval of a chip that is held for a reason", () => {
  async function held() {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const [chip, image] = [await makeChip(technician), freshImage()];
    const file = { modifiedAt: ["2026-11-30T08:00:00Z"] };
    for (const seating of [1, 1]) await store(technician, chip.donorChipId, "donor", Buffer.alloc(8192, 0xff), seating);
    for (const seating of [1, 2]) await store(technician, chip.chipId, "before", image, seating, file, "same.bin");
    await store(technician, chip.chipId, "before", image, 2);
    expect(await stateOf(technician, chip.chipId)).toBe("held");
    return { technician, lead, chip, image };
  }

  it("needs a text of ten characters for each open finding", async () => {
    const { lead, chip, image } = await held();
    const rule = /^Read 2: The same file as Read 1: .*Write why it may be approved all the same, in at least 10 characters\.$/;
    await expectRefused(approve(lead, chip, image), chip, rule);
    await expectRefused(approve(lead, chip, image, { "copy-not-a-read": "too short" }), chip, rule);
    await expectRefused(approve(lead, chip, image, { "other-drive": "Another finding's reason." }), chip, rule);
    await approve(lead, chip, image, { "copy-not-a-read": "Its reader always gives the same time." });
    expect(await lastEntry(chip.driveId, "approval.given")).toMatchObject({ reasons: { "copy-not-a-read": "Its reader always gives the same time." } });
  });

  it("can be asked for and sent back, but not where something blocks", async () => {
    const { technician, lead, chip } = await held();
    await askForApproval(technician, chip.chipId, { message: "Please look." });
    await sendBack(lead, chip.chipId, { reason: "Take one more read." });
    expect(await refusalOf(sendBack(lead, chip.chipId, { reason: "Once more." }))).toMatchObject({ code: "rule-against" });
    expect((await logOf(chip.driveId)).slice(-2).map((e) => e.action)).toEqual(["approval.asked", "approval.sent-back"]);
    await store(technician, chip.chipId, "before", freshImage(), 3);
    expect(await refusalOf(askForApproval(technician, chip.chipId, {}))).toEqual({ code: "rule-against", detail: expect.stringMatching(/^Approval can't be asked for yet\. Read 4 differs/) });
  });
});
