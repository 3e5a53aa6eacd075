/** Numbers and names as people read them: the one place that decides on commas, units and "Reads 1 and 3". */

/** 524288 is "524,288". Fixed form, so that a sentence in the log never depends on a machine's locale. */
export function withCommas(n: number): string {
  return String(n).replace(/\B(?=(\d{3})+(?!\d))/g, ",");
}

/** "1 byte", "214 bytes". */
export function countOf(n: number, noun: string): string {
  return `${withCommas(n)} ${noun}${n === 1 ? "" : "s"}`;
}

/** Size in bytes as "512 KiB", "16 MiB" or, where neither is exact, "300 bytes". */
export function sizeText(bytes: number): string {
  if (bytes >= 1_048_576 && bytes % 1_048_576 === 0) return `${withCommas(bytes / 1_048_576)} MiB`;
  if (bytes >= 1024 && bytes % 1024 === 0) return `${withCommas(bytes / 1024)} KiB`;
  return countOf(bytes, "byte");
}

/** How far a file has come, in whole KiB: "12,288 of 65,536 KiB", or "12,288 KiB" where its size is not known. */
export function comeText(come: number, of: number | null): string {
  const kib = (bytes: number) => withCommas(Math.floor(bytes / 1024));
  return of ? `${kib(come)} of ${kib(of)} KiB` : `${kib(come)} KiB`;
}

/** ["A","B","C"] is "A, B and C". */
export function listText(items: readonly string[]): string {
  if (items.length < 2) return items[0] ?? "";
  return `${items.slice(0, -1).join(", ")} and ${items[items.length - 1]}`;
}

/** [1, 3, 4] is "Reads 1, 3 and 4"; [2] is "Read 2". `word` is the stage's word: Read, Own or Back. */
export function readsText(numbers: readonly number[], word = "Read"): string {
  const plural = numbers.length > 1 && word === "Read" ? "s" : "";
  return `${word}${plural} ${listText(numbers.map(String))}`;
}

export function isPowerOfTwo(n: number): boolean {
  return Number.isInteger(n) && n > 0 && Number.isInteger(Math.log2(n));
}
