import { boardName } from "@/lib/core/board-name";
import type { AskedDrive } from "@/lib/core/drive-from-request";
import { ENCLOSURE_WORDS, type Enclosure } from "@/lib/core/request-words";
import type { ParcelView } from "@/lib/views";

export interface ParcelLine {
  what: string;
  /** as the customer typed it */
  asked: string;
}

const FIELDS: [keyof AskedDrive, string][] = [["partNumber", "Part number"], ["serial", "Serial number"], ["model", "Model"], ["capacity", "Capacity"], ["made", "Made"], ["interface", "Interface"]];

/** What the request says would be in the parcel, line by line. */
export function parcelLines({ asked, enclosure }: Pick<ParcelView, "asked" | "enclosure">): ParcelLine[] {
  const lines = FIELDS.flatMap(([field, what]) => (asked[field] ? [{ what, asked: asked[field] }] : []));
  if (asked.boardNumber) lines.push({ what: "Board number", asked: boardName({ boardNumber: asked.boardNumber, revision: asked.revision ?? null }) });
  if (enclosure === "sent") lines.push({ what: "Enclosure", asked: "sent along with its small board" });
  return lines;
}

/** What the customer said about the enclosure; null where they were not asked. */
export function enclosureWords(enclosure: string | null): string | null {
  return enclosure !== null && Object.hasOwn(ENCLOSURE_WORDS, enclosure) ? ENCLOSURE_WORDS[enclosure as Enclosure] : null;
}
