import { describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { handOutImage } from "@/lib/commands/hand-out-image";
import { receiveParcel } from "@/lib/commands/receive-parcel";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { inGroups } from "@/lib/core/paper";
import { printCase } from "@/lib/queries/print-case";
import { printLabels } from "@/lib/queries/print-labels";
import { printReadSheets } from "@/lib/queries/print-read-sheets";
import { printWriteTicket, ticketRefusal } from "@/lib/queries/print-write-ticket";
import { chipView } from "@/lib/queries/chip-view";
import { firmware, makeChip, makeReady, makeUser, sha256 } from "../support/factory";
import { refusal } from "../support/bench-steps";
import { parcel } from "../support/parcels";

async function cleared() {
  const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  const chip = await makeChip(technician);
  const image = firmware(`print ${chip.chipId}`, 8192);
  await makeReady(technician, chip, image);
  const { id } = await approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three equal reads.", reasons: {}, lookedAt: [] });
  return { technician, lead, chip, image, approvalId: id };
}

describe("a write ticket", () => {
  it("is refused with a sentence while no image is approved", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    await makeReady(technician, chip, firmware("not approved", 8192));
    expect(await ticketRefusal(technician, chip.caseId, chip.chipId)).toContain("No image of this chip is approved");
    expect(await refusal(printWriteTicket(technician, chip.caseId, chip.chipId))).toMatchObject({ status: 409 });
  });

  it("names the donor, the file that is handed out and who cleared it, and is void once that was revoked", async () => {
    const { technician, lead, chip, image, approvalId } = await cleared();
    const ticket = await printWriteTicket(technician, chip.caseId, chip.chipId);
    const digest = sha256(image);
    const read = (await chipView(technician, chip.chipId)).reads.find((one) => one.stage === "before" && one.number === 1)!;
    const { fileName } = await handOutImage(technician, read.id, {});
    expect(ticket).toMatchObject({ sha256: digest, imageName: fileName, crc32: read.crc32, sizeBytes: 8192, supplyMillivolts: 3300, approvedBy: lead.name, designator: "U12", donor: { designator: "U12", boardNumber: "BX 40-3179", revision: "rev C" }, revoked: null });
    expect(inGroups(digest)).toHaveLength(8);
    expect(inGroups(digest).join("")).toBe(digest);
    await revokeApproval(lead, approvalId, { reason: "The label was misread." });
    expect((await printWriteTicket(technician, chip.caseId, chip.chipId)).revoked).toMatchObject({ by: lead.name, reason: "The label was misread." });
  });

  it("is not there under another case, nor for an auditor whose list does not hold the case", async () => {
    const { technician, chip } = await cleared();
    const other = await makeChip(technician);
    expect(await refusal(printWriteTicket(technician, other.caseId, chip.chipId))).toMatchObject({ status: 404 });
    const limited = { ...(await makeUser("auditor")), cases: [other.caseId] };
    expect(await refusal(printWriteTicket(limited, chip.caseId, chip.chipId))).toMatchObject({ status: 404 });
    expect(await refusal(printCase(limited, chip.caseId))).toMatchObject({ status: 404 });
    expect(await refusal(printLabels(limited, chip.caseId))).toMatchObject({ status: 404 });
    expect(await refusal(printReadSheets(limited, chip.caseId))).toMatchObject({ status: 404 });
  });
});

describe("labels, sheets and papers", () => {
  it("are made for drive, both boards and each chip, and for one of them alone", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const labels = await printLabels(technician, chip.caseId);
    expect(labels.map((label) => label.kind)).toEqual(["drive", "original", "chip", "donor", "chip"]);
    expect(new Set(labels.map((label) => label.refChecked)).size).toBe(1);
    expect(labels[0].refChecked).toMatch(new RegExp(`^${chip.ref}\\.[0-9A-Z]$`));
    expect(JSON.stringify(labels)).not.toContain("Lindmoor");
    expect((await printLabels(technician, chip.caseId, chip.chipId)).map((label) => label.key)).toEqual([chip.chipId]);
    expect(await refusal(printLabels(technician, chip.caseId, "00000000-0000-4000-8000-000000000000"))).toMatchObject({ status: 404 });
  });

  it("carry the reads so far, and the receipt once there is one", async () => {
    const { technician, chip, image } = await cleared();
    const [sheet] = await printReadSheets(technician, chip.caseId, chip.chipId);
    expect(sheet.stages.map(({ stage, reads }) => [stage, reads.length])).toEqual([["before", 3]]);
    expect(sheet.stages[0].reads[0]).toMatchObject({ number: 1, seating: 1, sha256: sha256(image), operator: technician.name });
    const [donor] = await printReadSheets(technician, chip.caseId, chip.donorChipId);
    expect(donor.stages.map(({ stage, reads }) => [stage, reads.length])).toEqual([["donor", 2], ["after", 0]]);
    expect((await printCase(technician, chip.caseId)).receipt).toBeNull();
    await receiveParcel(technician, chip.caseId, parcel());
    expect((await printCase(technician, chip.caseId)).receipt).toMatchObject({ sealNumber: "S-4411" });
  });
});
