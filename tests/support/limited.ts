import { randomUUID } from "node:crypto";
import { actorOfUser } from "@/lib/auth/account";
import { createUser } from "@/lib/commands/create-user";
import { makeComposite } from "@/lib/commands/make-composite";
import { type Actor, SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { chipView } from "@/lib/queries/chip-view";
import { Drive, Share, User } from "@/models";
import { approve, firmware, freshImage, type MadeChip, makeChip, makeReady, sha256, store } from "./factory";

/** A case with everything that can be asked for by id. */
export interface FullCase {
  chip: MadeChip;
  image: Buffer;
  readId: string;
  approvalId: string;
  /** a chip of the same board, with a composite */
  secondChipId: string;
  compositeId: string;
  shareId: string;
}

const SIZE = 8192;

/** One bit turned over in four places of this read's own. */
function noisy(image: Buffer, seed: number): Buffer {
  const copy = Buffer.from(image);
  for (let i = 0; i < 4; i += 1) copy[(seed * 997 + i * 131) % SIZE] ^= 1 << (seed % 8);
  return copy;
}

export async function makeFullCase(technician: Actor, lead: Actor, image = freshImage()): Promise<FullCase> {
  const chip = await makeChip(technician, { sizeBytes: SIZE });
  const other = await makeChip(technician, { sizeBytes: SIZE });
  const voted = firmware(`limited-${randomUUID()}`, SIZE);
  await makeReady(technician, chip, image);
  const { id: approvalId } = await approve(lead, chip, image);
  // the composite lies in a chip of the same case: its drive is moved there, as if both had come together
  await Drive.update({ caseId: chip.caseId, position: 2 }, { where: { id: other.driveId } });
  for (const [i, seating] of [1, 1, 1, 2, 2].entries()) await store(technician, other.chipId, "before", noisy(voted, i + 1), seating);
  const composite = await makeComposite(lead, other.chipId, { reads: [1, 2, 3, 4, 5], reason: "No two reads agree." });
  const share = await Share.create({
    id: randomUUID(), caseId: chip.caseId, tokenHash: Buffer.from(sha256(Buffer.from(randomUUID())), "hex"), email: "desk@lindmoor.example", createdBy: lead.id, createdAt: new Date(), expiresAt: new Date(Date.now() + 86_400_000),
  });
  const reads = (await chipView(lead, chip.chipId)).reads.filter((r) => r.stage === "before");
  return { chip, image, readId: reads[0].id, approvalId, secondChipId: other.chipId, compositeId: composite.id, shareId: share.id };
}

/** What the sign-in makes of an account: read from the database, as at each request. */
export async function actorNow(userId: string): Promise<Actor> {
  return actorOfUser((await User.findByPk(userId))!);
}

/** An auditor whose account carries this case list. */
export async function makeLimited(cases: string[], endsOn = "2099-12-31"): Promise<Actor> {
  const email = `limited.${randomUUID()}@bench.example`;
  const { user } = await createUser(SYSTEM, { email, name: "Odd Reviewer", role: "auditor", endsOn, cases }, "correct horse battery staple", false);
  return actorNow(user.id);
}

/** The whole refusal as the caller reads it; "went through" when there was none. */
export async function answerOf(run: () => Promise<unknown>): Promise<unknown> {
  try {
    await run();
    return "went through";
  } catch (error) {
    if (error instanceof AppError) return { code: error.code, status: error.status, detail: error.detail, errors: error.extra.errors };
    throw error;
  }
}
