type Line = "judging" | "photos";
const shared = globalThis as unknown as { twinreadTurns?: Map<Line, Promise<unknown>> };

/** One heavy work of a line at a time in this process, so that other requests stay quick. Waiters go in order. */
export function inTurn<T>(run: () => Promise<T>, line: Line = "judging"): Promise<T> {
  const turns = (shared.twinreadTurns ??= new Map());
  const turn = (turns.get(line) ?? Promise.resolve()).then(run, run);
  turns.set(line, turn.catch(() => {}));
  return turn;
}

/** Lets other requests have the thread; called between chunks of heavy work. */
export function breathe(): Promise<void> {
  return new Promise((done) => setImmediate(done));
}
