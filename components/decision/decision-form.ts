export function reasonLength(text: string | undefined): number {
  return (text ?? "").trim().length;
}

/** The last 8 digits as typed, blanks and capitals aside. */
export function sameDigits(typed: string, sha256: string): boolean {
  return typed.replace(/\s+/g, "").toLowerCase() === sha256.slice(-8);
}
