/** Case numbers: one from request to return, "26-0183", on labels with a check character, "26-0183.4". */

const ALPHABET = "0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ";

/** Year (2026 or 26) and count within it: `caseRef(2026, 42)` is "26-0042". */
export function caseRef(year: number, n: number): string {
  return `${String(year % 100).padStart(2, "0")}-${String(n).padStart(4, "0")}`;
}

/** ISO/IEC 7064 MOD 37,36 over the letters and digits of the text, in any case; the rest is passed over. */
export function checkCharacter(text: string): string {
  let p = 36;
  for (const character of text.toUpperCase()) {
    const value = ALPHABET.indexOf(character);
    if (value < 0) continue;
    const sum = (p + value) % 36 || 36;
    p = (sum * 2) % 37;
  }
  return ALPHABET[(37 - p) % 36];
}

/** "26-0183" becomes "26-0183.4". */
export function withCheck(ref: string): string {
  return `${ref}.${checkCharacter(ref)}`;
}

export type CaseRefReading =
  | { kind: "ref"; ref: string }
  | { kind: "check-character-differs"; ref: string; found: string; expected: string }
  | { kind: "no-ref" };

/** Reads what was typed or scanned, both forms, any case, and tells a mistyped number from something else. */
export function readCaseRef(text: string): CaseRefReading {
  // a longer count never starts with a zero: one case has one number
  const match = /^(\d{2}-(?:\d{4}|[1-9]\d{4,8}))(?:\.([0-9A-Z]))?$/i.exec(text.trim());
  if (!match) return { kind: "no-ref" };
  const [, ref, character] = match;
  const expected = checkCharacter(ref);
  const found = character?.toUpperCase();
  if (found !== undefined && found !== expected) return { kind: "check-character-differs", ref, found, expected };
  return { kind: "ref", ref };
}

/** The plain number, or null when it is none or its check character doesn't fit. */
export function parseCaseRef(text: string): string | null {
  const reading = readCaseRef(text);
  return reading.kind === "ref" ? reading.ref : null;
}

/** True when the text has the form of a case number and only its check character doesn't fit. */
export function checkCharacterDiffers(text: string): boolean {
  return readCaseRef(text).kind === "check-character-differs";
}
