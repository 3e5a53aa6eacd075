import type { AuditOverview, ImageCounts, SealState, WaitingLog } from "@/lib/core/audit-rows";
import { countOf, listText, withCommas } from "@/lib/core/quantity";
import type { MarkKind } from "@/components/ui/mark";

/** A log that was not checked for longer than this, or an image, wants looking at. */
const LOG_DAYS = 2;
export const DAY_MS = 86_400_000;

export function daysBetween(earlier: string, now: string): number {
  return Math.floor((Date.parse(now) - Date.parse(earlier)) / DAY_MS);
}

/** "just now", "25 minutes ago", "3 hours ago", "4 days ago" */
export function agoText(iso: string, now: string): string {
  const minutes = Math.floor((Date.parse(now) - Date.parse(iso)) / 60_000);
  if (minutes < 1) return "just now";
  if (minutes < 60) return `${countOf(minutes, "minute")} ago`;
  if (minutes < 48 * 60) return `${countOf(Math.floor(minutes / 60), "hour")} ago`;
  return `${countOf(Math.floor(minutes / 1440), "day")} ago`;
}

/** 12.3 is "12 ms", 1234.5 is "1.234 s", 3725400 is "1 h 2 min 5 s". */
export function lengthText(ms: number): string {
  const seconds = Math.floor(ms / 1000);
  if (seconds >= 120) return [seconds >= 3600 ? `${withCommas(Math.floor(seconds / 3600))} h` : "", `${Math.floor(seconds / 60) % 60} min`, `${seconds % 60} s`].filter(Boolean).join(" ");
  return ms >= 1000 ? `${withCommas(Math.floor(ms / 1000))}.${String(Math.floor(ms) % 1000).padStart(3, "0")} s` : `${Math.round(ms)} ms`;
}

/** Hours as a number: "under a minute", "12 minutes", "3 hours". */
export function hoursText(hours: number): string {
  const minutes = Math.ceil(hours * 60);
  return minutes < 1 || hours * 3600 < 60 ? "under a minute" : minutes < 120 ? countOf(minutes, "minute") : `about ${countOf(Math.round(hours), "hour")}`;
}

export function clockSentence({ offsetMs, withinMs }: AuditOverview["clock"]): string {
  const size = Math.abs(offsetMs);
  if (size <= withinMs || size < 1) return "The clocks of app and database agree.";
  return `The database's clock is ${lengthText(size)} ${offsetMs > 0 ? "ahead of" : "behind"} the app's.`;
}

/** More than this between the two clocks and times in the log and on the screens differ to the eye. */
const CLOCK_MS = 2000;

export function clockMark({ offsetMs, withinMs }: AuditOverview["clock"]): MarkKind {
  return Math.abs(offsetMs) - withinMs > CLOCK_MS ? "caution" : "ok";
}

export interface OverviewLine {
  key: string;
  title: string;
  mark: MarkKind;
  sentence: string;
  href: string;
  /** when the latest of it was, or since when all of it was looked at */
  at: string;
  since?: true;
}

const logsText = (n: number) => `${withCommas(n)} ${n === 1 ? "log" : "logs"}`;

function logs({ logs: { total, findings, unchecked, oldestCheck }, waiting, now }: AuditOverview): Omit<OverviewLine, "key" | "title" | "href"> {
  const at = oldestCheck ?? "";
  if (findings > 0) {
    const closed = waiting.length === 0 ? "" : ` ${listText(waiting.map(logText))} ${waiting.length === 1 ? "waits" : "wait"} for an assessment.`;
    return { mark: waiting.length > 0 ? "block" : "caution", sentence: `${findings} of ${logsText(total)} ${findings === 1 ? "doesn't" : "don't"} check out.${closed || " Each finding was assessed."}`, at };
  }
  if (total === unchecked) return { mark: "wait", sentence: `None of ${logsText(total)} was checked yet. Check them now, or wait for the night.`, at };
  if (unchecked > 0) return { mark: "caution", sentence: `${total - unchecked} of ${logsText(total)} check out, ${unchecked} ${unchecked === 1 ? "was" : "were"} never checked.`, at };
  const late = oldestCheck !== null && daysBetween(oldestCheck, now) >= LOG_DAYS;
  return { mark: late ? "caution" : "ok", sentence: `${total === 1 ? "The one log checks out" : `All ${logsText(total)} check out`}${late ? `, but one was last checked ${agoText(oldestCheck, now)}` : ""}.`, at };
}

