export interface ReturnedMailFacts {
  workshop: string;
  caseRef: string;
  items: string[];
  carrier: string | null;
  tracking: string | null;
  sealNumber: string | null;
  /** the day from which the images are due for erasure, as text */
  eraseOn: string;
}

export const returnedSubject = (caseRef: string) => `What goes back to you for case ${caseRef}`;

/** Tells the customer what is on its way. Names, addresses and digests stay out of it. */
export function returnedText(f: ReturnedMailFacts): string {
  const way = [f.carrier && `Carrier: ${f.carrier}`, f.tracking && `Tracking number: ${f.tracking}`, f.sealNumber && `Number of the seal: ${f.sealNumber}`].filter(Boolean);
  return `Hello,

this goes back to you for case ${f.caseRef}:

${f.items.map((item) => `- ${item}`).join("\n")}
${way.length > 0 ? `\n${way.join("\n")}\n` : ""}
Compare the parcel with this list and with the slip in it. If something is
missing${f.sealNumber ? ", or the seal is broken or has another number" : ""}, answer this mail.

If the drive starts, copy your files to another drive first. Keep your original
board. We keep the images of its chips until ${f.eraseOn}; from then on
they are due for erasure. If you want them kept longer, or erased sooner, tell us
before that day.

${f.workshop}
`;
}
