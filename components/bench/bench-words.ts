import { BENCH_GROUPS, benchGroupOf } from "@/lib/core/chip-state";
import type { ChipStateCode } from "@/lib/core/words";
import type { BenchRow } from "@/lib/views";

export interface BenchGroup {
  key: string;
  label: string;
  /** what keeps a chip in this group */
  note: string;
  /** dead-end spur of the route: nothing goes on until it is explained */
  detour: boolean;
  rows: BenchRow[];
  late: number;
}

const NOTE: Record<string, string> = {
  "to-read": "Not enough counted reads yet",
  "reads-disagree": "Nothing goes on until this is explained",
  held: "The reads agree, a finding is open",
  ready: "By a lead who took no read of the original",
  approved: "Image approved, donor saved",
  written: "Written, not yet verified",
  failed: "The donor doesn't hold the approved image",
  verified: "Verified: pack the boards",
};
const DETOURS = ["reads-disagree", "held", "failed"];

/** Every group of the route in its order, empty ones too. */
export function benchGroups(rows: readonly BenchRow[]): BenchGroup[] {
  return BENCH_GROUPS.map(({ key, label }) => {
    const mine = rows.filter((row) => benchGroupOf(row.chip.state.state) === key);
    return { key, label, note: NOTE[key] ?? "", detour: DETOURS.includes(key), rows: mine, late: mine.filter((row) => row.late === "late").length };
  });
}

const NUMBERS = ["none", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

/** 2 is "two", 13 is "13". */
export function inWords(n: number): string {
  return NUMBERS[n] ?? String(n);
}

const verb = (n: number) => (n === 1 ? "is" : "are");
export const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** "Two are late", or nothing to say. */
export function lateWords(rows: readonly BenchRow[]): string | null {
  const late = rows.filter((row) => row.late === "late").length;
  return late > 0 ? `${capital(inWords(late))} ${verb(late)} late` : null;
}

/** "three are due today. Three are with you." */
export function dueWords(rows: readonly BenchRow[]): string {
  const [today, mine] = [rows.filter((row) => row.late === "today").length, rows.filter((row) => row.mine).length];
  const due = today > 0 ? `${inWords(today)} ${verb(today)} due today` : "nothing is due today";
  return `${due}. ${capital(inWords(mine))} ${verb(mine)} with you.`;
}

/** "Thursday 12 March 2026, 14:32". Put together by hand: the punctuation of Intl differs between server and browser. */
export function dateSentence(iso: string, timeZone: string): string {
  const parts = new Intl.DateTimeFormat("en-GB", {
    timeZone, weekday: "long", day: "numeric", month: "long", year: "numeric", hour: "2-digit", minute: "2-digit", hourCycle: "h23",
  }).formatToParts(new Date(iso));
  const part = (type: string) => parts.find((p) => p.type === type)?.value ?? "";
  return `${part("weekday")} ${part("day")} ${part("month")} ${part("year")}, ${part("hour")}:${part("minute")}`;
}

const STEP: Record<ChipStateCode, { word: string; at: string }> = {
  unread: { word: "Add reads", at: "#add" },
  "needs-reads": { word: "Add reads", at: "#add" },
  "reads-disagree": { word: "Look", at: "" },
  held: { word: "Look", at: "" },
  ready: { word: "Open", at: "" },
  approved: { word: "Write", at: "#transfer" },
  written: { word: "Add read-back", at: "#add" },
  failed: { word: "Look", at: "" },
  verified: { word: "Open case", at: "" },
};

/** A lead who may sign reads "sign"; everybody else reads whom to ask. */
export function decides(row: BenchRow, signs: boolean): boolean {
  return signs && row.mine && row.chip.state.state === "ready" && row.nextWhy === null;
}

/** Where the row's button leads; who may not act just opens the chip. */
export function rowAction(row: BenchRow, acts: boolean): { word: string; href: string } {
  const { word, at } = STEP[row.chip.state.state];
  if (row.chip.state.state === "verified") return { word, href: `/cases/${row.caseId}` };
  return acts ? { word, href: `/chips/${row.chip.id}${at}` } : { word: "Open", href: `/chips/${row.chip.id}` };
}

/** From the approval on, the work is at the donor's chip. */
export function atTheDonor(state: ChipStateCode): boolean {
  return ["approved", "written", "failed"].includes(state);
}

const STEPS = /^(ask|check|clean|clear|correct|erase|have|keep|look|lower|measure|pack|re-seat|read|save|set|sign|take|tell|upload|wait|write)\b(?! \d)/i;

/**
 * A state's sentence is "what was found, then what to do": what to do stands first on the bench, what was found under it.
 * A sentence that starts with a step is what to do; when there is none, the last one is.
 */
export function stepAndReason(sentence: string): { step: string; reason: string | null } {
  const all = sentence.split(/(?<=\.) |(?<=\d (?:reads|read-backs|seatings)): /);
  const first = all.findIndex((one) => STEPS.test(one));
  const at = first < 0 ? all.length - 1 : first;
  const reason = all.filter((_, i) => i !== at).map((one) => (one.endsWith(".") ? one : `${one}.`)).join(" ");
  return { step: capital(all[at]), reason: reason || null };
}
