import { Case, Image, Request, type Transaction } from "@/models";
import { env } from "@/lib/env";
import type { ErasureFacts } from "@/lib/core/erasure";
import { type ImageUse, imagesOfCase, usesOfImages } from "./image-uses";
import { dayIn } from "./workshop-day";

/** One image that an erasure of this case is about. */
export interface ErasureItem {
  sha256: string;
  sizeBytes: number;
  /** what it is kept as in this case, "Drive A, Orig U12, Read 2" */
  names: string[];
  /** nothing but a photo or document */
  photo: boolean;
  /** every use, also by other cases */
  uses: ImageUse[];
}

/** Its images were erased, and it was not opened again since: it lays no claim to them any more. */
const isErased = ({ closedAt, erasedAt }: Pick<Case, "closedAt" | "erasedAt">): boolean => Boolean(closedAt && erasedAt);

const shortName = (name: string) => name.replace(/^Case [^,]+, /, "");

/**
 * What would go if the images of this case were erased now, and what would stay because another case that isn't erased, or
 * a board of the shelf, uses the same bytes. With `tx` the images' rows are locked first: no use can come in between.
 */
export async function erasureItems(caseId: string, tx?: Transaction): Promise<{ goes: ErasureItem[]; stays: ErasureItem[] }> {
  const digests = await imagesOfCase(caseId, tx);
  const images = digests.length === 0 ? [] : await Image.findAll({
    attributes: ["sha256", "sizeBytes", "state"], where: { sha256: digests }, order: ["sha256"], ...(tx ? { transaction: tx, lock: tx.LOCK.UPDATE } : {}),
  });
  const stored = images.filter((image) => image.state !== "erased");
  const uses = await usesOfImages(stored.map((image) => image.sha256), tx);
  const others = [...new Set(uses.flatMap((use) => (use.caseId !== null && use.caseId !== caseId ? [use.caseId] : [])))];
  const rows = others.length === 0 ? [] : await Case.findAll({ attributes: ["id", "closedAt", "erasedAt"], where: { id: others }, transaction: tx });
  const erased = new Set(rows.filter(isErased).map((row) => row.id));
  const claims = (use: ImageUse) => use.shelf || (use.caseId !== caseId && !(use.caseId !== null && erased.has(use.caseId)));
  const items = stored.map((image): ErasureItem & { stays: boolean } => {
    const sha256 = image.sha256.toString("hex");
    const all = uses.filter((use) => use.sha256 === sha256);
    const mine = all.filter((use) => use.caseId === caseId && !use.shelf);
    return { sha256, sizeBytes: image.sizeBytes, names: [...new Set(mine.map((use) => shortName(use.name)))], photo: mine.every((use) => use.kind === "photo" || use.kind === "document"), uses: all, stays: all.some(claims) };
  });
  const plain = ({ stays: _stays, ...item }: ErasureItem & { stays: boolean }): ErasureItem => item;
  return { goes: items.filter((item) => !item.stays).map(plain), stays: items.filter((item) => item.stays).map(plain) };
}

export async function erasureFacts(found: Case, counts: { images: number; kept: number }, tx?: Transaction): Promise<ErasureFacts> {
  const { timeZone } = env();
  const request = await Request.findOne({ where: { caseId: found.id }, attributes: ["deletionAskedAt", "deletionAnsweredAt"], transaction: tx });
  return {
    caseRef: found.ref, closed: Boolean(found.closedAt), today: dayIn(timeZone, new Date()), eraseOn: found.eraseOn ?? null,
    keptUntil: found.keptUntil ?? null, keptReason: found.keptReason ?? null, wish: request?.deletionAskedAt ? { answered: Boolean(request.deletionAnsweredAt) } : null,
    erasedOn: found.erasedAt && isErased(found) ? dayIn(timeZone, found.erasedAt) : null, ...counts,
  };
}
