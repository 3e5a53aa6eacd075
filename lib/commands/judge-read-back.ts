import { Op } from "sequelize";
import { judgeReadBack, type ReadBackDiagnosis } from "@/lib/core/findings";
import type { ImageFacts } from "@/lib/core/inspect";
import type { Finding } from "@/lib/core/words";
import { engine } from "@/lib/engine/pool";
import { Approval, Image, Read, type Transaction, Transfer } from "@/models";
import { pathOfImage } from "@/storage";
import { type Compared, compareIfStored } from "./compare-images";
import { type ChipPlace, placeOfChip } from "./place";

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
  const diagnosis = comparison ? await diagnosisOf(approvedSha256, old?.sha256.toString("hex") ?? null, sha256, comparison) : undefined;
  return judgeReadBack({
    facts, read: { sha256, sizeBytes: read.sizeBytes }, approved: { sha256: approvedSha256, sizeBytes: approved.sizeBytes },
    donorSaved: saved.map((r) => r.sha256.toString("hex")),
    equalsAnd: diagnosis?.code === "not-erased" && !diagnosis.ranges, diagnosis,
    otherApproved: equal ? null : await otherApproved(tx, read.sha256, transfer.chipId),
    comparison: comparison && { differingBytes: comparison.differingBytes, first: comparison.first, last: comparison.last },
  });
}

/** How the write went as far as the bytes tell, with the comparison as it was counted; undefined when an image is gone. */
async function diagnosisOf(approved: string, old: string | null, readBack: string, comparison: Compared): Promise<ReadBackDiagnosis | undefined> {
  try {
    return await engine("readBack", { approved: pathOfImage(approved), old: old && pathOfImage(old), readBack: pathOfImage(readBack), comparison });
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return undefined;
    throw error;
  }
}

async function otherApproved(tx: Transaction, sha256: Buffer, chipId: string): Promise<{ designator: string; caseRef: string } | null> {
  const other = await Approval.findOne({ where: { sha256, chipId: { [Op.ne]: chipId } }, transaction: tx });
  if (!other) return null;
  const there = await placeOfChip(other.chipId, tx);
  return { designator: there.chip.designator, caseRef: there.case.ref };
}
