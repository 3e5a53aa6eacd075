import { problem } from "./problem";

/** For addresses of the interface that lead nowhere: the answer is JSON there too, never a page. */
export function nowhere(): Response {
  return problem("not-found", "The interface has no such address. Check its spelling and the id in it.");
}
