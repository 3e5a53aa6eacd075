export interface ParcelMailFacts {
  workshop: string;
  caseRef: string;
  receivedAt: Date;
  /** IANA name */
  timeZone: string;
}

export const parcelSubject = (caseRef: string) => `Your parcel for case ${caseRef} is here`;

/** Tells the customer that the parcel has arrived. What was found in it stays in the workshop. */
export function parcelText(f: ParcelMailFacts): string {
  const when = new Intl.DateTimeFormat("en-GB", { dateStyle: "long", timeStyle: "short", timeZone: f.timeZone }).format(f.receivedAt);
  return `Hello,

your parcel for case ${f.caseRef} is here. We received it on
${when}.

Next we record the drive and its board and read the chips. Nothing is ever
written to your own board. The private link that you got with your request
shows how far we are.

Keep the case number: ${f.caseRef}. If you did not send a parcel, answer
this mail.

${f.workshop}
`;
}
