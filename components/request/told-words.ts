import { CONSENT_FIELD, CONSENTS, consentWords, DAMAGE_WORDS, ENCLOSURE_WORDS, IMPORTANCE_WORDS, LOCK_WORDS } from "@/lib/core/request-words";
import { dueText } from "@/components/ui/times";
import type { RequestAnswers } from "@/lib/schemas/request";

export interface Told {
  term: string;
  text: string;
  mono?: boolean;
}
export interface ToldGroup {
  title: string;
  lines: Told[];
}

/** for an answer that was left out */
export const NONE = "not given";

/** Every answer as it was typed, in the order of the form: for the customer's page and the desk. */
export function toldGroups(a: RequestAnswers): ToldGroup[] {
  const of = (term: string, text: string | null | undefined, mono = false): Told => ({ term, text: text ?? NONE, mono: mono && Boolean(text) });
  return [
    { title: "You", lines: [of("Name", a.name), of("Company", a.company), of("E-mail", a.email), of("Phone", a.phone), of("Goes back to", a.returnAddress)] },
    { title: "The drive’s label", lines: [of("Part number", a.partNumber, true), of("Serial number", a.serial, true), of("Capacity", a.capacity), of("Made", a.made), of("Model", a.model), of("Interface", a.interface)] },
    { title: "The board", lines: [of("Board number", a.boardHidden === "yes" && !a.boardNumber ? "can’t be seen without taking the board off" : a.boardNumber, Boolean(a.boardNumber)), of("Revision", a.boardRevision, true), of("Enclosure", ENCLOSURE_WORDS[a.enclosure]), of("Password or encryption", LOCK_WORDS[a.lock])] },
    { title: "What happened", lines: [of("Damage", DAMAGE_WORDS[a.damage]), of("In your own words", a.happened), of("Tried since", a.tried), of("How much hangs on it", IMPORTANCE_WORDS[a.importance]), of("Needed by", a.neededBy ? dueText(a.neededBy) : null)] },
    { title: "Your leave", lines: [...CONSENTS.filter((consent) => a[CONSENT_FIELD[consent] as keyof RequestAnswers] === "yes").map((consent, i) => ({ term: `Ticked, line ${i + 1}`, text: consentWords(consent, a.keepDays) })), of("Signed", a.signature)] },
  ];
}
