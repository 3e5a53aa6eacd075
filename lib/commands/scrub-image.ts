import { Op } from "sequelize";
import { Image } from "@/models";
import { lookAtImage, storeIsThere } from "@/storage";
import { checkedNow, reportImage, reportSound, SCRUB, StoreAway } from "./report-image";
import type { DueImage } from "./scrub-plan";

/** A transient fault of cable or disk has passed by then. */
const SECOND_LOOK_MS = 2_000;

export interface ScrubPace {
  /** told of each chunk; may hold the reading back */
  passed(bytes: number): Promise<void>;
  secondLookMs?: number;
}

const sleep = (ms: number) => new Promise<void>((done) => void setTimeout(done, ms).unref());
const AT_MOST_AHEAD_MS = 250;

/** Holds a reading back to so many bytes a second, with a pause after each chunk; time lost elsewhere is not caught up. */
export function pacer(bytesPerSecond: number | null): ScrubPace["passed"] {
  let due = performance.now();
  return async (bytes) => {
    if (bytesPerSecond === null) return;
    due = Math.max(due, performance.now() - AT_MOST_AHEAD_MS) + (bytes / bytesPerSecond) * 1000;
    const ahead = due - performance.now();
    if (ahead > 1) await sleep(ahead);
  };
}

/** Reads one stored image whole and writes down when, and what was found. A bad one is read twice before anything is said. */
export async function scrubImage({ sha256, sizeBytes, state }: DueImage, { passed, secondLookMs = SECOND_LOOK_MS }: ScrubPace): Promise<void> {
  const look = await lookAtImage(sha256, sizeBytes, passed);
  if (look.state === "sound") {
    if (state !== "sound") return reportSound(sha256, SCRUB);
  } else {
    if (!(await storeIsThere())) throw new StoreAway();
    if (look.state !== state) return void (await reportImage(sha256, look.state, SCRUB, { pauseMs: secondLookMs }));
  }
  await Image.update(checkedNow(), { where: { sha256: Buffer.from(sha256, "hex"), state: { [Op.ne]: "erased" } } });
}
