import { createHash } from "node:crypto";
import { ZERO_HASH } from "@/lib/core/custody";
import { leafText, parseSeal, type SealFacts, type SealLeaf, sealRoot } from "@/lib/core/seal";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { verifySignature } from "@/storage";
import { endOf, type Ledger } from "./ledger";
import type { Damage, StoreReport } from "./report";

/** A row of the table, its time as the database writes it. */
export interface SealRow {
  number: number;
  text: Buffer;
  sha256: string;
  prev: string;
  keyId: string;
  signature: Buffer;
  cause: string;
  madeAt: string;
  chains: number;
  leaves: Buffer;
}

export interface SealsChecked {
  seals: StoreReport["seals"];
  /** SHA-256 of each seal's text that is here, by its number */
  known: Map<number, string>;
  damage: Damage[];
}

type Say = (problem: Damage["problem"], sentence: string, expected?: string, found?: string) => void;

const digest = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();

/** Every seal by itself, with the one before it, with the logs, and with what the workshop's log tells of seals. Rows come in the order of their numbers. */
export async function checkSeals(rows: AsyncIterable<SealRow>, ledger: Ledger): Promise<SealsChecked> {
  const found: SealsChecked = { seals: { checked: 0, newest: null, heads: 0, keys: [...ledger.ring.sealKeys.keys()] }, known: new Map(), damage: [] };
  const told = new Map(ledger.sealsMade.map((one) => [one.number, one]));
  const seen = new SeenHeads(ledger);
  let before: { number: number; sha256: string; keyPlace: number; at: string } = { number: 0, sha256: ZERO_HASH, keyPlace: -1, at: "" };
  for await (const row of rows) {
    const say: Say = (problem, sentence, expected, is) =>
      found.damage.push({ place: `Seal ${row.number}`, seq: null, problem, sentence, chain: null, sha256: null, reads: [], expected, found: is });
    const sha256 = digest(row.text).toString("hex");
    found.known.set(row.number, sha256);
    found.seals.checked += 1;
    const facts = parseSeal(row.text.toString("utf8"));
    if (!facts) say("seal", "Its text is no seal to the letter: it was changed.");
    const keyPlace = checkSignature(row, ledger, say);
    if (keyPlace >= 0 && keyPlace < before.keyPlace) say("seal", "It is signed by a seal key that had been replaced before the seal in front of it.");
    if (facts) {
      checkRow(row, facts, sha256, say);
      for (let number = before.number + 1; number < row.number; number += 1) {
        const logged = told.get(number);
        if (!logged) found.damage.push({ place: `Seal ${number}`, seq: null, problem: "seal-missing", sentence: "The numbers leave it out: it was removed.", chain: null, sha256: null, reads: [] });
        before = { ...before, sha256: logged?.sha256 ?? "" };
      }
      if (before.sha256 !== "" && facts.prev !== before.sha256) say("seal-chain", "It does not follow the seal before it: one of the two was changed or replaced.", before.sha256, facts.prev);
      if (facts.at < before.at) say("seal-chain", "It claims a time before that of the seal in front of it.", `${before.at} or later`, facts.at);
      const leaves = checkLeaves(row, facts, say);
      found.seals.heads += leaves?.length ?? 0;
      if (leaves) seen.take(row.number, facts.at, leaves);
    }
    const logged = told.get(row.number);
    if (!logged) say("seal-not-in-log", "No entry of the workshop's log says that it was made.");
    else checkTold(row, facts, sha256, logged, say);
    before = { number: row.number, sha256, keyPlace: Math.max(before.keyPlace, keyPlace), at: facts?.at ?? before.at };
    found.seals.newest = { number: row.number, at: facts?.at ?? row.madeAt, sha256 };
  }
  found.damage.push(...seen.damage(), ...missingSeals(ledger, found.known));
  return found;
}

/** The place of the key among the seal keys; -1 where the signature does not hold. */
function checkSignature({ keyId, text, signature }: SealRow, { ring }: Ledger, say: Say): number {
  const pem = ring.sealKeys.get(keyId);
  if (pem === undefined) say("seal", "It names a key that the workshop's log never introduced for seals.", [...ring.sealKeys.keys()].at(-1), keyId);
  else if (!verifySignature(pem, text, signature)) say("seal", "Its signature does not fit: it was changed, or somebody else made it.");
  else return [...ring.sealKeys.keys()].indexOf(keyId);
  return -1;
}

/** What stands beside the text in the row says the same as the text. */
function checkRow(row: SealRow, facts: SealFacts, sha256: string, say: Say): void {
  const beside: [string, string, string][] = [
    ["number", String(facts.number), String(row.number)], ["SHA-256", sha256, row.sha256], ["previous seal", facts.prev, row.prev],
    ["number of logs", String(facts.chains), String(row.chains)], ["time", facts.at, row.madeAt],
  ];
  for (const [name, expected, is] of beside) if (expected !== is) say("seal-row", `The ${name} beside its text is another than in the text.`, expected, is);
}

function checkLeaves(row: SealRow, facts: SealFacts, say: Say): SealLeaf[] | null {
  const leaves = leavesIn(row.leaves);
  if (!leaves) say("seal-leaves", "The list of heads under it cannot be read: it was changed.");
  else if (leaves.length !== facts.chains || sealRoot(leaves, digest) !== facts.root) say("seal-leaves", "The heads under it are not those that were sealed: the list was changed.", facts.root, sealRoot(leaves, digest));
  else return leaves;
  return null;
}

