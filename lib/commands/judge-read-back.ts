import { Op } from "sequelize";
import { createAndMatch, judgeReadBack } from "@/lib/core/findings";
import type { ImageFacts } from "@/lib/core/inspect";
import type { Finding } from "@/lib/core/words";
import { Approval, Image, Read, type Transaction, Transfer } from "@/models";
import { imageChunks } from "@/storage";
import { compareIfStored } from "./compare-images";
import { breathe, inTurn } from "./in-turn";
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
  return judgeReadBack({
    facts, read: { sha256, sizeBytes: read.sizeBytes }, approved: { sha256: approvedSha256, sizeBytes: approved.sizeBytes },
    donorSaved: saved.map((r) => r.sha256.toString("hex")),
    equalsAnd: !equal && old !== undefined && read.sizeBytes === approved.sizeBytes && (await equalsAnd(approvedSha256, old.sha256.toString("hex"), sha256)),
    otherApproved: equal ? null : await otherApproved(tx, read.sha256, transfer.chipId),
    comparison: comparison && { differingBytes: comparison.differingBytes, first: comparison.first, last: comparison.last },
  });
}

/** Flash that was programmed without an erase holds approved AND old, bit by bit. */
function equalsAnd(approved: string, old: string, readBack: string): Promise<boolean> {
  return inTurn(async () => {
    const match = createAndMatch();
    const olds = imageChunks(old);
    const backs = imageChunks(readBack);
    try {
      for await (const chunk of imageChunks(approved)) {
        const [o, b] = [(await olds.next()).value, (await backs.next()).value];
        if (!o || !b) return false;
        match.push(chunk, o, b);
        if (!match.matches()) return false;
        await breathe();
      }
      return match.matches();
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code === "ENOENT") return false;
      throw error;
    } finally {
      await olds.return(undefined);
      await backs.return(undefined);
    }
  });
}

async function otherApproved(tx: Transaction, sha256: Buffer, chipId: string): Promise<{ designator: string; caseRef: string } | null> {
  const other = await Approval.findOne({ where: { sha256, chipId: { [Op.ne]: chipId } }, transaction: tx });
  if (!other) return null;
  const there = await placeOfChip(other.chipId, tx);
  return { designator: there.chip.designator, caseRef: there.case.ref };
}
