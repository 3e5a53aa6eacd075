import { summarySubject, summaryText } from "./summary-text";
import { deletionAnswerSubject, deletionAnswerText, erasedMailSubject, erasedMailText } from "./erasure-text";
import { parcelSubject, parcelText } from "./parcel-text";
import { requestDeskSubject, requestDeskText, requestSubject, requestText } from "./request-text";
import { returnedSubject, returnedText } from "./returned-text";
import { sealMailSubject, sealMailText, withNewestSeal } from "./seal-text";

export interface Template {
  kind: string;
  /** when it is written, and to whom */
  when: string;
  subject: string;
  text: string;
}

const LINK = "https://twinread.workshop.example/request/(private link, hidden)";
const SHA = "5f0c".repeat(16);

const AT = "2026-03-12T13:48:00Z";
const chip = (designator: string) => ({
  designator, verified: true, agreeingReads: 3, seatings: 2, readBacks: 2, composite: null, approvedAt: AT, transferredAt: AT, transferKind: "write" as const,
  readBy: ["in-place" as const], writtenWith: null, verifiedAt: AT,
});

/** Every kind of mail to people outside, with invented facts: what the outbox page shows before one is ever sent. */
export function mailTemplates({ workshop, timeZone }: { workshop: string; timeZone: string }): Template[] {
  const at = new Date("2026-03-12T13:48:00Z");
  const request = { workshop, address: ["12 Alder Lane", "Fennick ZZ0 8BD"], contact: { email: "desk@workshop.example", phone: null }, refChecked: "26-0183.4", link: LINK };
  const all: Template[] = [
    { kind: "request-customer", when: "To the customer, when a request was sent", subject: requestSubject("26-0183.4", false), text: requestText({ ...request, again: false }) },
    { kind: "request-link", when: "To the customer, when a lead makes a new private link", subject: requestSubject("26-0183.4", true), text: requestText({ ...request, again: true }) },
    { kind: "request-desk", when: "To the workshop's contact, when a request was sent", subject: requestDeskSubject("26-0183.4"), text: requestDeskText({ workshop, refChecked: "26-0183.4", damage: "power surge or lightning", photos: 2, link: "https://twinread.workshop.example/cases/…" }) },
    { kind: "parcel-received", when: "To the customer, when the parcel is here", subject: parcelSubject("26-0183"), text: parcelText({ workshop, caseRef: "26-0183", receivedAt: at, timeZone }) },
    { kind: "summary", when: "To the customer, when a lead sends the summary", subject: summarySubject("26-0183"), text: summaryText({
      workshop, caseRef: "26-0183", link: "https://twinread.workshop.example/summary/(private link, hidden)", expiresAt: new Date("2026-06-10T00:00:00Z"), timeZone, logKeyId: SHA, seal: { number: 41, sha256: SHA, keyId: SHA },
      summary: { drives: [{ letter: "A", chips: [chip("U12")], startUp: { spins: true, ready: true, reportedSerial: null, serialMatches: true, attempts: 1, at: AT } }], twoPersonRule: true, comesBack: { items: [], at: null } },
      drives: [{ letter: "A", label: "PN 4471-0093-B", head: { seq: 42, hash: SHA } }],
    }) },
    { kind: "case-returned", when: "To the customer, when something goes back", subject: returnedSubject("26-0183"), text: returnedText({ workshop, caseRef: "26-0183", items: ["Drive A with the donor board", "Original board BX 40-3179 rev C"], carrier: "By hand", tracking: null, sealNumber: "S-4411", eraseOn: "10 June 2026" }) },
    { kind: "deletion-answer", when: "To the customer, when a lead says why their wish for deletion can't be met yet", subject: deletionAnswerSubject("26-0183.4"), text: deletionAnswerText({ workshop, caseRef: "26-0183.4", answer: "Your drive is still being tested. As long as it is here its images may be needed.", askedOn: "12 March 2026", eraseOn: "10 June 2026" }) },
    { kind: "case-erased", when: "To the customer, when the images of their case were erased", subject: erasedMailSubject("26-0183.4"), text: erasedMailText({ workshop, caseRef: "26-0183.4", cause: "asked-for", images: 6, photos: 4, kept: 1, day: "12 March 2026" }) },
    { kind: "seal", when: "To the auditors, each day and when somebody asks for a seal", subject: sealMailSubject(41, workshop), text: sealMailText({ workshop, number: 41, text: `twinread-seal/1\n41\n2026-03-12T00:00:04.120000Z\n12\n${SHA}\n${SHA}\n`, signature: "A".repeat(86) + "==", keyId: SHA, sha256: SHA }) },
  ];
  return all.map((one) => ({ ...one, text: withNewestSeal(one.text, { number: 41, sha256: SHA }) }));
}