/** Null unless each line is a leaf to the letter, in the order of the tree. */
export function leavesIn(stored: Buffer): SealLeaf[] | null {
  const lines = stored.toString("utf8").split("\n");
  if (lines.pop() !== "") return null;
  try {
    const leaves = lines.map((line) => JSON.parse(line) as SealLeaf);
    return leaves.every((leaf, i) => leafText(leaf) === lines[i] && (i === 0 || leaves[i - 1].drive < leaf.drive)) ? leaves : null;
  } catch {
    return null;
  }
}

function checkTold(row: SealRow, facts: SealFacts | null, sha256: string, logged: Ledger["sealsMade"][number], say: Say): void {
  if (logged.sha256 !== sha256) return say("seal", "It is not the seal that the workshop's log says was made under this number: it was replaced.", logged.sha256, sha256);
  if (logged.cause !== row.cause) say("seal-row", "The occasion beside it is another than the workshop's log gives.", logged.cause, row.cause);
  if (logged.keyId !== row.keyId) say("seal-row", "The key beside it is another than the workshop's log gives.", logged.keyId, row.keyId);
  if (facts && (logged.root !== facts.root || logged.chains !== facts.chains)) say("seal", "The workshop's log gives another root or number of logs for it.", logged.root, facts.root);
}

/** Seals that the log tells of and the table does not hold, and numbers that the log gives twice. */
function missingSeals(ledger: Ledger, known: ReadonlyMap<number, string>): Damage[] {
  const first = new Map<number, string>();
  return ledger.sealsMade.flatMap(({ seq, number, sha256 }): Damage[] => {
    const common = { place: ledger.place(WORKSHOP_CHAIN), seq, chain: WORKSHOP_CHAIN, sha256: null, reads: [] };
    const before = first.get(number);
    if (before !== undefined) return before === sha256 ? [] : [{ ...common, problem: "seal-chain", sentence: `It tells of another seal ${number} than an entry before it.`, expected: before, found: sha256 }];
    first.set(number, sha256);
    if (known.has(number)) return [];
    return [{ ...common, problem: "seal-missing", sentence: `It says that seal ${number} was made, and the database does not hold it: it was removed.`, expected: sha256 }];
  });
}

/** What seals saw of the logs, each thing told once: by the first seal that saw it. */
class SeenHeads {
  private readonly entries = new Map<string, { number: number; at: string; leaf: SealLeaf }>();
  private readonly missing = new Map<string, { number: number; at: string; leaf: SealLeaf }>();
  private readonly last = new Map<string, { number: number; leaf: SealLeaf }>();
  private readonly back: { number: number; before: number; leaf: SealLeaf; was: number }[] = [];

  constructor(private readonly ledger: Ledger) {}

  take(number: number, at: string, leaves: SealLeaf[]): void {
    for (const leaf of leaves) {
      const ours = this.ledger.entries.get(leaf.drive)?.get(leaf.seq);
      const key = `${leaf.drive} ${leaf.seq} ${leaf.head}`;
      if (ours === undefined) {
        if ((this.missing.get(leaf.drive)?.leaf.seq ?? -1) < leaf.seq) this.missing.set(leaf.drive, { number, at, leaf });
      } else if (ours !== leaf.head && !this.entries.has(key)) this.entries.set(key, { number, at, leaf });
    }
    const here = new Map(leaves.map((leaf) => [leaf.drive, leaf]));
    for (const [drive, { number: before, leaf: former }] of this.last) {
      const now = here.get(drive);
      if (!now || now.seq < former.seq) this.back.push({ number, before, leaf: now ?? { drive, seq: 0, head: "" }, was: former.seq });
    }
    for (const leaf of leaves) this.last.set(leaf.drive, { number, leaf });
  }

  damage(): Damage[] {
    const at = (leaf: SealLeaf) => ({ place: this.ledger.place(leaf.drive), chain: leaf.drive, sha256: null, reads: [] });
    return [
      ...[...this.entries.values()].map(({ number, at: when, leaf }): Damage => ({
        ...at(leaf), seq: leaf.seq, problem: "sealed-entry", sentence: `Seal ${number} of ${when} saw it with another hash: it was changed since.`, expected: leaf.head, found: this.ledger.entries.get(leaf.drive)?.get(leaf.seq),
      })),
      ...[...this.missing.values()].map(({ number, at: when, leaf }): Damage => ({
        ...at(leaf), seq: leaf.seq, problem: "sealed-entry-missing", sentence: `Seal ${number} of ${when} saw it, and the log ends at entry ${endOf(this.ledger, leaf.drive)}: it was cut since.`, expected: leaf.head,
      })),
      ...this.back.map(({ number, before, leaf, was }): Damage => ({
        ...at(leaf), seq: null, problem: "seal-chain", sentence: `Seal ${number} saw less of this log than seal ${before}: it was turned back between the two.`, expected: `entry ${was} or later`, found: leaf.seq === 0 ? "no log" : `entry ${leaf.seq}`,
      })),
    ];
  }
}
