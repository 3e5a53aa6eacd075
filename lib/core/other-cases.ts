/** Keeps the numbers of other cases out of what an auditor with a case list gets to read. */

/** A case number that stands by itself, with or without its check character: no part of a longer number or name. */
const REF = /(?<![\w.-])(\d{2}-(?:\d{4}|[1-9]\d{4,8}))(?:\.[0-9A-Z])?(?![\w-])/g;

/** What is put together of words, by us or by a person. Typed facts, digests and the log's bodies are left as they are. */
const SENTENCES: ReadonlySet<string> = new Set([
  "message", "advice", "sentence", "next", "nextWhy", "why", "reason", "reasons", "note", "statement", "text", "rule", "value", "fitReason", "closedReason", "damage", "condition",
]);

export const HIDDEN = "[another case]";

/** Calls `visit` for each sentence in a view and puts its answer in place; what is not a plain object or list stays. */
function mapSentences<T>(view: T, visit: (text: string) => string, within = false): T {
  if (typeof view === "string") return (within ? visit(view) : view) as T;
  if (Array.isArray(view)) return view.map((item: unknown) => mapSentences(item, visit, within)) as T;
  if (view === null || typeof view !== "object" || Object.getPrototypeOf(view) !== Object.prototype) return view;
  return Object.fromEntries(Object.entries(view).map(([key, value]) => [key, mapSentences(value, visit, within || SENTENCES.has(key))])) as T;
}

/** The case numbers that a view's sentences name, each once. */
export function refsIn(view: unknown): string[] {
  const found = new Set<string>();
  mapSentences(view, (text) => {
    for (const [, ref] of text.matchAll(REF)) found.add(ref);
    return text;
  });
  return [...found];
}

/** The view with these case numbers left out of its sentences. */
export function withoutRefs<T>(view: T, refs: ReadonlySet<string>): T {
  return refs.size === 0 ? view : mapSentences(view, (text) => text.replace(REF, (whole, ref: string) => (refs.has(ref) ? HIDDEN : whole)));
}
