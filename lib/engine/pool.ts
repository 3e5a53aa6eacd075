import path from "node:path";
import { Piscina } from "piscina";
import type { Tasks } from "./worker";

/** Two cores are what a workshop's machine has at least: one thread judges while the other answers. */
const THREADS = 1;
const IDLE_MS = 30_000;

// one pool a process: the bundler may load this module more than once
const shared = globalThis as unknown as { twinreadPool?: Piscina };

function pool(): Piscina {
  return (shared.twinreadPool ??= new Piscina({
    filename: path.join(/* turbopackIgnore: true */ process.cwd(), "dist", "engine-worker.mjs"),
    minThreads: 0, maxThreads: THREADS, idleTimeout: IDLE_MS, concurrentTasksPerWorker: 1,
  }));
}

/** Runs one of the engine's tasks in a thread; they queue in order, so that one judgement is made at a time. */
export async function engine<N extends keyof Tasks>(name: N, input: Tasks[N]["input"]): Promise<Tasks[N]["output"]> {
  try {
    return (await pool().run(input, { name })) as Tasks[N]["output"];
  } catch (error) {
    // an error's code does not come through from a thread; its message does
    const code = /^(E[A-Z]+): /.exec((error as Error).message)?.[1];
    throw code ? Object.assign(error as Error, { code }) : error;
  }
}

/** Ends the threads; for scripts and tests that are done. */
export async function closeEngine(): Promise<void> {
  await shared.twinreadPool?.destroy();
  shared.twinreadPool = undefined;
}
