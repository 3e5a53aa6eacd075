/** name, what the log says, what the row says */
export type Pair = [name: string, log: unknown, row: unknown];

const words = (value: unknown) => (value === null || value === undefined ? "nothing" : String(value));

/** Tells of each pair whose two sides are not the same to the eye, in the words of a report. */
export function compare(pairs: readonly Pair[], tell: (expected: string, found: string) => void): void {
  for (const [name, log, row] of pairs) if (words(log) !== words(row)) tell(`${name} ${words(log)}`, `${name} ${words(row)}`);
}
