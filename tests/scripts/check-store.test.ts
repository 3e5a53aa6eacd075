import { createHash, generateKeyPairSync, sign } from "node:crypto";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { leafText, parseSeal, type SealLeaf, sealRoot, sealText } from "@/lib/core/seal";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { checkAgainst } from "@/scripts/check/against";
import type { Here } from "@/scripts/check/against-bundle";
import type { Ledger } from "@/scripts/check/ledger";
import { checkSeals, leavesIn, type SealRow } from "@/scripts/check/seals";
import { keyIdOf } from "@/storage";
import { type Bag, FOLDER, logKeyA, makeBag, sealKeyA, withLists } from "../support/make-bag";
import { zipBag } from "../support/zip-bag";

const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest();
const hex = (bytes: Uint8Array | string) => digest(bytes).toString("hex");

/** Seals over two logs that grow; everything is set by hand, so that each check can be asked alone. */
interface World {
  ledger: Omit<Ledger, "entries" | "sealsMade"> & { entries: Map<string, Map<number, string>>; sealsMade: Ledger["sealsMade"][number][] };
  rows: SealRow[];
}
const KEYS = Array.from({ length: 2 }, () => {
  const { publicKey, privateKey } = generateKeyPairSync("ed25519");
  return { id: keyIdOf(publicKey), pem: publicKey.export({ type: "spki", format: "pem" }) as string, secret: privateKey };
});
const entry = (chain: string, seq: number) => hex(`${chain} ${seq}`);

function makeRow(number: number, leaves: SealLeaf[], prev: string, key = KEYS[0], change: Partial<ReturnType<typeof parseSeal> & object> = {}): SealRow {
  const at = `2026-03-1${number}T09:00:00.000000Z`;
  const facts = { number, at, chains: leaves.length, root: sealRoot(leaves, digest), prev, ...change };
  const text = Buffer.from(sealText(facts));
  return {
    number, text, sha256: hex(text), prev, keyId: key.id, signature: sign(null, text, key.secret), cause: "daily", madeAt: facts.at, chains: facts.chains,
    leaves: Buffer.from(leaves.map((leaf) => `${leafText(leaf)}\n`).join("")),
  };
}
const told = (row: SealRow, seq: number) => ({ seq, number: row.number, sha256: hex(row.text), root: parseSeal(row.text.toString())!.root, chains: row.chains, keyId: row.keyId, cause: row.cause });
const leavesAt = (a: number, b: number): SealLeaf[] => [{ drive: "a", head: entry("a", a), seq: a }, { drive: "b", head: entry("b", b), seq: b }];

function world(): World {
  const rows: SealRow[] = [];
  for (let number = 1; number <= 4; number += 1) rows.push(makeRow(number, leavesAt(number, 2 * number), rows.at(-1)?.sha256 ?? "0".repeat(64), number < 4 ? KEYS[0] : KEYS[1]));
  const entries = new Map(["a", "b"].map((chain) => [chain, new Map(Array.from({ length: 9 }, (_, i) => [i + 1, entry(chain, i + 1)]))]));
  const ring = { keys: new Map(), sealKeys: new Map(KEYS.map((key) => [key.id, key.pem])), problems: [] };
  return { rows, ledger: { entries, ring, sealsMade: rows.map((row, i) => told(row, i + 1)), place: (chain) => (chain === WORKSHOP_CHAIN ? "Workshop log" : `Drive ${chain}`) } };
}
async function* each(rows: SealRow[]): AsyncGenerator<SealRow> {
  for (const row of rows) yield await Promise.resolve(row);
}
const found = async ({ rows, ledger }: World) => (await checkSeals(each(rows), ledger)).damage.map(({ place, seq, problem, sentence }) => `${place}${seq === null ? "" : ` ${seq}`}: ${problem}: ${sentence}`);

/** Puts another row in the place of one, and lets the log tell of it where it should. */
function replaced(i: number, make: (row: SealRow, world: World) => SealRow, tell = true): World {
  const made = world();
  made.rows[i] = make(made.rows[i], made);
  if (tell) made.ledger.sealsMade[i] = told(made.rows[i], i + 1);
  return made;
}
const only = async (made: World, sentence: string | RegExp) => {
  const all = await found(made);
  expect(all).toHaveLength(1);
  expect(all[0]).toMatch(sentence);
};

