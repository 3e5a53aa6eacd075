import { randomUUID } from "node:crypto";
import { buffer } from "node:stream/consumers";
import { describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { handOutImage, openHandedOut } from "@/lib/commands/hand-out-image";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { chipView } from "@/lib/queries/chip-view";
import { checkCustody } from "@/lib/queries/custody";
import { type MadeChip, makeChip, makeReady, makeUser, sha256, store, firmware } from "../support/factory";

async function state(actor: Parameters<typeof chipView>[0], chip: MadeChip): Promise<string> {
  return (await chipView(actor, chip.chipId)).state.state;
}

describe("the whole way of a chip", () => {
  it("goes from unread to verified and leaves a chain that checks out", async () => {
    const technician = await makeUser("technician");
    const lead = await makeUser("lead");
    const chip = await makeChip(technician);
    const image = firmware(`main-way-${randomUUID()}`, 8192);
    expect(await state(technician, chip)).toBe("unread");
    await makeReady(technician, chip, image);
    expect(await state(technician, chip)).toBe("ready");
    const approval = await approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] });
    expect(await state(technician, chip)).toBe("approved");
    const read = (await chipView(technician, chip.chipId)).reads.find((r) => r.stage === "before")!;
    const { stream: out } = await openHandedOut(technician, read.id, {});
    const bytes = await buffer(out);
    expect(sha256(bytes)).toBe(sha256(image));
    await recordTransfer(technician, approval.id, { kind: "write", donorChipId: chip.donorChipId });
    expect(await state(technician, chip)).toBe("written");
    await store(technician, chip.donorChipId, "after", bytes, 1);
    expect(await state(technician, chip)).toBe("written");
    const done = await store(technician, chip.donorChipId, "after", bytes, 2);
    expect(done.chip?.state).toBe("verified");
    const check = await checkCustody(chip.driveId);
    expect(check.findings).toEqual([]);
    expect(check.entries).toBeGreaterThan(15);
  });

  it("refuses a technician the image that nobody has approved", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const { reads } = await store(technician, chip.chipId, "before", firmware(`not-approved-${randomUUID()}`, 8192));
    await expect(handOutImage(technician, reads[0].id, {})).rejects.toMatchObject({ code: "forbidden" });
  });
});
