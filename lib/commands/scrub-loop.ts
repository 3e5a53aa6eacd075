import { MIB } from "@/lib/limits";
import { env } from "@/lib/env";
import { inTransaction } from "@/models";
import { checkChains } from "./check-chains";
import { mailStoreAway } from "./image-alarm";
import { StoreAway } from "./report-image";
import { scrubNextDrive } from "./scrub-round";

const FIRST_MS = 30_000;
const IDLE_MS = 60_000;
const BETWEEN_DRIVES_MS = 1_000;
const CHAINS_MS = 10 * 60_000;

export interface ScrubTroubles {
  images: string;
  chains: string;
}

// One loop a process: the bundler may load this module more than once.
const shared = globalThis as unknown as { twinreadScrubLoop?: ScrubTroubles };

/** What keeps the loops from their work now, a sentence each; empty while nothing does. */
export const scrubTroubles = (): ScrubTroubles => shared.twinreadScrubLoop ?? { images: "", chains: "" };

/**
 * For as long as the process lives: reads stored images again, drive by drive, and checks every chain once a day. It
 * never keeps the process alive. A trouble (the database away, the disk not mounted) is waited out and said once.
 */
export function startScrub(): void {
  if (shared.twinreadScrubLoop) return;
  const troubles = (shared.twinreadScrubLoop = { images: "", chains: "" });
  const { scrubDays: days, scrubMebibytesPerSecond } = env();
  const loop = (kind: keyof ScrubTroubles, work: () => Promise<number>) => {
    const turn = async () => {
      let wait = IDLE_MS;
      try {
        wait = await work();
        troubles[kind] = "";
      } catch (error) {
        const trouble = (error as Error).message;
        const fresh = trouble !== troubles[kind];
        troubles[kind] = trouble;
        if (fresh) console.error(`checking ${kind === "images" ? "stored images" : "the logs"}:`, trouble);
        if (fresh && error instanceof StoreAway) await inTransaction((tx) => mailStoreAway(tx, trouble), { receipt: false }).catch(() => {});
      }
      setTimeout(() => void turn(), wait).unref();
    };
    setTimeout(() => void turn(), FIRST_MS).unref();
  };
  if (days > 0) loop("images", async () => ((await scrubNextDrive({ days, bytesPerSecond: scrubMebibytesPerSecond * MIB })) === null ? IDLE_MS : BETWEEN_DRIVES_MS));
  loop("chains", async () => {
    await checkChains();
    return CHAINS_MS;
  });
}
