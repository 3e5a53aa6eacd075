import type { Actor } from "@/lib/core/words";
import { people } from "@/lib/queries/people";
import { shareView } from "@/lib/queries/share-view";
import type { ShareView } from "@/lib/views";
import { Drive, inTransaction, Share } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { allow, allowCase, notFound } from "./refuse";

/** Ends a customer's link at once; a link that has ended stays as it is. */
export async function withdrawShare(actor: Actor, shareId: string): Promise<{ share: ShareView }> {
  allow(actor, "share.withdraw");
  const known = await Share.findByPk(shareId);
  if (!known) throw notFound("link");
  allowCase(actor, known.caseId, "link");
  const drives = (await Drive.findAll({ where: { caseId: known.caseId } })).map((d) => d.id).sort();
  return inTransaction(async (tx) => {
    for (const id of drives) await lockChain(tx, id);
    const share = (await Share.findByPk(shareId, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
    if (!share.withdrawnAt) {
      await share.update({ withdrawnAt: new Date() }, { transaction: tx });
      for (const id of drives) await appendEntry(tx, id, actor, "share.withdrawn", { type: "share", id: shareId }, { share: shareId });
    }
    return { share: shareView(share, await people(tx)) };
  });
}
