import { Op } from "sequelize";
import { judgeReadBack, type ReadBackDiagnosis } from "@/lib/core/findings";
import type { ImageFacts } from "@/lib/core/inspect";
import { afterPowerOn } from "@/lib/core/start-up";
import type { Finding } from "@/lib/core/words";
import { engine } from "@/lib/engine/pool";
import { Approval, Image, Read, StartUpTest, type Transaction, Transfer } from "@/models";
import { pathOfImage } from "@/storage";
import { type Compared, compareIfStored } from "./compare-images";
import { type ChipPlace, placeOfChip } from "./place";
import { ImageNotSound, requireSoundNow } from "./require-sound-now";

/** Judges a read-back against the image that was approved for its transfer and the donor's saved content. */
export async function judgeReadBackOf(tx: Transaction, place: ChipPlace, read: Read, facts: ImageFacts): Promise<Finding[]> {
  const transfer = (await Transfer.findByPk(read.transferId!, { transaction: tx }))!;
  const approval = (await Approval.findByPk(transfer.approvalId, { transaction: tx }))!;
  const approved = (await Image.findByPk(approval.sha256, { transaction: tx }))!;
  const saved = await Read.findAll({ where: { chipId: place.chip.id, stage: "donor", counted: true }, transaction: tx });
  const sha256 = read.sha256.toString("hex");
  const approvedSha256 = approval.sha256.toString("hex");
  const equal = read.sha256.equals(approval.sha256);
  const old = saved.find((r) => r.sizeBytes === approved.sizeBytes);
  const comparison = equal ? null : await compareIfStored({ sha256: approvedSha256, sizeBytes: approved.sizeBytes }, { sha256, sizeBytes: read.sizeBytes }, tx);
  const diagnosis = comparison ? await diagnosisOf(tx, [approved, read], old ?? null, comparison) : undefined;
  return judgeReadBack({
    facts, read: { sha256, sizeBytes: read.sizeBytes }, approved: { sha256: approvedSha256, sizeBytes: approved.sizeBytes },
    donorSaved: saved.map((r) => r.sha256.toString("hex")),
    equalsAnd: diagnosis?.code === "not-erased" && !diagnosis.ranges, diagnosis,
    otherApproved: equal ? null : await otherApproved(tx, read.sha256, transfer.chipId),
    comparison: comparison && { differingBytes: comparison.differingBytes, first: comparison.first, last: comparison.last },
    poweredOn: !equal && await startedBefore(tx, place.drive.id, transfer, read),
  });
}

async function startedBefore(tx: Transaction, driveId: string, transfer: Transfer, read: Read): Promise<boolean> {
  const tests = await StartUpTest.findAll({ where: { driveId }, attributes: ["at"], transaction: tx });
  return afterPowerOn({ takenAt: read.takenAt?.getTime() ?? null, storedAt: read.storedAt.getTime() }, transfer.at.getTime(), tests.map((test) => test.at.getTime()));
}

type Stored = Pick<Image, "sha256" | "sizeBytes">;

/** How the write went as far as the bytes tell, with the comparison as it was counted; undefined when an image is damaged or gone. */
async function diagnosisOf(tx: Transaction, [approved, readBack]: [Stored, Stored], old: Stored | null, comparison: Compared): Promise<ReadBackDiagnosis | undefined> {
  const path = ({ sha256 }: Stored) => pathOfImage(sha256.toString("hex"));
  try {
    const images = [approved, readBack, ...(old ? [old] : [])];
    await requireSoundNow(images.map(({ sha256, sizeBytes }) => ({ sha256: sha256.toString("hex"), sizeBytes })), "judging a read-back", tx);
    return await engine("readBack", { approved: path(approved), old: old && path(old), readBack: path(readBack), comparison });
  } catch (error) {
    if (error instanceof ImageNotSound || (error as NodeJS.ErrnoException).code === "ENOENT") return undefined;
    throw error;
  }
}

async function otherApproved(tx: Transaction, sha256: Buffer, chipId: string): Promise<{ designator: string; caseRef: string } | null> {
  const other = await Approval.findOne({ where: { sha256, chipId: { [Op.ne]: chipId } }, transaction: tx });
  if (!other) return null;
  const there = await placeOfChip(other.chipId, tx);
  return { designator: there.chip.designator, caseRef: there.case.ref };
}
