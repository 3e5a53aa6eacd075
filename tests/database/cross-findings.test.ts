import { describe, expect, it } from "vitest";
import { correctDrive } from "@/lib/commands/correct-drive";
import { recordChip } from "@/lib/commands/record-chip";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { setReadAside } from "@/lib/commands/set-read-aside";
import type { Actor } from "@/lib/core/words";
import { freshImage, logOf, makeApprovedBench, makeChip, makeUser, readsOf, stateOf, store } from "../support/factory";

async function findings(actor: Actor, chipId: string): Promise<{ code: string; severity: string; message: string }[]> {
  return (await readsOf(actor, chipId, "before")).filter((r) => r.counted).flatMap((r) => r.findings).filter((f) => ["other-chip", "other-drive", "donor-content"].includes(f.code));
}

describe("one image in two places", () => {
  it("of one drive stands against both chips, and against neither once one is set aside", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const other = await recordChip(technician, chip.originalBoardId, { designator: "U3", bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, needsTransfer: true });
    const image = freshImage();
    await store(technician, chip.chipId, "before", image);
    expect(await findings(technician, chip.chipId)).toEqual([]);
    const { reads: [wrong] } = await store(technician, other.id, "before", image);
    for (const [id, message] of [[chip.chipId, /^Equals Read 1 of U3, another chip of this drive\.$/], [other.id, /^Equals Read 1 of U12, another chip of this drive\.$/]] as const) {
      expect(await findings(technician, id)).toEqual([expect.objectContaining({ code: "other-chip", severity: "blocks", message: expect.stringMatching(message) })]);
      expect(await stateOf(technician, id)).toBe("held");
    }
    expect((await logOf(chip.driveId)).at(-1)).toMatchObject({ action: "read.judged", actor: { role: "system" }, facts: { findings: [{ code: "other-chip" }] } });
    await setReadAside(technician, wrong.id, { reason: "The clip sat on U12." });
    expect(await findings(technician, chip.chipId)).toEqual([]);
  });

  it("of two drives blocks both; it is a reason where both carry one serial, and a corrected serial is judged at once", async () => {
    const technician = await makeUser("technician");
    const serial = `SN-${Date.now()}`;
    const [chip, other] = [await makeChip(technician, { serialNumber: serial }), await makeChip(technician)];
    const image = freshImage();
    await store(technician, chip.chipId, "before", image);
    await store(technician, other.chipId, "before", image);
    const severity = async () => [...await findings(technician, chip.chipId), ...await findings(technician, other.chipId)].map((f) => `${f.code} ${f.severity}`);
    expect(await severity()).toEqual(["other-drive blocks", "other-drive blocks"]);
    expect((await findings(technician, chip.chipId))[0].message).toBe(`Equals Read 1 of U12, case ${other.ref}, another drive.`);
    await correctDrive(technician, other.driveId, { changes: { serial }, reason: "It is the same drive, recorded twice." });
    expect(await severity()).toEqual(["other-drive reason", "other-drive reason"]);
    await correctDrive(technician, other.driveId, { changes: { serial: `${serial}-B` }, reason: "It is another one after all." });
    expect(await severity()).toEqual(["other-drive blocks", "other-drive blocks"]);
  });

  it("as an original's and as a donor's own content stands against the original's, whichever came first", async () => {
    const technician = await makeUser("technician");
    for (const first of ["before", "donor"] as const) {
      const [chip, other] = [await makeChip(technician), await makeChip(technician)];
      const image = freshImage();
      if (first === "before") await store(technician, chip.chipId, "before", image);
      await store(technician, other.donorChipId, "donor", image);
      if (first === "donor") await store(technician, chip.chipId, "before", image);
      expect(await findings(technician, chip.chipId)).toEqual([expect.objectContaining({ code: "donor-content", severity: "blocks", message: `Equals Own 1 of U12, case ${other.ref}, a donor's own content.` })]);
    }
  });

  it("says nothing when it is uniform or nearly blank", async () => {
    const technician = await makeUser("technician");
    const nearly = Buffer.alloc(8192, 0xff);
    nearly.set(freshImage(8), 64);
    for (const image of [Buffer.alloc(8192, 0xff), Buffer.alloc(8192), nearly]) {
      const [chip, other] = [await makeChip(technician), await makeChip(technician)];
      await store(technician, chip.chipId, "before", image);
      await store(technician, other.chipId, "before", image);
      await store(technician, other.donorChipId, "donor", image);
      expect(await findings(technician, chip.chipId)).toEqual([]);
      expect(await findings(technician, other.chipId)).toEqual([]);
    }
  });

  it("never names a customer", async () => {
    const technician = await makeUser("technician");
    const [chip, other] = [await makeChip(technician), await makeChip(technician)];
    const image = freshImage();
    await store(technician, other.chipId, "before", image);
    await store(technician, chip.chipId, "before", image);
    expect(JSON.stringify([await findings(technician, chip.chipId), await logOf(chip.driveId)])).not.toMatch(/Lindmoor/i);
  });

  it("stands not against a chip whose own read-backs hold it, but against another chip that turns up with it", async () => {
    const { technician, chip, image, approvalId } = await makeApprovedBench();
    await recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId });
    await store(technician, chip.donorChipId, "after", image);
    await store(technician, chip.chipId, "before", image, 3);
    expect(await findings(technician, chip.chipId)).toEqual([]);
    const other = await makeChip(technician);
    await store(technician, other.chipId, "before", image);
    expect(await findings(technician, other.chipId)).toEqual([expect.objectContaining({ code: "other-drive", severity: "blocks" })]);
  });
});
