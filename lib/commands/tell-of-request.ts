import { withCheck } from "@/lib/core/case-number";
import { env } from "@/lib/env";
import { requestDeskSubject, requestDeskText, requestSubject, requestText } from "@/lib/mail/request-text";
import type { Case, Customer, Transaction } from "@/models";
import { queueAlarm } from "./queue-alarm";
import { queueMail } from "./queue-mail";

const MASK = "(private link, hidden)";

/** The mail with the private link; nothing that the sender typed is in it, because nobody knows yet whose address it is. */
export async function mailPrivateLink(tx: Transaction, found: Case, customer: Customer, token: string, again: boolean): Promise<void> {
  const { workshop, workshopAddress, workshopContact: contact, publicUrl } = env();
  const refChecked = withCheck(found.ref);
  const text = (secret: string) => requestText({ workshop, address: workshopAddress, contact, refChecked, link: `${publicUrl}/request/${secret}`, again });
  await queueMail(tx, { kind: again ? "request-link" : "request-customer", to: customer.email, subject: requestSubject(refChecked, again), text: text(token), maskedText: text(MASK) });
}

/** Two mails: one to the customer, one to the desk, or to the leads where the workshop has named no address. */
export async function tellOfRequest(tx: Transaction, found: Case, customer: Customer, { token, photos, damage }: { token: string; photos: number; damage: string }): Promise<void> {
  await mailPrivateLink(tx, found, customer, token, false);
  const { workshop, workshopContact, publicUrl } = env();
  const refChecked = withCheck(found.ref);
  const [subject, text] = [requestDeskSubject(refChecked), requestDeskText({ workshop, refChecked, damage, photos, link: `${publicUrl}/cases/${found.id}` })];
  if (workshopContact.email) await queueMail(tx, { kind: "request-desk", to: workshopContact.email, subject, text, maskedText: text });
  else await queueAlarm(tx, { kind: "request-desk", roles: ["lead"], caseId: found.id, subject, text });
}
