import { countOf } from "@/lib/core/quantity";
import type { EraseCause } from "@/lib/core/words";

export interface ErasedMailFacts {
  workshop: string;
  caseRef: string;
  cause: EraseCause;
  images: number;
  photos: number;
  /** the same bytes are used elsewhere too */
  kept: number;
  /** as text, "3 March 2027" */
  day: string;
}

export const erasedMailSubject = (caseRef: string) => `The images of your case ${caseRef} are erased`;

/** Tells the customer what was erased, and what that does not reach. */
export function erasedMailText(f: ErasedMailFacts): string {
  const kept = f.kept === 0 ? "" : `
${f.kept === 1 ? "One more stays" : `${f.kept} more stay`}: exactly the same bytes belong to other work of ours, too.
${f.kept === 1 ? "It is" : "They are"} no longer kept for your case.
`;
  return `Hello,

on ${f.day} we erased the images that we kept for case ${f.caseRef}
${f.cause === "asked-for" ? "as you asked" : "because its time was over"}: ${[...(f.images > 0 || f.photos === 0 ? [`${countOf(f.images, "image")} of chips`] : []), ...(f.photos > 0 ? [`${f.photos} ${f.photos === 1 ? "photo or document" : "photos and documents"}`] : [])].join(", ")}.
They can't be brought back.
${kept}
What stays is what you told us when you asked for the work, and the log of every
step with the check numbers (SHA-256) of the images. Your name is not in the log,
and no image can be made from it.

This does not reach what left our store before: the chips on your boards, files
that somebody took with them, and copies in our backups until these run out.
Answer this mail if you want to know more.

${f.workshop}
`;
}

export interface DeletionAnswerFacts {
  workshop: string;
  caseRef: string;
  answer: string;
  askedOn: string;
  /** as text; null where it has no day yet */
  eraseOn: string | null;
}

export const deletionAnswerSubject = (caseRef: string) => `Your wish for deletion, case ${caseRef}`;

/** The lead's answer to a customer whose wish can't be met yet. */
export function deletionAnswerText(f: DeletionAnswerFacts): string {
  return `Hello,

on ${f.askedOn} you asked for deletion, case ${f.caseRef}.
We can't do that yet. Why, in the words of our lead technician:

${f.answer}

${f.eraseOn ? `As it stands, the images of your chips are due for erasure on ${f.eraseOn}.` : "The images of your chips get their day of erasure when the case is closed."}
Your wish stays on record. If you don't agree, answer this mail; you can also turn
to the authority for data protection where you live.

${f.workshop}
`;
}
