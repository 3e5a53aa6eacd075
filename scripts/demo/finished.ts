import { clear, readBack, readOriginal, saveDonor, write } from "./bench-work";
import { oneChip, receiveCase } from "./cases";
import { notErased } from "./faults";
import type { Staff } from "./people";

/** Cases whose chips are approved or further. Answers the case whose customer already has the summary. */
export async function makeFinished(staff: Staff): Promise<{ summaryFor: string }> {
  const summaryFor = await verifiedForCollection(staff);
  await verifiedToReturn(staff);
  await writtenOnly(staff);
  await halfReadBack(staff);
  await approvedOnly(staff);
  await writtenWithoutErase(staff);
  return { summaryFor };
}

async function verifiedForCollection({ pell, ines }: Staff): Promise<string> {
  const made = await receiveCase(pell, "Anselm Roe", "anselm.roe@roe.example", "Dropped while running; the board's connector is torn", -1, { note: "Customer collects." });
  const at = await oneChip(pell, made, "PN 4471-0093-B", "9KQ3-61A2-F0");
  await saveDonor(pell, at, at.donorImage);
  const [read] = await readOriginal(pell, at, at.image);
  await write(pell, at, await clear(pell, ines, at, read));
  await readBack(pell, at, at.image);
  return made.id;
}

async function verifiedToReturn({ pell, bram }: Staff): Promise<void> {
  const made = await receiveCase(pell, "Marlow Quay Harbour Office", "office@marlowquay.example", "Salt water in the enclosure", 2);
  const at = await oneChip(pell, made, "PN 2214-0066-A", "TT41-0920-C7");
  await saveDonor(pell, at, at.donorImage);
  const [read] = await readOriginal(pell, at, at.image, "ABC");
  await write(pell, at, await clear(pell, bram, at, read));
  await readBack(pell, at, at.image);
}

async function writtenOnly({ tomas, ines }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Petra Vallin", "petra@vallin.example", "Power surge through the docking station", 3);
  const at = await oneChip(tomas, made, "PN 5108-0210-C", "L7-5530-18");
  await saveDonor(tomas, at, at.donorImage);
  const [read] = await readOriginal(tomas, at, at.image);
  await write(tomas, at, await clear(tomas, ines, at, read));
}

async function halfReadBack({ tomas, bram }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Gant & Thistle Accounts", "it@gantthistle.example", "No spin-up after a thunderstorm", 1);
  const at = await oneChip(tomas, made, "PN 3320-0071-A", "RK2-88-41B");
  await saveDonor(tomas, at, at.donorImage);
  const [read] = await readOriginal(tomas, at, at.image);
  await write(tomas, at, await clear(tomas, bram, at, read));
  await readBack(tomas, at, at.image, "A");
}

async function approvedOnly({ mira, ines }: Staff): Promise<void> {
  const made = await receiveCase(mira, "Isolde Brankov", "isolde@brankov.example", "Wrong power supply; smell of burning", 0);
  const at = await oneChip(mira, made, "PN 4471-0093-B", "9KQ3-6F33-A8");
  await saveDonor(mira, at, at.donorImage);
  const [read] = await readOriginal(mira, at, at.image);
  await clear(mira, ines, at, read);
}

async function writtenWithoutErase({ tomas, ines }: Staff): Promise<void> {
  const made = await receiveCase(tomas, "Hollin Gate Choir School", "bursar@hollingate.example", "Cable torn out; sparks at the connector", 1);
  const at = await oneChip(tomas, made, "PN 2214-0066-A", "TT41-1177-D2");
  await saveDonor(tomas, at, at.donorImage);
  const [read] = await readOriginal(tomas, at, at.image);
  await write(tomas, at, await clear(tomas, ines, at, read));
  await readBack(tomas, at, notErased(at.image, at.donorImage), "A");
}
