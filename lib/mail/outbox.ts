import { deliverMails } from "@/lib/commands/deliver-mails";

const EVERY_MS = 2_000;
/** one mail server that hangs must not hold up the other mails */
const WORKERS = 4;

// One outbox a process: the bundler may load this module more than once.
const shared = globalThis as unknown as { twinreadOutbox?: { working: number; trouble: string } };

/** Looks for due mail every two seconds for as long as the process lives; it never keeps the process alive. */
export function startOutbox(): void {
  if (shared.twinreadOutbox) return;
  const outbox = (shared.twinreadOutbox = { working: 0, trouble: "" });
  const look = async () => {
    outbox.working += 1;
    try {
      await deliverMails();
      outbox.trouble = "";
    } catch (error) {
      const trouble = (error as Error).message;
      // said once, not every two seconds while the database is away
      if (trouble !== outbox.trouble) console.error("outbox:", trouble);
      outbox.trouble = trouble;
    } finally {
      outbox.working -= 1;
    }
  };
  const tick = () => {
    if (outbox.working < WORKERS) void look();
    setTimeout(tick, EVERY_MS).unref();
  };
  setTimeout(tick, EVERY_MS).unref();
}