export function imagesSentence({ total, damaged, missing, oldest, keeping, keepingSentence }: ImageCounts, now: string): { mark: MarkKind; sentence: string } {
  if (total === 0) return { mark: "wait", sentence: "No image is stored yet." };
  const bad = [damaged > 0 ? `${withCommas(damaged)} damaged` : "", missing > 0 ? `${withCommas(missing)} missing` : ""].filter(Boolean);
  if (bad.length > 0) return { mark: "block", sentence: `Of ${countOf(total, "stored image")}, ${listText(bad)}. See where they are used.` };
  if (keeping !== "keeping-up") return { mark: "caution", sentence: keepingSentence };
  return { mark: "ok", sentence: `${total === 1 ? "The one stored image equals its digest" : `All ${withCommas(total)} stored images equal their digests`}; the oldest look at one was ${oldest ? agoText(oldest, now) : "never"}.` };
}

export function sealsSentence({ total, newest, today, faulty }: SealState): { mark: MarkKind; sentence: string } {
  if (total === 0 || !newest) return { mark: "wait", sentence: "No seal was made yet. Make one now, so that a copy can leave the house." };
  if (faulty.length > 0) return { mark: "block", sentence: `Something is wrong with the chain of seals at ${faulty.length === 1 ? "seal" : "seals"} ${listText(faulty.map(String))}.` };
  const { sent, waiting, givenUp } = newest.mailed;
  const leftWith = newest.cause === "bundle" ? "left with a bundle" : newest.cause === "summary" ? "left with a summary" : null;
  const mail = givenUp > 0 ? "could not be mailed to everybody" : waiting > 0 ? "waits to be mailed" : sent > 0 ? "is mailed" : leftWith ?? "was mailed to nobody, because no auditor has an account";
  const kept = givenUp === 0 && today && (sent + waiting > 0 || leftWith !== null);
  const links = total === 1 ? "Seal 1 is the first" : `All ${withCommas(total)} seals link`;
  return { mark: kept ? "ok" : "caution", sentence: `${links}; seal ${newest.number}${today ? " of today" : ""} ${mail}${today ? "" : ", and today has none yet"}.` };
}

const one = (n: number, singular: string, plural: string) => (n === 1 ? singular : plural.replace("#", withCommas(n)));

