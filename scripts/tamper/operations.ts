import { createHash, sign } from "node:crypto";
import { canonicalJson } from "@/lib/core/canonical";
import { signedBytes } from "@/lib/core/custody";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { keyIdOf } from "@/storage";
import { changed, entriesOf, strangersKey } from "./rewrite";
import type { Scene, Sql } from "./scene";

/** One thing that somebody does to the database, row by row; a transaction takes it back. */
export interface Operation {
  name: string;
  row: "first" | "middle" | "last" | "";
  run(db: Sql, scene: Scene): Promise<void>;
}

export const ROWS = ["first", "middle", "last"] as const;
export const seqOf = (scene: Scene, row: (typeof ROWS)[number]) => ({ first: 1, middle: Math.ceil(scene.last / 2), last: scene.last })[row];
const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest();
const WHERE = "WHERE chain_id = ? AND seq = ?";

async function bodyAt(db: Sql, chain: string, seq: number): Promise<Buffer> {
  const [row] = await db.query<{ body: Buffer }[]>(`SELECT body FROM custody_entries ${WHERE}`, [chain, seq]);
  return row.body;
}

/** Values that a column of the log could be changed to. */
const COLUMNS: Record<string, (scene: Scene, seq: number, body: Buffer) => unknown> = {
  body: (_, __, body) => changed(body, ({ actor }) => void (actor.name = "Somebody Else")),
  hash: () => digest("another"),
  prev: () => digest("another"),
  seq: (scene) => scene.last + 1000,
  chain_id: (scene) => scene.b.chip.driveId.replace(/^./, (digit) => (digit === "0" ? "1" : "0")),
  key_id: () => "ab".repeat(32),
  signature: () => Buffer.alloc(64, 7),
  action: () => "log.assessed",
};

function columnOps(): Operation[] {
  return Object.entries(COLUMNS).flatMap(([column, value]) => ROWS.map((row): Operation => ({
    name: `change ${column}`, row,
    async run(db, scene) {
      const seq = seqOf(scene, row);
      await db.query(`UPDATE custody_entries SET ${column} = ? ${WHERE}`, [value(scene, seq, await bodyAt(db, scene.a.chip.driveId, seq)), scene.a.chip.driveId, seq]);
    },
  })));
}

