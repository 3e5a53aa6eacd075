import { askForApproval } from "@/lib/commands/ask-for-approval";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { boards, FIRMWARE_CHIP, pair, readOriginal, readOtherwise, saveDonor, SETTINGS_CHIP, take } from "./bench-work";
import { BOARDS, labelled, oneChip, receiveCase, type ShownCase } from "./cases";
import { lostContact, stuckAddressLine, unpowered } from "./faults";
import { firmware, settings } from "./images";
import type { Staff } from "./people";

/** Cases whose chips still have to be read, explained or approved. Answers the one that the demo's pages show most of. */
export async function makeOpen(staff: Staff): Promise<ShownCase> {
  await approvalLate(staff);
  await addressLineStuck(staff);
  await approvalAskedFor(staff);
  const shown = await clipLostContact(staff);
  await blankReads(staff);
  await copyOfARead(staff);
  await oneReadOfThree(staff);
  await nothingRead(staff);
  await justReceived(staff);
  return shown;
}

async function approvalLate({ tomas }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Kestrel Row Dental", "practice@kestrelrow.example", "Tea over the workstation", -1);
  const both = await boards(tomas, made.id, labelled("PN 2214-0066-A", "TT41-0874-B9"), BOARDS["PN 2214-0066-A"]);
  const at = await pair(tomas, both, `${made.ref}_A_U12`, SETTINGS_CHIP);
  await saveDonor(tomas, at, settings({ kind: "PN 2214-0066-A", unit: "donor for Kestrel Row" }));
  await readOriginal(tomas, at, settings({ kind: "PN 2214-0066-A", unit: "Kestrel Row" }));
  await askForApproval(tomas, at.chip, { message: "Donor from the shelf, same revision." });
}

async function addressLineStuck({ tomas }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Beno Takkar", "beno@takkar.example", "Found under a leaking roof", -2);
  const at = await oneChip(tomas, made, "PN 3320-0071-A", "RK2-90-77C", { designator: "U2" });
  await saveDonor(tomas, at, at.donorImage);
  await readOriginal(tomas, at, at.image, "A");
  await readOtherwise(tomas, at, stuckAddressLine(at.image), 1, 2);
}

async function approvalAskedFor({ mira }: Staff): Promise<void> {
  const made = await receiveCase(mira, "Halden Ropeworks", "desk@haldenropes.example", "Forklift ran over the cable; no spin-up", 0);
  // the donor is of another revision: a caution, nothing that blocks
  const at = await oneChip(mira, made, "PN 5108-0210-C", "L7-5544-03", { donor: { revision: "rev C" } });
  await saveDonor(mira, at, at.donorImage);
  await readOriginal(mira, at, at.image, "A");
  const odd = await readOtherwise(mira, at, lostContact(at.image), 1, 2);
  await readOriginal(mira, at, at.image, "BB", 3);
  await setReadAside(mira, odd.id, { reason: "Clip slipped on pin 8; re-seated. Reads 3 and 4 are fine." });
  await askForApproval(mira, at.chip, { message: "Read 2 is explained, three others agree. Due today." });
}

/** Two drives, two chips that need transfer, one kept for reference. */
async function clipLostContact({ mira, tomas }: Staff): Promise<ShownCase> {
  const kind = "PN 4471-0093-B";
  const made = await receiveCase(mira, "Harrow & Finch Surveyors", "edda.finch@harrowfinch.example", "Power surge. Drive doesn't spin up, smell of burning. Powered once more at the office, not opened.", 1, {
    customer: { name: "Harrow & Finch Surveyors", email: "edda.finch@harrowfinch.example", phone: "01632 960 144", contact: "Edda Finch, office manager" },
    note: "U2 scorched; U3 and U12 look clean under the loupe.",
  });
  const both = await boards(mira, made.id, labelled(kind, "9KQ3-70B8-D2"), { ...BOARDS[kind], condition: "U2 scorched" });
  const u3 = await pair(mira, both, `${made.ref}_A_U3`, FIRMWARE_CHIP);
  const image = firmware({ kind, unit: "9KQ3-70B8-D2" });
  await saveDonor(tomas, u3, firmware({ kind, unit: "donor for 9KQ3-70B8-D2" }));
  await readOriginal(mira, u3, image, "A");
  await readOtherwise(mira, u3, lostContact(image), 1, 2);
  await readOriginal(mira, u3, image, "B", 3);
  const u12 = await pair(mira, both, `${made.ref}_A_U12`, SETTINGS_CHIP);
  await saveDonor(tomas, u12, settings({ kind, unit: "donor for 9KQ3-70B8-D2" }), "A");

  const second = await recordDrive(mira, made.id, labelled(kind, "9KQ3-71C2-E5"));
  const board = await recordBoard(mira, second.id, { role: "original", ...BOARDS[kind], condition: "Sound" });
  const kept = await recordChip(mira, board.id, { designator: "U3", ...FIRMWARE_CHIP, needsTransfer: false });
  await readOriginal(mira, { chip: kept.id, donorChip: kept.id, name: `${made.ref}_B_U3` }, firmware({ kind, unit: "9KQ3-71C2-E5" }));
  return { caseId: made.id, boards: both, u3, u12 };
}

async function blankReads({ tomas }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Brindle Moor Joinery", "office@brindlemoor.example", "Sawdust and a power cut; clicks once", 4);
  const at = await oneChip(tomas, made, "PN 5108-0210-C", "L7-5561-40");
  await saveDonor(tomas, at, at.donorImage);
  await readOriginal(tomas, at, unpowered(FIRMWARE_CHIP.sizeBytes));
}

/** Read 2 is the file of Read 1 once more: a lead has to say why that is all right. */
async function copyOfARead({ pell }: Staff): Promise<void> {
  const made = await receiveCase(pell, "Lindmoor Veterinary Practice", "desk@lindmoor.example", "Server cupboard flooded", 5);
  const at = await oneChip(pell, made, "PN 4471-0093-B", "9KQ3-7702-B1");
  await saveDonor(pell, at, at.donorImage);
  for (const seating of [1, 1]) await take(pell, at, "before", { seating, image: at.image, minutesAgo: 600, file: "r1" });
  await readOriginal(pell, at, at.image, "B", 3);
}

async function oneReadOfThree({ tomas }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Tamsin Oduya", "tamsin@oduya.example", "Laptop fell from a bicycle", 1);
  const at = await oneChip(tomas, made, "PN 5108-0210-C", "L7-5570-02");
  await saveDonor(tomas, at, at.donorImage);
  await readOriginal(tomas, at, at.image, "A");
}

async function nothingRead({ tomas }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Wren Ferry Archive Trust", "archive@wrenferry.example", "Old drive, no spin-up since it was moved", 6);
  await oneChip(tomas, made, "PN 2214-0066-A", "TT41-1203-A4", { designator: "U7", facts: { ...FIRMWARE_CHIP, supplyMillivolts: "unknown" } });
}

async function justReceived({ pell }: Staff): Promise<void> {
  const made = await receiveCase(pell, "Orsolya Penn", "orsolya@penn.example", "Doesn't spin up", 7, { note: "Board still on the drive." });
  await recordDrive(pell, made.id, labelled("PN 3320-0071-A", "RK2-93-05A"));
}