/** One line a subject, in the order of the pages. */
export function overviewLines(facts: AuditOverview): OverviewLine[] {
  const { handOuts, refusals, assessments, limits, clock, clockEntries, openSessions, waiting, now } = facts;
  const closed = waiting.filter((log) => log.driveId).length;
  const lines: OverviewLine[] = [
    { key: "drives", title: "Logs", href: "/audit/drives", since: true, ...logs(facts) },
    ...(facts.seals ? [{ key: "seals", title: "Seals", href: "/audit/seals", at: facts.seals.newest?.at ?? "", ...sealsSentence(facts.seals) }] : []),
    { key: "images", title: "Stored images", href: "/audit/images", since: true, at: facts.images.oldest ?? "", ...imagesSentence(facts.images, now) },
    { key: "assessments", title: "Assessments", href: "/audit/assessments", at: assessments.at, mark: waiting.length > 0 ? "block" : "ok",
      sentence: waiting.length > 0 ? `${one(waiting.length, "One log waits for an assessment", "# logs wait for an assessment")}${closed > 0 ? `; work on ${one(closed, "its drive", "# drives")} is closed` : ""}.` : assessments.total === 0 ? "No log waits, and none ever needed one." : `No log waits. ${one(assessments.total, "One assessment is on record.", "# assessments are on record.")}` },
    { key: "hand-outs", title: "Hand-outs", href: "/audit/hand-outs", at: handOuts.at, mark: handOuts.total > 0 ? "note" : "wait", sentence: handOuts.total > 0 ? `Latest: ${handOuts.sentence}` : "No image, bundle or summary has left the house yet." },
    { key: "refusals", title: "Refusals", href: "/audit/refusals", at: refusals.at, mark: refusals.total > 0 ? "note" : "ok", sentence: refusals.total > 0 ? `Latest: ${refusals.sentence}` : "No approval was refused, sent back or revoked." },
  ];
  if (limits && openSessions !== null) {
    lines.push({ key: "sign-ins", title: "Sign-ins", href: "/audit/sign-ins", at: limits.at, mark: limits.total > 0 ? "note" : "ok",
      sentence: `${one(openSessions, "One session is open", "# sessions are open")}. ${limits.total > 0 ? `Latest refusal: ${limits.sentence}` : "No sign-in was ever refused for too many tries."}` });
  }
  lines.push({ key: "clock", title: "Clock", href: "/audit/clock", at: clockEntries.at, mark: clockMark(clock) === "caution" || clockEntries.total > 0 ? "caution" : "ok",
    sentence: `${clockSentence(clock)} ${clockEntries.total === 0 ? "No entry was written against the clock." : one(clockEntries.total, "One entry was written while a clock or a head had been turned back.", "# entries were written while a clock or a head had been turned back.")}` });
  return lines;
}

/** The verdict: what is wrong first, else that nothing is, in one sentence that names logs, images and seal. */
export function auditVerdict(facts: AuditOverview): { mark: MarkKind; sentence: string; why: string; go: { href: string; label: string } | null } {
  const lines = overviewLines(facts);
  const [blocks, cautions] = (["block", "caution"] as const).map((mark) => lines.filter((line) => line.mark === mark));
  if (blocks.length > 0) {
    const [first] = blocks;
    return { mark: "block", sentence: first.sentence, why: `Something is wrong under ${listText(blocks.map((line) => line.title))}${cautions.length > 0 ? `, and something wants a look under ${listText(cautions.map((line) => line.title))}` : ""}. Nothing was repaired; each list names what was found.`, go: { href: first.href, label: `Open ${first.title}` } };
  }
  const { logs: { total, unchecked }, images, seals, now } = facts;
  if (cautions.length > 0) return { mark: "caution", sentence: cautions[0].sentence, why: `Nothing was found changed or damaged. Look under ${listText(cautions.map((line) => line.title))}.`, go: { href: cautions[0].href, label: `Open ${cautions[0].title}` } };
  if (total === unchecked) return { mark: "wait", sentence: logs(facts).sentence, why: "A check computes every hash again, checks every signature and compares the head. It reports and never repairs.", go: { href: "/audit/drives", label: "Check the logs…" } };
  const parts = [total === 1 ? "The one log checks out" : `All ${logsText(total)} check out`];
  if (images.total > 0 && images.oldest) parts.push(`the oldest look at a stored image was ${agoText(images.oldest, now)}`);
  if (seals?.newest) parts.push(sealsSentence(seals).sentence.split("; ").at(-1)!.replace(/\.$/, ""));
  else if (seals) parts.push("no seal was made yet");
  return { mark: "ok", sentence: `${parts.join("; ")}.`, why: "As of the last check of each. A cut end shows only against what left the house: a bundle, a summary, a mail or the witness file.", go: null };
}

/** The log as the subject of a sentence. */
function logText(place: WaitingLog): string {
  if (place.workshop) return "The workshop's own log";
  return place.driveId ? placeText(place) : `The log of a drive that is not on record, ${place.chainId},`;
}

/** "Drive A of case 26-0042", "The workshop" */
export function placeText(place: { workshop: boolean; letter: string; caseRef: string; chainId: string }): string {
  if (place.workshop) return "The workshop";
  return place.caseRef ? `Drive ${place.letter} of case ${place.caseRef}` : `No known drive, ${place.chainId}`;
}
