import { expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { deliverMails } from "@/lib/commands/deliver-mails";
import { makeComposite } from "@/lib/commands/make-composite";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { sendSummary } from "@/lib/commands/send-summary";
import { benchRows } from "@/lib/queries/bench";
import { caseView } from "@/lib/queries/cases";
import { chipView } from "@/lib/queries/chip-view";
import { findDigest } from "@/lib/queries/find";
import { summaryByToken } from "@/lib/queries/summary";
import { flipped } from "../support/bench-steps";
import { freshImage, makeChip, makeUser, store } from "../support/factory";

it("an approved composite says so on the bench, the case, the chip and to the customer, until a read holds the same bytes", async () => {
  const [technician, lead, other] = [await makeUser("technician"), await makeUser("lead"), await makeUser("lead")];
  const chip = await makeChip(technician);
  const image = freshImage();
  for (const seating of [1, 1]) await store(technician, chip.donorChipId, "donor", Buffer.alloc(image.length, 0xff), seating);
  for (const [i, seating] of [1, 1, 2].entries()) await store(technician, chip.chipId, "before", flipped(image, 100 + 7 * i), seating);
  const onBench = async () => (await benchRows(technician)).find((row) => row.chip.id === chip.chipId)!;
  const inCase = async () => (await caseView(technician, chip.caseId)).drives[0].boards.flatMap((b) => b.chips);
  expect((await onBench()).chip.composite).toBeNull();

  const made = await makeComposite(lead, chip.chipId, { reads: [1, 2, 3], reason: "The chip gives no more." });
  const mark = { number: 4, reads: 3, seatings: 2 };
  expect((await findDigest(technician, made.sha256)).hits.map((hit) => hit.readName)).toEqual(["Read 4, composite"]);
  const reasons = Object.fromEntries(made.findings.filter((f) => f.severity === "reason").map((f) => [f.code, "Looked at each byte."]));
  const { id } = await approveImage(other, chip.chipId, { sha256: made.sha256, donorChipId: chip.donorChipId, statement: "Voted.", reasons, lookedAt: [] });
  expect((await onBench()).chip.composite).toEqual(mark);
  expect((await inCase()).map((c) => c.composite)).toEqual([mark, mark]);

  await recordTransfer(technician, id, { kind: "write", donorChipId: chip.donorChipId });
  for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
  const view = await chipView(technician, chip.chipId);
  expect(view).toMatchObject({ state: { state: "verified" }, composite: mark });
  expect(view.why).toContain("That image, Read 4, is a composite of 3 reads: a majority shows what repeats, not what is true.");

  await sendSummary(other, chip.caseId);
  const sent: string[] = [];
  // some at a time, and other tests' mails wait as well
  while ((await deliverMails(async (mail) => void sent.push(mail.text))).sent > 0);
  const token = sent.filter((text) => text.includes(chip.ref)).map((text) => /\/summary\/([A-Za-z0-9_-]{43})\n/.exec(text)?.[1]).findLast((one) => one !== undefined)!;
  expect((await summaryByToken(token))!.drives[0].chips).toEqual([expect.objectContaining({ verified: true, composite: mark })]);

  // a read that holds the very bytes: then something did read them, and the image is no longer a composite's alone
  await store(technician, chip.chipId, "before", image, 3);
  expect((await onBench()).chip.composite).toBeNull();
});
