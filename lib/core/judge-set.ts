import { agreement, oddOneOut, type AgreementGroup, type StateRead } from "./agreement";
import { deriveReadingState, type WorstDifference } from "./chip-state";
import type { Diagnosis, PairDiagnosis } from "./diagnose-pair";
import { looksLikeText } from "./diagnose-pair";
import { singleFindings, type ChipOfImage } from "./single-findings";
import type { ImageFacts } from "./inspect";
import { listText, readsText } from "./quantity";
import { seatingLetter, type ChipStateCode, type Finding, type Policy } from "./words";

export interface SetRead {
  /** as shown: Read 2 is 2 */
  number: number;
  seating: number;
  sha256: string;
  sizeBytes: number;
  counted: boolean;
  /** of judgeRead; without them what the facts show is found here */
  findings?: Finding[];
}

/** Two reads by their numbers; the diagnosis was made from `a` to `b`. */
export interface SetPair {
  a: number;
  b: number;
  result: PairDiagnosis;
}

export interface SetVerdict {
  /** nothing stands against an approval, policy included */
  ready: boolean;
  state: ChipStateCode;
  /** counted reads by image, the largest group first */
  groups: AgreementGroup[];
  /** reads that equal no other */
  alone: number[];
  /** what the reads outside the largest group have in common, one sentence each */
  common: string[];
  /** what was found and the next step at the bench */
  sentence: string;
  next: string;
  /** findings on the reads, one a code and message, with the reads that show them */
  findings: { reads: number[]; finding: Finding }[];
}

function findingsOf(read: SetRead, facts: ImageFacts | undefined, chip: ChipOfImage): Finding[] {
  return read.findings ?? (facts ? singleFindings(facts, chip) : []);
}

/** The pair's result from either side. */
function pairOf(pairs: readonly SetPair[], one: number, two: number): SetPair | null {
  return pairs.find((pair) => (pair.a === one && pair.b === two) || (pair.a === two && pair.b === one)) ?? null;
}

/** What reads outside the largest group share: the seating that no agreeing read has, or the diagnosis. */
function commonTo(outside: readonly SetRead[], main: AgreementGroup, diagnoses: readonly (Diagnosis | null)[]): string[] {
  const found: string[] = [];
  const who = readsText(outside.map((read) => read.number));
  const seatings = [...new Set(outside.map((read) => read.seating))];
  if (seatings.length === 1 && main.reads.length > 1 && !main.seatings.includes(seatings[0])) {
    found.push(`${who} ${outside.length === 1 ? "is" : "are"} the only ${outside.length === 1 ? "one" : "ones"} from seating ${seatingLetter(seatings[0])}.`);
  }
  const codes = new Set(diagnoses.map((one) => one?.code));
  const [code] = codes;
  const guess = code ? looksLikeText(code) : null;
  if (outside.length > 1 && codes.size === 1 && guess) found.push(`${who} all look like ${guess}.`);
  return found;
}

function worstOf(pair: SetPair | null, odd: number, other: number): WorstDifference | null {
  if (!pair) return null;
  const { comparison: c, diagnosis } = pair.result;
  if (c.first === null || c.last === null) return null;
  return { oddRead: odd, otherRead: other, differingBytes: c.differingBytes, first: c.first, last: c.last, looksLike: looksLikeText(diagnosis.code) };
}

/**
 * A whole set of `before` reads of one chip. Faults that repeat in every read are found although all agree: they show
 * in each image by itself. `facts` by digest. The sentence is the chip's own; `next` is the advice of the diagnosis
 * or of the finding it rests on.
 */
export function judgeSet(reads: readonly SetRead[], facts: ReadonlyMap<string, ImageFacts>, pairs: readonly SetPair[], policy: Policy, chip: ChipOfImage): SetVerdict {
  const judged: StateRead[] = reads.map((read) => ({
    id: String(read.number), number: read.number, stage: "before", seating: read.seating, sha256: read.sha256, sizeBytes: read.sizeBytes,
    counted: read.counted, findings: findingsOf(read, facts.get(read.sha256), chip), operatorId: "",
  }));
  const { groups } = agreement(judged);
  const counted = judged.filter((read) => read.counted);
  const odd = oddOneOut(judged) ?? counted.at(-1)?.number ?? 0;
  const oddSha = counted.find((read) => read.number === odd)?.sha256;
  const other = groups.find((group) => group.sha256 !== oddSha)?.reads[0] ?? null;
  const pair = other === null ? null : pairOf(pairs, odd, other);
  const { state, sentence } = deriveReadingState({ policy, sizeBytes: chip.sizeBytes, reads: judged, worst: other === null ? null : worstOf(pair, odd, other) });
  const outside = groups.length > 1 ? counted.filter((read) => read.sha256 !== groups[0].sha256) : [];
  const findings: SetVerdict["findings"] = [];
  for (const read of counted) {
    for (const finding of read.findings) {
      const known = findings.find((one) => one.finding.code === finding.code && one.finding.message === finding.message);
      if (known) known.reads.push(read.number);
      else findings.push({ reads: [read.number], finding });
    }
  }
  const open = findings.find(({ finding }) => finding.severity === "blocks") ?? findings.find(({ finding }) => finding.severity === "reason");
  const [main] = groups;
  return {
    ready: state === "ready", state, groups, sentence, findings,
    alone: groups.filter((group) => group.reads.length === 1 && groups.length > 1).map((group) => group.reads[0]),
    common: main && outside.length > 0 ? commonTo(outside, main, outside.map((read) => pairOf(pairs, read.number, main.reads[0])?.result.diagnosis ?? null)) : [],
    next: pair?.result.diagnosis.advice ?? open?.finding.advice ?? (state === "ready" ? "Ask a lead to approve." : "Read again in a new seating."),
  };
}

/** "Reads 1 and 2 agree; Read 3 stands alone." */
export function groupsText({ groups, alone }: Pick<SetVerdict, "groups" | "alone">): string {
  const together = groups.filter((group) => group.reads.length > 1).map((group) => `${readsText(group.reads)} agree`);
  const single = alone.length > 0 ? [`${readsText(alone)} ${alone.length === 1 ? "stands alone" : "stand each alone"}`] : [];
  return `${listText([...together, ...single])}.`;
}
