import { erasedSentence } from "@/lib/core/erasure";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { dayIn } from "@/lib/queries/workshop-day";
import { Image, inTransaction, type Transaction } from "@/models";
import { liesStill, removeImage } from "@/storage";

/** The sentence for an erased image; null for one that is not. */
export function erasedText({ state, erasedAt, erasedCause }: Pick<Image, "state" | "erasedAt" | "erasedCause">): string | null {
  return state === "erased" && erasedAt ? erasedSentence(dayIn(env().timeZone, erasedAt), erasedCause ?? "due") : null;
}

/** Nothing is opened, judged or handed out of an image that was erased, also while its file still lies there. */
export async function refuseErased(sha256: string, tx?: Transaction): Promise<void> {
  const image = await Image.findByPk(Buffer.from(sha256, "hex"), { attributes: ["state", "erasedAt", "erasedCause"], transaction: tx });
  const text = image && erasedText(image);
  if (text) throw new AppError("rule-against", text);
}

/**
 * For whoever has put bytes into the store and now writes the row that uses them: until this transaction ends the image
 * is not erased. One that was erased in between is refused, for its file may be gone.
 */
export async function holdStored(tx: Transaction, sha256: Buffer): Promise<void> {
  const image = await Image.findByPk(sha256, { attributes: ["state"], transaction: tx, lock: tx.LOCK.SHARE });
  if (image?.state === "erased") throw new AppError("rule-against", "The same bytes were erased at this very moment, for another case. Nothing was stored; send the file once more.");
}

/** Takes the file of an erased image away, while nobody can put it back. False when it is not erased any more. */
export async function removeErased(sha256: string): Promise<boolean> {
  return inTransaction(async (tx) => {
    const image = await Image.findByPk(Buffer.from(sha256, "hex"), { attributes: ["sha256", "state"], transaction: tx, lock: tx.LOCK.UPDATE });
    if (image?.state !== "erased") return false;
    await removeImage(sha256);
    return true;
  }, { receipt: false });
}

/** What a crash between the entry and the file has left, or a backup has brought back. Answers how many were taken away. */
export async function finishErasures(): Promise<number> {
  let removed = 0;
  for (const { sha256 } of await Image.findAll({ attributes: ["sha256"], where: { state: "erased" } })) {
    const hex = sha256.toString("hex");
    try {
      if ((await liesStill(hex)) && (await removeErased(hex))) removed += 1;
    } catch (error) {
      // tried again in the next round; check:store names it meanwhile
      console.error(`the file of the erased image ${hex} could not be taken away:`, (error as Error).message);
    }
  }
  return removed;
}
