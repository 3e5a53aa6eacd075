import { countOf, listText, withCommas } from "../quantity";

/** What the check of a bundle says, for the page, the command and the tests alike. */
export type StepState = "in-order" | "not-in-order" | "not-checked";

export interface Fault {
  /** a file of the bundle, "data/drives/1/custody.jsonl, entry 4", "the archive" */
  place: string;
  /** what is wrong there */
  sentence: string;
  expected?: string;
  found?: string;
}

export interface Step {
  key: string;
  title: string;
  state: StepState;
  /** what was checked and found */
  sentence: string;
  faults: Fault[];
}

export interface BundleFacts {
  /** the one folder of the archive */
  folder: string;
  caseRef: string | null;
  files: number;
  bytes: number;
  entries: number;
  /** fingerprints, 64 lower-case hex digits */
  logKey: string | null;
  sealKey: string | null;
  seal: { number: number; at: string } | null;
  /** where each drive's log ends */
  heads: { drive: number; seq: number; hash: string }[];
}

export interface VerifyReport {
  verdict: "in-order" | "not-in-order";
  sentence: string;
  steps: Step[];
  facts: BundleFacts;
}

/** The check could not be made at all; the message is for people. */
export class NotVerified extends Error {
  override name = "NotVerified";
}

/** Faults kept of one step; more are counted. */
const MOST_FAULTS = 100;
const MOST_CHARACTERS = 200;

/** Text of a stranger: one line, no control characters, cut where it is long. */
export function shown(text: string): string {
  const plain = text.replace(/[\p{C}\u2028\u2029]/gu, (character) => `\\u{${(character.codePointAt(0) ?? 0).toString(16)}}`);
  return plain.length > MOST_CHARACTERS ? `${plain.slice(0, MOST_CHARACTERS)}…` : plain;
}

/** Gathers what one step finds. */
export class StepNotes {
  readonly faults: Fault[] = [];
  private unnamed = 0;

  constructor(readonly key: string, readonly title: string) {}

  fault(place: string, sentence: string, expected?: string, found?: string): void {
    if (this.faults.length >= MOST_FAULTS) {
      this.unnamed += 1;
      return;
    }
    this.faults.push({
      place: shown(place), sentence, ...(expected === undefined ? {} : { expected: shown(expected) }), ...(found === undefined ? {} : { found: shown(found) }),
    });
  }

  get count(): number {
    return this.faults.length + this.unnamed;
  }

  /** In order with this sentence, unless something was found. */
  done(inOrder: string): Step {
    if (this.count === 0) return { key: this.key, title: this.title, state: "in-order", sentence: inOrder, faults: [] };
    const more = this.unnamed > 0 ? ` The first ${MOST_FAULTS} are named.` : "";
    return { key: this.key, title: this.title, state: "not-in-order", sentence: `${countOf(this.count, "thing")} not in order.${more}`, faults: this.faults };
  }

  /** Nothing could be looked at, which is never the same as in order. */
  notChecked(sentence: string): Step {
    if (this.count > 0) return this.done(sentence);
    return { key: this.key, title: this.title, state: "not-checked", sentence, faults: [] };
  }
}

export function verdictOf(steps: Step[], facts: BundleFacts): Pick<VerifyReport, "verdict" | "sentence"> {
  const first = steps.find((step) => step.state === "not-in-order")?.faults[0];
  if (first) {
    const many = steps.reduce((sum, step) => sum + step.faults.length, 0);
    const rest = many > 1 ? ` ${countOf(many - 1, "more thing")} below.` : "";
    return { verdict: "not-in-order", sentence: `Not in order. ${first.place}: ${first.sentence}${rest} Keep this bundle as it is and ask the workshop for another.` };
  }
  const open = steps.filter((step) => step.state === "not-checked").map((step) => step.title.toLowerCase());
  const left = open.length > 0 ? ` Not checked: ${listText(open)}.` : "";
  return {
    verdict: "in-order",
    sentence: `All in order: ${countOf(facts.heads.length, "custody log")}, ${entriesText(facts.entries)}, ${countOf(facts.files, "file")}.${left}`,
  };
}

/** "1 entry", "41 entries" */
export function entriesText(n: number): string {
  return `${withCommas(n)} ${n === 1 ? "entry" : "entries"}`;
}