describe("a seal of the database", () => {
  it("is clean with its row, its entry, the seal before and the logs", async () => expect(await found(world())).toEqual([]));

  it("is named when its text, key or signature is not right", async () => {
    const text = Buffer.from("twinread-seal/1\n");
    expect((await found(replaced(3, (row) => ({ ...row, text, sha256: hex(text) }), false))).join()).toContain("no seal to the letter");
    await only(replaced(3, (row) => ({ ...row, keyId: "ab".repeat(32) })), /never introduced/);
    await only(replaced(3, (row) => ({ ...row, signature: Buffer.alloc(64) })), /signature does not fit/);
  });
  it("is named when a replaced key signed it", async () => {
    const made = replaced(2, (row) => makeRow(3, leavesIn(row.leaves)!, row.prev, KEYS[1]));
    made.rows[3] = makeRow(4, leavesIn(made.rows[3].leaves)!, made.rows[2].sha256, KEYS[0]);
    made.ledger.sealsMade[3] = told(made.rows[3], 4);
    await only(made, /^Seal 4: seal: .*had been replaced/);
  });
  it.each([["sha256", hex("x")], ["prev", hex("x")], ["chains", 9], ["madeAt", "2026-03-14T09:00:00.000001Z"], ["number", 4]] as const)("is named when %s beside its text says something else", async (field, value) => {
    if (field === "number") await expect(found(replaced(3, (row) => ({ ...row, number: 5 }), false))).resolves.toEqual(expect.arrayContaining([expect.stringContaining("The number beside its text")]));
    else await only({ ...replaced(3, (row) => ({ ...row, [field]: value }), false) }, /beside its text/);
  });
  it("is named when it does not follow the one before, in link or time", async () => {
    await only(replaced(3, (row) => makeRow(4, leavesIn(row.leaves)!, hex("x"), KEYS[1])), /does not follow/);
    await only(replaced(3, (row) => makeRow(4, leavesIn(row.leaves)!, row.prev, KEYS[1], { at: "2026-03-01T00:00:00Z" })), /claims a time before/);
  });
  it("is named when the list of heads is not the sealed one", async () => {
    const leaves = (lines: string[]) => replaced(3, (row) => ({ ...row, leaves: Buffer.from(lines.map((line) => `${line}\n`).join("")) }));
    const [a, b] = leavesAt(4, 8).map(leafText);
    await only(leaves([a]), /not those that were sealed/);
    await only(leaves([a.replace('"seq":4', '"seq":3'), b]), /not those that were sealed/);
    await only(leaves(["{"]), /cannot be read/);
    await only(leaves([a.replace('","', '", "'), b]), /cannot be read/);
    await only(replaced(3, (row) => makeRow(4, leavesAt(4, 8).reverse(), row.prev, KEYS[1])), /cannot be read/);
    await only(replaced(3, (row) => ({ ...makeRow(4, leavesAt(4, 8), row.prev, KEYS[1], { chains: 3 }) })), /not those that were sealed/);
  });
  it("is named when the workshop's log tells of it otherwise, or not at all", async () => {
    const tell = (change: object) => {
      const made = world();
      made.ledger.sealsMade[3] = { ...made.ledger.sealsMade[3], ...change };
      return made;
    };
    await only(tell({ sha256: hex("x") }), /not the seal that the workshop's log says/);
    await only(tell({ cause: "asked" }), /occasion/);
    await only(tell({ keyId: hex("x") }), /The key beside it/);
    await only(tell({ root: hex("x") }), /another root/);
    await only(tell({ chains: 7 }), /another root or number/);
    const silent = world();
    silent.ledger.sealsMade.pop();
    await only(silent, /seal-not-in-log/);
  });
  it("is named when it was taken out, with and without its entry", async () => {
    for (const [i, withEntry] of [[1, false], [3, false], [1, true]] as const) {
      const made = world();
      made.rows.splice(i, 1);
      if (withEntry) made.ledger.sealsMade.splice(i, 1);
      await only(made, withEntry ? /^Seal 2: seal-missing: The numbers leave it out/ : new RegExp(`^Workshop log ${i + 1}: seal-missing`));
    }
    const twice = world();
    twice.ledger.sealsMade.push({ ...twice.ledger.sealsMade[1], seq: 9, sha256: hex("another") });
    expect(await found(twice)).toContainEqual(expect.stringMatching(/^Workshop log 9: seal-chain: It tells of another seal 2/));
  });
  it("names the entry that it saw otherwise, the one that is gone, and a log that had been turned back", async () => {
    const changed = world();
    changed.ledger.entries.get("b")!.set(4, hex("changed"));
    await only(changed, /^Drive b 4: sealed-entry: Seal 2 of 2026-03-12/);
    const cut = world();
    for (const seq of [6, 7, 8, 9]) cut.ledger.entries.get("b")!.delete(seq);
    await only(cut, /^Drive b 8: sealed-entry-missing: Seal 4 .* the log ends at entry 5/);
    await only(replaced(3, (row) => makeRow(4, leavesAt(2, 8), row.prev, KEYS[1])), /^Drive a: seal-chain: Seal 4 saw less of this log than seal 3/);
    await only(replaced(3, (row) => makeRow(4, leavesAt(4, 8).slice(1), row.prev, KEYS[1])), /Seal 4 saw less/);
  });
});

const dir = mkdtempSync(path.join(os.tmpdir(), "twinread-check-"));
afterAll(() => rmSync(dir, { recursive: true }));
const put = (name: string, content: string | Buffer) => {
  writeFileSync(path.join(dir, name), content);
  return path.join(dir, name);
};
const bag = makeBag();
const linesOf = (files: Bag, name: string) => files.get(name)!.toString().trimEnd().split("\n");

/** A database that holds exactly what the bundle says. */
function hereOf(files: Bag): Here {
  const entries = new Map<string, Map<number, string>>();
  for (const name of ["data/drives/1/custody.jsonl", "data/workshop-keys.jsonl"]) {
    for (const line of linesOf(files, name)) {
      const { drive, seq } = JSON.parse(line) as { drive: string; seq: number };
      entries.set(drive, (entries.get(drive) ?? new Map<number, string>()).set(seq, hex(line)));
    }
  }
  const seal = files.get("data/seal/seal.txt")!;
  return {
    ledger: { entries, sealsMade: [], place: (chain) => (chain === WORKSHOP_CHAIN ? "Workshop log" : "Drive"), ring: { keys: new Map([[logKeyA.id, logKeyA.pem]]), sealKeys: new Map([[sealKeyA.id, sealKeyA.pem]]), problems: [] } },
    known: new Map([[parseSeal(seal.toString())!.number, hex(seal)]]), images: new Set([...files].filter(([name]) => name.endsWith(".bin")).map(([, bytes]) => hex(bytes))),
  };
}
const zipped = async (files: Bag, name: string) => put(name, await zipBag(files));
const problems = async (file: string, here: Here) => (await checkAgainst([file], here)).damage.map(({ problem, seq }) => (seq === null ? problem : `${problem} ${seq}`));

describe("a copy from outside", () => {
  it("agrees with the database that it was made from", async () => expect(await problems(await zipped(bag, "a.zip"), hereOf(bag))).toEqual([]));
  it("is named when the bundle is not in order", async () => {
    const other = new Map(bag).set("README.txt", Buffer.from("Other.\n"));
    expect(await problems(await zipped(other, "b.zip"), hereOf(bag))).toEqual(["outside-file"]);
  });
  it("shows a key, an entry, a shorter log, a missing image and a missing seal", async () => {
    const file = await zipped(bag, "c.zip");
    const drive = [...hereOf(bag).ledger.entries.keys()].find((chain) => chain !== WORKSHOP_CHAIN)!;
    const [keys, changed, cut, images, seals] = [1, 2, 3, 4, 5].map(() => hereOf(bag));
    keys.ledger.ring.keys.clear();
    expect(await problems(file, keys)).toEqual(["outside-key"]);
    (changed.ledger.entries.get(drive) as Map<number, string>).set(3, hex("x"));
    expect(await problems(file, changed)).toEqual(["outside-entry 3"]);
    for (const seq of [5, 6]) (cut.ledger.entries.get(drive) as Map<number, string>).delete(seq);
    expect(await problems(file, cut)).toEqual(["outside-entry-missing 5"]);
    (images.images as Set<string>).delete(hex(bag.get("data/drives/1/original-U12/before-1.bin")!));
    expect(await problems(file, images)).toEqual(["outside-image", "outside-image"]);
    (seals.known as Map<number, string>).clear();
    expect(await problems(file, seals)).toEqual(["outside-seal-missing"]);
  });
  it("shows another seal of the same number, and one that nobody of ours signed", async () => {
    const here = hereOf(bag);
    (here.known as Map<number, string>).set(7, hex("another"));
    expect(await problems(put("seal.txt", bag.get("data/seal/seal.txt")!), here)).toEqual(["outside-seal"]);
    put("seal.sig", Buffer.alloc(64));
    expect(await problems(put("seal.txt", bag.get("data/seal/seal.txt")!), hereOf(bag))).toEqual(["outside-seal"]);
  });
  it("is hostile: names, folders and lists that are not a bundle's", async () => {
    const bad = withLists(new Map(bag).set("data/drives/1/custody.jsonl", Buffer.from(`{"drive":{},"seq":"x"}\n[]\nnull\n${"x".repeat(1000)}\n`)));
    const seen = await checkAgainst([await zipped(bad, "d.zip")], hereOf(bag));
    expect(seen.damage.map(({ problem }) => problem)).toEqual(expect.arrayContaining(["outside-file", "outside-entry-missing"]));
    expect(FOLDER).toMatch(/^twinread-/);
  });
});
