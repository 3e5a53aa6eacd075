import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { SEALS_AN_HOUR_PER_PERSON } from "@/lib/limits";
import { hourly } from "./hourly";
import { type MadeSeal, makeSeal } from "./make-seal";
import { allow } from "./refuse";

const asked = hourly(SEALS_AN_HOUR_PER_PERSON);

/** Somebody wants a seal now. Each goes to every auditor by mail, so there is an end to them. */
export async function askForSeal(actor: Actor): Promise<MadeSeal> {
  allow(actor, "seal.make");
  const waitMs = asked.note(actor.id);
  if (waitMs !== null) {
    const retryAfterSeconds = Math.max(1, Math.ceil(waitMs / 1000));
    throw new AppError("too-many", `You have asked for ${SEALS_AN_HOUR_PER_PERSON} seals within the last hour, and each goes to every auditor by mail. Take the newest, or ask again in ${Math.ceil(retryAfterSeconds / 60)} min.`, { retryAfterSeconds });
  }
  return makeSeal(actor, "asked");
}