/** The same content in another form: evidence is bytes, not meaning. The stored hash is changed with it. */
const FORMS: Record<string, (body: Buffer) => Buffer> = {
  "names re-ordered": (body) => Buffer.from(JSON.stringify(Object.fromEntries(Object.entries(JSON.parse(body.toString("utf8")) as object).reverse()))),
  "white space added": (body) => Buffer.from(body.toString("utf8").replace('","', '", "')),
  "text escaped otherwise": (body) => Buffer.from(body.toString("utf8").replace(/"v":1/, '"\\u0076":1')),
  "number written otherwise": (body) => Buffer.from(body.toString("utf8").replace(/"v":1/, '"v":1.0')),
  "Unicode normalised": (body) => Buffer.from(body.toString("utf8").replace(/“/, '"').replace(/é/g, "e\u0301").replace(/"name":"/, '"name":"\u00e9'.normalize("NFD"))),
};

function formOps(): Operation[] {
  return Object.entries(FORMS).flatMap(([form, change]) => ROWS.map((row): Operation => ({
    name: `body and hash: ${form}`, row,
    async run(db, scene) {
      const [chain, seq] = [scene.a.chip.driveId, seqOf(scene, row)];
      const body = change(await bodyAt(db, chain, seq));
      await db.query(`UPDATE custody_entries SET body = ?, hash = ? ${WHERE}`, [body, digest(body), chain, seq]);
    },
  })));
}

const INSERT = "INSERT INTO custody_entries (chain_id, seq, body, hash, prev, key_id, signature, action)";

function rowOps(): Operation[] {
  return ROWS.flatMap((row): Operation[] => [
    { name: "delete", row, run: async (db, scene) => void (await db.query(`DELETE FROM custody_entries ${WHERE}`, [scene.a.chip.driveId, seqOf(scene, row)])) },
    {
      name: "delete this and all after", row,
      run: async (db, scene) => void (await db.query("DELETE FROM custody_entries WHERE chain_id = ? AND seq >= ?", [scene.a.chip.driveId, seqOf(scene, row)])),
    },
    {
      name: "insert a forged entry before", row,
      async run(db, scene) {
        const [chain, seq] = [scene.a.chip.driveId, seqOf(scene, row)];
        await db.query("UPDATE custody_entries SET seq = seq + 1 WHERE chain_id = ? AND seq >= ? ORDER BY seq DESC", [chain, seq]);
        const body = changed(await bodyAt(db, chain, seq + 1), ({ actor }) => void (actor.name = "Nobody"));
        await db.query(`${INSERT} SELECT chain_id, ?, ?, ?, ?, key_id, signature, action FROM custody_entries ${WHERE}`, [seq, body, digest(body), digest("between"), chain, seq + 1]);
      },
    },
    {
      name: "duplicate at the end", row,
      run: async (db, scene) => void (await db.query(`${INSERT} SELECT chain_id, ?, body, hash, ?, key_id, signature, action FROM custody_entries ${WHERE}`, [scene.last + 1, digest("twice"), scene.a.chip.driveId, seqOf(scene, row)])),
    },
    {
      name: "swap with a neighbour", row,
      async run(db, scene) {
        const [chain, one] = [scene.a.chip.driveId, seqOf(scene, row)];
        const other = one === scene.last ? one - 1 : one + 1;
        for (const [from, to] of [[one, 900_000], [other, one], [900_000, other]]) await db.query(`UPDATE custody_entries SET seq = ? ${WHERE}`, [to, chain, from]);
      },
    },
    {
      name: "move to another drive's log", row,
      async run(db, scene) {
        const [{ n }] = await db.query<{ n: number }[]>("SELECT MAX(seq) + 1 AS n FROM custody_entries WHERE chain_id = ?", [scene.b.chip.driveId]);
        await db.query(`UPDATE custody_entries SET chain_id = ?, seq = ?, prev = ? ${WHERE}`, [scene.b.chip.driveId, n, digest("moved"), scene.a.chip.driveId, seqOf(scene, row)]);
      },
    },
    {
      name: "key id in capitals (collation)", row,
      run: async (db, scene) => void (await db.query(`UPDATE custody_entries SET key_id = UPPER(key_id) ${WHERE}`, [scene.a.chip.driveId, seqOf(scene, row)])),
    },
    {
      name: "who did it in role history (user entries)", row,
      async run(db, scene) {
        const users = (await entriesOf(db, WORKSHOP_CHAIN)).filter(({ body }) => body.includes('"action":"user.'));
        const { seq, body } = { first: users[0], middle: users[Math.floor(users.length / 2)], last: users[users.length - 1] }[row];
        await db.query(`UPDATE custody_entries SET body = ? ${WHERE}`, [changed(body, ({ actor }) => void (actor.name = scene.a.lead.name)), WORKSHOP_CHAIN, seq]);
      },
    },
  ]);
}

interface Forged {
  chain: string;
  action: string;
  facts: object;
  borrowed?: boolean;
}

/** A forged entry whose chain is right: whoever may INSERT can make one, but not sign it. */
export async function appendForged(db: Sql, { chain, action, facts, borrowed = false }: Forged): Promise<void> {
  const entries = await entriesOf(db, chain);
  const before = entries[entries.length - 1];
  const { at } = JSON.parse(before.body.toString("utf8")) as { at: string };
  const { privateKey, publicKey } = strangersKey();
  const seq = before.seq + 1;
  const prev = digest(before.body);
  const actor = { id: "7d4b7a9e-3f0f-4bd0-9c55-1f1d0f5d8a11", name: "Somebody", role: "auditor" };
  const body = Buffer.from(canonicalJson({ v: 1, drive: chain, seq, at, app: "1.0.0", actor, action, subject: { type: "drive", id: chain }, facts, prev: prev.toString("hex") }));
  const [{ keyId }] = await db.query<{ keyId: string }[]>(`SELECT key_id AS keyId FROM custody_entries ${WHERE}`, [chain, 1]);
  await db.query(`${INSERT} VALUES (?, ?, ?, ?, ?, ?, ?, ?)`, [chain, seq, body, digest(body), prev, borrowed ? keyId : keyIdOf(publicKey), sign(null, signedBytes(body), privateKey), action]);
  await db.query("UPDATE custody_heads SET seq = ?, hash = ? WHERE chain_id = ?", [seq, digest(body), chain]);
}

function forgedOps(): Operation[] {
  const { publicKey } = strangersKey();
  const pem = publicKey.export({ type: "spki", format: "pem" });
  const key = { keyId: keyIdOf(publicKey), publicKeyPem: pem };
  const kinds: [string, (scene: Scene) => Forged][] = [
    ["append a forged entry, own key", ({ a }) => ({ chain: a.chip.driveId, action: "drive.corrected", facts: { changes: [], reason: "None." } })],
    ["append a forged entry, the real key's id", ({ a }) => ({ chain: a.chip.driveId, action: "drive.corrected", facts: { changes: [], reason: "None." }, borrowed: true })],
    ["append a forged assessment", ({ a }) => ({ chain: a.chip.driveId, action: "log.assessed", facts: { text: "All is well." } })],
    ["append a forged log key", () => ({ chain: WORKSHOP_CHAIN, action: "key.introduced", facts: { ...key, purpose: "log" } })],
    ["append a forged seal key", () => ({ chain: WORKSHOP_CHAIN, action: "key.introduced", facts: { ...key, purpose: "seal" } })],
    ["append a forged account", ({ admin }) => ({ chain: WORKSHOP_CHAIN, action: "user.created", facts: { user: { id: admin.id, name: "X" }, role: "admin" } })],
  ];
  return kinds.map(([name, forged]) => ({ name, row: "", run: (db, scene) => appendForged(db, forged(scene)) }));
}

function headOps(): Operation[] {
  const set = (name: string, what: string, values: (scene: Scene) => unknown[] = () => []): Operation => ({
    name, row: "", run: async (db, scene) => void (await db.query(`UPDATE custody_heads SET ${what} WHERE chain_id = ?`, [...values(scene), scene.a.chip.driveId])),
  });
  return [
    set("head: one back", "seq = seq - 1"), set("head: one forward", "seq = seq + 1"), set("head: another hash", "hash = ?", () => [digest("x")]),
    { name: "head: delete", row: "", run: async (db, scene) => void (await db.query("DELETE FROM custody_heads WHERE chain_id = ?", [scene.a.chip.driveId])) },
    set("head: another drive's", "chain_id = ?", () => ["0b6a07e1-8853-4f70-8a00-000000000001"]),
    {
      name: "replace the public key in its entry", row: "",
      async run(db) {
        const { seq, body } = (await entriesOf(db, WORKSHOP_CHAIN)).find((entry) => entry.body.includes('"action":"key.introduced"'))!;
        await db.query(`UPDATE custody_entries SET body = ? ${WHERE}`, [changed(body, ({ facts }) => void Object.assign(facts, key())), WORKSHOP_CHAIN, seq]);
      },
    },
  ];
}

function key(): object {
  const { publicKey } = strangersKey();
  return { keyId: keyIdOf(publicKey), publicKeyPem: publicKey.export({ type: "spki", format: "pem" }) };
}

/** Everything that is done to the log's own tables, entry by entry. */
export const logOperations = (): Operation[] => [...columnOps(), ...formOps(), ...rowOps(), ...forgedOps(), ...headOps()];
