import { countOf } from "./quantity";
import type { EraseCause } from "./words";

/** What decides whether the images of a case may be erased. Days are calendar days of the workshop (year-month-day). */
export interface ErasureFacts {
  caseRef: string;
  closed: boolean;
  today: string;
  eraseOn: string | null;
  keptUntil: string | null;
  keptReason: string | null;
  /** the customer asked for deletion, and whether a lead has answered */
  wish: { answered: boolean } | null;
  /** the newest erasure of this case, as a day */
  erasedOn: string | null;
  /** what would go now */
  images: number;
  /** what is stored and would stay, used elsewhere too */
  kept: number;
}

const long = new Intl.DateTimeFormat("en-GB", { dateStyle: "long", timeZone: "UTC" });

/** "3 March 2027" of a calendar day. */
export const longDay = (day: string): string => long.format(new Date(`${day}T12:00:00Z`));

/** A lead keeps the images longer, and that day has not come. */
export const isKeptLonger = ({ keptUntil, today }: Pick<ErasureFacts, "keptUntil" | "today">): boolean => keptUntil !== null && today < keptUntil;

/** From this day on the images may be erased without a wish; null while the case is open. */
export function dueDay({ eraseOn, keptUntil }: Pick<ErasureFacts, "eraseOn" | "keptUntil">): string | null {
  return eraseOn !== null && keptUntil !== null && keptUntil > eraseOn ? keptUntil : eraseOn;
}

export function isDue(f: Pick<ErasureFacts, "closed" | "eraseOn" | "keptUntil" | "today">): boolean {
  const day = dueDay(f);
  return f.closed && day !== null && f.today >= day;
}

/** A wish that nobody has answered comes first, also when the day has come by itself. */
export const erasureCause = (f: ErasureFacts): EraseCause => (f.wish && (!f.wish.answered || !isDue(f)) ? "asked-for" : "due");

/** Why the images can't be erased now, and what to do; null when they can. */
export function erasureRefusal(f: ErasureFacts): string | null {
  if (!f.closed) return `Case ${f.caseRef} is open: its images are still worked with. Close it first; then they can be erased.`;
  if (f.images === 0 && f.erasedOn !== null && f.kept === 0) return `The images of case ${f.caseRef} were erased on ${longDay(f.erasedOn)} already. There is nothing left to erase; print the certificate.`;
  if (f.images === 0 && f.erasedOn !== null) return `The images of case ${f.caseRef} were erased on ${longDay(f.erasedOn)} already. ${countOf(f.kept, "image")} that another case uses too stay${f.kept === 1 ? "s" : ""} until that one is erased.`;
  if (f.images + f.kept === 0) return `Case ${f.caseRef} has no stored image and no photo, so there is nothing to erase.`;
  if (isKeptLonger(f)) return `The images of case ${f.caseRef} are kept until ${longDay(f.keptUntil!)}: ${f.keptReason ?? ""} Erase them after that day, or end the keeping first.`;
  if (f.wish || isDue(f)) return null;
  return f.eraseOn === null
    ? `Case ${f.caseRef} has no day from which its images are due. Reopen it and close it again: then it gets one.`
    : `The images of case ${f.caseRef} are due for erasure on ${longDay(f.eraseOn)}. Before that day only the customer’s own wish lets them go, asked for on their private page. Wait for one of the two.`;
}

/** "on 3 March 2027 at the customer's wish" */
export const erasedWhen = (day: string, cause: EraseCause): string => `on ${longDay(day)}${cause === "asked-for" ? " at the customer’s wish" : ", when its keeping time was over"}`;

/** What whoever opens an erased image is told. */
export const erasedSentence = (day: string, cause: EraseCause): string => `This image was erased ${erasedWhen(day, cause)}; its SHA-256 stays in the log.`;
