import type { Policy } from "@/lib/core/words";

export type NumberKey = "reads" | "seatings" | "readBacks" | "readBackSeatings" | "shareDays" | "erasureDays";

export interface Rule<Key extends keyof Policy = keyof Policy> {
  key: Key;
  label: string;
  /** why it is there, in plain words */
  why: string;
  /** where a person meets it */
  decides: string;
}

export const NUMBER_RULES: readonly (Rule<NumberKey> & { unit: string; min: number; max: number })[] = [
  { key: "reads", label: "Agreeing reads", unit: "reads", min: 2, max: 30, why: "So many counted reads of the original must be equal in every byte.", decides: "Opens the approval on the chip page." },
  { key: "seatings", label: "Seatings among them", unit: "seatings", min: 1, max: 30, why: "A seating is one time the clip or chip was put on. Two equal reads are not proof: a clip that sits wrong gives the same wrong image every time. A new seating is a new chance to find out.", decides: "Opens the approval on the chip page." },
  { key: "readBacks", label: "Equal read-backs", unit: "read-backs", min: 1, max: 30, why: "So many reads of the donor chip must equal the approved image after the write.", decides: "Makes a transfer verified." },
  { key: "readBackSeatings", label: "Seatings of the read-backs", unit: "seatings", min: 1, max: 30, why: "The same for the donor chip: the clip is put on anew in between.", decides: "Makes a transfer verified." },
  { key: "shareDays", label: "Days until a customer’s link expires", unit: "days", min: 1, max: 3650, why: "A private link is as good as a key. After this time it opens nothing.", decides: "Counts for links made from now on." },
  { key: "erasureDays", label: "Days until images fall due for erasure", unit: "days", min: 1, max: 3650, why: "A customer’s data isn’t kept longer than needed. Counted from the return of the case; digests stay for ever.", decides: "Counts from the day a case is returned." },
];

export const TWO_PERSON: Rule<"twoPersonRule"> = {
  key: "twoPersonRule", label: "Two-person rule", why: "Whoever took a read of the original, set aside or not, can’t approve its image. A workshop of one person may switch it off; every approval, log, bundle and summary then says so.", decides: "On the decision sheet.",
};

export const SECOND_FACTOR: Rule<"secondFactor"> = {
  key: "secondFactor", label: "Second factor to approve", why: "A code from a device beside the password. It isn’t available yet, so it stays off.", decides: "On the decision sheet, once it is there.",
};
