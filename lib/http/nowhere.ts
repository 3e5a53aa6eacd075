import { NO_ADDRESS } from "@/lib/commands/refuse";
import { problem } from "./problem";

/** For addresses of the interface that lead nowhere: the answer is JSON there too, never a page. */
export function nowhere(): Response {
  return problem("not-found", NO_ADDRESS);
}
