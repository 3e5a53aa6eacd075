import { countOf } from "@/lib/core/quantity";

interface Contact {
  email: string | null;
  phone: string | null;
}

export interface RequestMailFacts {
  workshop: string;
  /** lines; may be empty */
  address: readonly string[];
  contact: Contact;
  refChecked: string;
  link: string;
  /** a new link in place of the former one */
  again: boolean;
}

export const requestSubject = (refChecked: string, again: boolean) => (again ? `A new link for your case ${refChecked}` : `Your request, case ${refChecked}`);

const reach = ({ email, phone }: Contact) => [email, phone].filter(Boolean).join(", ");

/** The mail that takes the private link to the customer. */
export function requestText(f: RequestMailFacts): string {
  const ask = reach(f.contact);
  const first = f.again
    ? `here is a new private link for your case ${f.refChecked}. The former one\nshows nothing any more.`
    : `your request is with us. Your case number, from now until the parcel is\nback with you:\n\n${f.refChecked}`;
  const send = f.address.length > 0 ? `\nThe parcel goes to\n\n${[f.workshop, ...f.address].map((one) => `  ${one}`).join("\n")}\n` : "";
  return `Hello,

${first}

Under this link you find how it stands, and the slip to print and to put in
the parcel. There you can also withdraw the request or ask for deletion:

${f.link}

The link is private: whoever has it sees the page.
${f.again ? "" : `${send}
Please don't power the drive again: each try can spoil the chips further.
Send the enclosure with its small board, too; it may hold the key to your data.
`}${ask ? `\nQuestions, also about your data: ${ask}\n` : ""}
If you didn't ask for this, somebody mistyped an address. Then do nothing, or
tell us, and we delete it.

${f.workshop}
`;
}

export interface RequestDeskFacts {
  workshop: string;
  refChecked: string;
  damage: string;
  photos: number;
  /** of the case, at the desk */
  link: string;
}

export const requestDeskSubject = (refChecked: string) => `New request, case ${refChecked}`;

/** The mail that tells the desk of a request: no name and nothing that the customer typed. */
export function requestDeskText(f: RequestDeskFacts): string {
  return `Hello,

a customer asked for a chip transfer: case ${f.refChecked}.
Damage: ${f.damage}. ${f.photos > 0 ? `${countOf(f.photos, "photo")} came along.` : "No photo came along."}
The parcel is not here yet. All answers stand on the case's page:

${f.link}

${f.workshop}
`;
}

export const deletionSubject = (refChecked: string) => `A customer asks for deletion, case ${refChecked}`;

/** The mail to the leads: a customer asked for deletion. */
export function deletionText(f: { workshop: string; refChecked: string; answerBy: string; link: string }): string {
  return `Hello,

the customer of case ${f.refChecked} asks for deletion. A lead answers
by ${f.answerBy}. What they wrote stands on the case's page:

${f.link}

What of it has to be kept, and for how long, local law says. The digests in the
custody log stay in any case; no name is in it.

${f.workshop}
`;
}
