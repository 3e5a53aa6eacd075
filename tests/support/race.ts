/** Starts all at once and says how each ended. */
export async function race<T>(runs: (() => Promise<T>)[]): Promise<{ won: T[]; lost: unknown[] }> {
  let open = () => {};
  const gate = new Promise<void>((done) => (open = done));
  const all = runs.map(async (run) => {
    await gate;
    return run();
  });
  open();
  const settled = await Promise.allSettled(all);
  return {
    won: settled.filter((one): one is PromiseFulfilledResult<Awaited<T>> => one.status === "fulfilled").map((one) => one.value),
    lost: settled.filter((one): one is PromiseRejectedResult => one.status === "rejected").map((one) => one.reason as unknown),
  };
}

export const times = <T>(count: number, make: (index: number) => T): T[] => Array.from({ length: count }, (_, index) => make(index));
