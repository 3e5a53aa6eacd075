import { finishErasures } from "@/lib/commands/erased-image";
import { introduceKey } from "@/lib/commands/introduce-key";
import { judgeAgain } from "@/lib/commands/judge-again";
import { startScrub } from "@/lib/commands/scrub-loop";
import { startSeals } from "@/lib/commands/seal-daily";
import { startOutbox } from "@/lib/mail/outbox";
import { env } from "@/lib/env";
import { checkDatabase } from "@/models/check-database";
import { clearIncoming } from "@/storage";

/** Left-over uploads older than this belong to a server that died. */
const STALE_UPLOAD_MS = 10 * 60_000;

/** What must hold before the first request; throws with a sentence for whoever starts the server. */
export async function startUp(): Promise<void> {
  try {
    env();
    await checkDatabase();
    await introduceKey();
    await clearIncoming(STALE_UPLOAD_MS);
    await finishErasures();
    startOutbox();
    startSeals();
    startScrub();
    void judgeAgain();
  } catch (error) {
    console.error(`Twinread does not start: ${(error as Error).message}`);
    process.exit(1);
  }
}
