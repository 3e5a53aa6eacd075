import { SYSTEM } from "@/lib/core/words";
import { openShare } from "@/lib/queries/open-share";
import { Drive, inTransaction, Share } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { notFound } from "./refuse";

/** Writes down that a customer's link was opened, the first time only. Told by the page's script: mail scanners only fetch. */
export async function noteOpened(token: string): Promise<void> {
  const known = await openShare(token);
  if (!known) throw notFound("summary");
  if (known.openedAt) return;
  const drives = (await Drive.findAll({ where: { caseId: known.caseId } })).map((d) => d.id).sort();
  await inTransaction(async (tx) => {
    for (const id of drives) await lockChain(tx, id);
    const share = (await Share.findByPk(known.id, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
    if (share.openedAt || share.withdrawnAt) return;
    await share.update({ openedAt: new Date() }, { transaction: tx });
    for (const id of drives) await appendEntry(tx, id, SYSTEM, "summary.opened", { type: "share", id: share.id }, { share: share.id });
  }, { receipt: false });
}
