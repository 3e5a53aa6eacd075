/** Only what differs from the record: a correction names the fields it changes and no others. Empty counts as null. */
export function changedFields<T extends object>(before: T, after: Partial<T>): Partial<T> {
  const same = (a: unknown, b: unknown) => (a ?? null) === (b ?? null);
  return Object.fromEntries(Object.entries(after).filter(([key, value]) => value !== undefined && !same(before[key as keyof T], value))) as Partial<T>;
}
