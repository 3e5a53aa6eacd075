/** One heavy judgement at a time in this process, so that other requests stay quick. Waiters go in order. */
const shared = globalThis as unknown as { twinreadTurn?: Promise<unknown> };

export function inTurn<T>(run: () => Promise<T>): Promise<T> {
  const turn = (shared.twinreadTurn ?? Promise.resolve()).then(run, run);
  shared.twinreadTurn = turn.catch(() => {});
  return turn;
}

/** Lets other requests have the thread; called between chunks of heavy work. */
export function breathe(): Promise<void> {
  return new Promise((done) => setImmediate(done));
}
