import type { AsSent } from "./words";

/** What is not as the request said, as one text for the receipt and the log; null when all is. */
export function differsText(lines: readonly { what: string; asSent: AsSent; text?: string | null }[], more?: string | null): string | null {
  const said = lines.flatMap((line) => {
    if (line.asSent === "yes") return [];
    const note = line.text ? `: ${line.text.replace(/\s+/g, " ")}` : "";
    return [line.asSent === "none" ? `${line.what} is not there${note}` : `${line.what} is not so${note}`];
  });
  return [...said, ...(more ? [more] : [])].join("; ") || null;
}

export const SEAL_WORDS: Record<AsSent, string> = { yes: "as it was sent", no: "not as it was sent", none: "none" };
export const SMALL_BOARD_WORDS: Record<AsSent, string> = { yes: "here, with the enclosure", no: "not here", none: "the drive has none" };

/** "12 characters" of a scan are no case number: what to tell whoever scanned. */
export const NOT_A_NUMBER = "This is not a case number. It looks like 26-0183 or, with its check character, 26-0183.4; it stands on the slip in the parcel.";

export function mistyped(ref: string): string {
  return `The check character does not fit ${ref}: one character was mistyped or misread. Compare each with the slip, or scan its square code.`;
}
