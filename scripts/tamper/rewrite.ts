import { createHash, createPrivateKey, generateKeyPairSync, type KeyObject, sign } from "node:crypto";
import { readFileSync } from "node:fs";
import path from "node:path";
import { canonicalJson } from "@/lib/core/canonical";
import { signedBytes, ZERO_HASH } from "@/lib/core/custody";
import { leafText, parseSeal, sealRoot, sealText } from "@/lib/core/seal";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { leavesIn } from "@/scripts/check/seals";
import type { Sql } from "./scene";

/** What the stronger attackers do after a change: make everything after it fit again. */
export interface Entry {
  seq: number;
  body: Buffer;
}

const digest = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();

export async function entriesOf(db: Sql, chain: string): Promise<Entry[]> {
  return db.query<Entry[]>("SELECT seq, body FROM custody_entries WHERE chain_id = ? ORDER BY seq", [chain]);
}

export const keyOfHouse = (use: "log" | "seal") => createPrivateKey(readFileSync(path.join(env().dataDir, "keys", `${use}-key.pem`)));
export const strangersKey = () => generateKeyPairSync("ed25519");

/** The entry's body with other content, in the canonical form. */
export function changed(body: Buffer, change: (entry: { actor: { name: string }; facts: Record<string, unknown>; prev: string; seq: number; at: string }) => void): Buffer {
  const entry = JSON.parse(body.toString("utf8")) as Parameters<typeof change>[0];
  change(entry);
  return Buffer.from(canonicalJson(entry), "utf8");
}

/**
 * Writes a chain anew from `from` on: numbers, prev, hashes, and the head. Signed with `key` where there is one; without
 * it the former signatures stay, which fit no longer.
 */
export async function chainAnew(db: Sql, chain: string, from: number, key: KeyObject | null): Promise<void> {
  const entries = await entriesOf(db, chain);
  let before = ZERO_HASH;
  const writes: { seq: number; body: Buffer; hash: Buffer; prev: string }[] = [];
  for (const { seq, body } of entries) {
    const next = seq < from ? body : changed(body, (entry) => void Object.assign(entry, { prev: before, seq }));
    const hash = digest(next);
    if (seq >= from) writes.push({ seq, body: next, hash, prev: before });
    before = hash.toString("hex");
  }
  // the links of one chain are unique: first out of the way
  for (const { seq } of writes) await db.query("UPDATE custody_entries SET prev = ? WHERE chain_id = ? AND seq = ?", [digest(Buffer.from(`aside ${seq}`)), chain, seq]);
  for (const { seq, body, hash, prev } of writes) {
    await db.query("UPDATE custody_entries SET body = ?, hash = ?, prev = ? WHERE chain_id = ? AND seq = ?", [body, hash, Buffer.from(prev, "hex"), chain, seq]);
    if (key) await db.query("UPDATE custody_entries SET signature = ? WHERE chain_id = ? AND seq = ?", [sign(null, signedBytes(body), key), chain, seq]);
  }
  await headAtEnd(db, chain);
}

/** The head where the last entry is; none without entries. */
export async function headAtEnd(db: Sql, chain: string): Promise<void> {
  const last = (await entriesOf(db, chain)).at(-1);
  if (!last) return void (await db.query("DELETE FROM custody_heads WHERE chain_id = ?", [chain]));
  await db.query("UPDATE custody_heads SET seq = ?, hash = ? WHERE chain_id = ?", [last.seq, digest(last.body), chain]);
}

/** Cuts a chain behind `keep` entries and turns the head back. */
export async function cutTail(db: Sql, chain: string, keep: number): Promise<void> {
  await db.query("DELETE FROM custody_entries WHERE chain_id = ? AND seq > ?", [chain, keep]);
  await headAtEnd(db, chain);
}

interface Row {
  number: number;
  text: Buffer;
  leaves: Buffer;
}

/** With both keys: every seal made anew over the chains as they are now, and its entry in the workshop's log with it. */
export async function sealsAnew(db: Sql): Promise<void> {
  const [logKey, sealKey] = [keyOfHouse("log"), keyOfHouse("seal")];
  let prev = ZERO_HASH;
  for (const { number, text, leaves } of await db.query<Row[]>("SELECT number, text, leaves FROM seals ORDER BY number")) {
    const facts = parseSeal(text.toString("utf8"))!;
    const now = [];
    for (const leaf of leavesIn(leaves)!) {
      const [row] = await db.query<{ body: Buffer }[]>("SELECT body FROM custody_entries WHERE chain_id = ? AND seq = ?", [leaf.drive, leaf.seq]);
      if (row) now.push({ ...leaf, head: digest(row.body).toString("hex") });
    }
    const root = sealRoot(now, digest);
    const next = Buffer.from(sealText({ ...facts, chains: now.length, root, prev }));
    const sha256 = digest(next);
    await db.query("UPDATE seals SET text = ?, sha256 = ?, prev = ?, signature = ?, chains = ?, leaves = ? WHERE number = ?", [
      next, sha256, Buffer.from(prev, "hex"), sign(null, next, sealKey), now.length, Buffer.from(now.map((leaf) => `${leafText(leaf)}\n`).join("")), number,
    ]);
    prev = sha256.toString("hex");
    const told = (await entriesOf(db, WORKSHOP_CHAIN)).find(({ body }) => body.includes(`"number":${number},`) && body.includes('"action":"seal.made"'));
    if (!told) continue;
    const body = changed(told.body, ({ facts: f }) => void Object.assign(f, { sha256: prev, root, chains: now.length }));
    await db.query("UPDATE custody_entries SET body = ? WHERE chain_id = ? AND seq = ?", [body, WORKSHOP_CHAIN, told.seq]);
    await chainAnew(db, WORKSHOP_CHAIN, told.seq, logKey);
  }
}
