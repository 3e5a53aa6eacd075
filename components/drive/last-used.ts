/** What may be proposed again. A serial is one drive's own and is never kept. */
export const PROPOSED = ["partNumber", "model", "interface", "capacity", "made", "firmware", "boardNumber", "revision", "controllerMarking", "motorDriverMarking", "bus", "package", "marking", "holds"] as const;
export type Proposed = (typeof PROPOSED)[number];
export type LastUsed = Partial<Record<Proposed, string[]>>;

const KEPT = 8;
const keyOf = (userId: string) => `twinread.last-used.${userId}`;

/** What this person typed last at this browser, the latest first. Empty where storage is switched off. */
export function lastUsed(userId: string): LastUsed {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(keyOf(userId)) ?? "{}");
    if (typeof kept !== "object" || kept === null) return {};
    return Object.fromEntries(PROPOSED.flatMap((name) => {
      const list = (kept as Record<string, unknown>)[name];
      return Array.isArray(list) ? [[name, list.filter((value): value is string => typeof value === "string").slice(0, KEPT)]] : [];
    }));
  } catch {
    return {};
  }
}

/** The lists with these values in front, each once. */
export function withUsed(before: LastUsed, used: Partial<Record<string, unknown>>): LastUsed {
  const after: LastUsed = { ...before };
  for (const name of PROPOSED) {
    const value = used[name];
    if (typeof value === "string" && value.trim() !== "") after[name] = [value, ...(before[name] ?? []).filter((other) => other !== value)].slice(0, KEPT);
  }
  return after;
}

export function keepUsed(userId: string, used: Partial<Record<string, unknown>>): void {
  try {
    localStorage.setItem(keyOf(userId), JSON.stringify(withUsed(lastUsed(userId), used)));
  } catch {
    // full or switched off: the next form proposes nothing
  }
}
