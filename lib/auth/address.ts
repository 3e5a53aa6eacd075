const printable = (text: string) => text.replace(/[^\x20-\x7e]/g, "").slice(0, 64);

/** Next puts the peer's address into X-Forwarded-For; a proxy in front appends the one it saw, so the last one is the nearest. */
export function addressOf(forwarded: string | null | undefined): string {
  return printable(String(forwarded ?? "").split(",").at(-1)!.trim()) || "unknown";
}
