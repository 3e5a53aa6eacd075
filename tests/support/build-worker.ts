import { buildTool, isStale } from "../../scripts/build-tools.mjs";

/** Node runs no TypeScript in a worker thread: the engine's worker is bundled before the tests. */
export default async function setup(): Promise<void> {
  if (isStale("engine-worker")) await buildTool("engine-worker");
}
