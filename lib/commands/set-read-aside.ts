import { agreement } from "@/lib/core/chip-state";
import { type Actor, readName, SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { stateRead } from "@/lib/queries/chip-facts";
import { currentPolicy } from "@/lib/queries/policy";
import { Approval, inTransaction, Read, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { judge, judgeChip, judgeSameImages } from "./judge-read";
import { type ChipPlace, placeOfChip, readFor } from "./place";
import { allow } from "./refuse";
import { revokeStanding } from "./revoke-approval";

/** Takes a read out of the count, with a reason; it stays where it is and can be counted again. */
export function setReadAside(actor: Actor, readId: string, input: { reason: string }): Promise<{ id: string; counted: boolean }> {
  return changeCount(actor, readId, input.reason, false);
}

export function countReadAgain(actor: Actor, readId: string, input: { reason: string }): Promise<{ id: string; counted: boolean }> {
  return changeCount(actor, readId, input.reason, true);
}

async function changeCount(actor: Actor, readId: string, reason: string, counted: boolean): Promise<{ id: string; counted: boolean }> {
  const { read: known, place: { drive } } = await readFor(actor, readId);
  allow(actor, "read.set-aside", { operatorId: known.operatorId });
  if (known.stage === "after" && actor.role !== "lead") {
    throw new AppError("forbidden", "Only a lead can set a read-back aside or count it again. Or record a new write: the count then starts afresh.");
  }
  const done = await inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const place = await placeOfChip(known.chipId, tx);
    const read = (await Read.findByPk(readId, { transaction: tx }))!;
    const name = readName(read.stage, read.number);
    if (read.counted === counted) throw new AppError("rule-against", counted ? `${name} is counted already.` : `${name} is set aside already.`);
    await read.update(counted
      ? { counted, setAsideReason: null, setAsideBy: null, setAsideAt: null }
      : { counted, setAsideReason: reason, setAsideBy: actor.id, setAsideAt: new Date() }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, counted ? "read.counted-again" : "read.set-aside", { type: "read", id: read.id }, {
      read: { id: read.id, stage: read.stage, number: read.number }, chip: { id: place.chip.id, designator: place.chip.designator },
      sha256: read.sha256.toString("hex"), reason,
    });
    if (counted) await judge(tx, place, read);
    else await judgeChip(tx, place);
    if (read.stage === "before") await reviewApproval(tx, place);
    return { id: read.id, counted };
  });
  await judgeSameImages(known.sha256, known.chipId);
  return done;
}

/** An approval stands on enough equal counted reads; when they are no longer there it falls. */
async function reviewApproval(tx: Transaction, place: ChipPlace): Promise<void> {
  const standing = await Approval.findOne({ where: { chipId: place.chip.id, revokedAt: null }, transaction: tx });
  if (!standing) return;
  const policy = await currentPolicy(tx);
  const reads = (await Read.findAll({ where: { chipId: place.chip.id, stage: "before", counted: true }, transaction: tx })).map(stateRead);
  const { groups } = agreement(reads);
  const approved = groups.find((g) => g.sha256 === standing.sha256.toString("hex"));
  if (groups.some((g) => g !== approved)) {
    await revokeStanding(tx, SYSTEM, place.chip.id, "differing-read", "A read that is counted again differs from the approved image.");
  } else if (!approved || approved.behind < policy.reads || approved.seatings.length < policy.seatings) {
    await revokeStanding(tx, SYSTEM, place.chip.id, "below-policy", `Fewer than ${policy.reads} counted reads in ${policy.seatings} seatings hold the approved image now.`);
  }
}
