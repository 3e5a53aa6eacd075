import { driveLetter } from "@/lib/commands/place";
import { allow, inCases } from "@/lib/commands/refuse";
import type { Actor } from "@/lib/core/words";
import type { CustodyHeadRow, ListView } from "@/lib/views";
import { Case, CustodyHead, Drive } from "@/models";

/** Where the chain of every drive stands, the newest case first; paged by the database. */
export async function custodyHeads(actor: Actor, { page, pageSize }: { page: number; pageSize: number }): Promise<ListView<CustodyHeadRow>> {
  allow(actor, "custody.read");
  const { rows, count } = await Drive.findAndCountAll({
    where: inCases(actor, "caseId"),
    include: [{ model: Case, as: "case", required: true }], order: [[{ model: Case, as: "case" }, "ref", "DESC"], ["position", "ASC"]],
    limit: pageSize, offset: (page - 1) * pageSize, distinct: true,
  });
  const cases = new Map((await Case.findAll({ where: { id: rows.map((d) => d.caseId) } })).map((c) => [c.id, c]));
  const heads = new Map((await CustodyHead.findAll({ where: { chainId: rows.map((d) => d.id) } })).map((h) => [h.chainId, h]));
  const items = rows.map((drive): CustodyHeadRow => {
    const head = heads.get(drive.id);
    return {
      driveId: drive.id, letter: driveLetter(drive), label: drive.partNumber ?? drive.model ?? drive.serial ?? "", caseId: drive.caseId,
      caseRef: cases.get(drive.caseId)?.ref ?? "", entries: head?.seq ?? 0, hash: head?.hash.toString("hex") ?? "", lastAt: head?.at ?? "",
    };
  });
  return { items, total: count, page, pageSize };
}
