import { createHash } from "node:crypto";
import path from "node:path";
import { QueryTypes } from "sequelize";
import { canonicalJson } from "@/lib/core/canonical";
import { parseSeal } from "@/lib/core/seal";
import { env } from "@/lib/env";
import { connection, inTransaction, Seal, type Transaction } from "@/models";
import { appendWitness, readWitness, witnessMark } from "@/storage";

/** What the witness file holds; `mark` tells whether it has changed since. */
interface Held {
  mark: string | null;
  /** SHA-256 of each seal's text in hex, and its number */
  seals: Map<string, number>;
  unreadable: number;
  rest: string;
}

// One writer a process: the bundler may load this module more than once.
const shared = globalThis as unknown as { twinreadWitness?: { held: Held | null; turn: Promise<void>; trouble: string | null } };
const witness = () => (shared.twinreadWitness ??= { held: null, turn: Promise.resolve(), trouble: null });

const PAGE = 200;
/** seconds to wait for another process that is writing */
const WAIT_SECONDS = 10;

/**
 * Appends every seal that the witness file does not hold yet. It never rejects: what stood in the way is kept for
 * whoever looks (`witnessTrouble`), and the next call tries again.
 */
export function witnessSeals(): Promise<void> {
  const state = witness();
  return (state.turn = state.turn.then(async () => {
    try {
      await inTransaction(writeMissing, { receipt: false });
      state.trouble = null;
    } catch (error) {
      state.held = null;
      state.trouble = sentence(error);
    }
  }));
}

/** Why the last try to write did not work, as a sentence; null when it did. */
export const witnessTrouble = () => witness().trouble;

/** What the file holds now, read anew only when it has changed. */
export async function heldByWitness(): Promise<Held> {
  const state = witness();
  const file = env().witnessFile;
  const mark = await witnessMark(file);
  if (state.held?.mark === mark) return state.held;
  const { lines, rest } = await readWitness(file);
  const held: Held = { mark, seals: new Map(), unreadable: 0, rest };
  for (const line of lines) {
    const seal = sealIn(line);
    if (seal) held.seals.set(seal.sha256, seal.number);
    else held.unreadable += 1;
  }
  const last = sealIn(rest);
  if (last) held.seals.set(last.sha256, last.number);
  return (state.held = held);
}

/** Hostile input: the file may lie where others write. */
function sealIn(line: string): { sha256: string; number: number } | null {
  try {
    const { seal } = JSON.parse(line) as { seal?: unknown };
    const parsed = typeof seal === "string" ? parseSeal(seal) : null;
    return parsed && { number: parsed.number, sha256: createHash("sha256").update(seal as string).digest("hex") };
  } catch {
    return null;
  }
}

/** Numbers and digests of all seals, for comparing with the file. */
export async function sealDigests(tx?: Transaction): Promise<{ number: number; sha256: string }[]> {
  return connection().query<{ number: number; sha256: string }>("SELECT number, LOWER(HEX(sha256)) AS sha256 FROM seals ORDER BY number", { transaction: tx, type: QueryTypes.SELECT });
}

async function writeMissing(tx: Transaction): Promise<void> {
  const [{ got }] = await connection().query<{ got: number | null }>("SELECT GET_LOCK(CONCAT('twinread-witness-', DATABASE()), ?) AS got", {
    replacements: [WAIT_SECONDS], transaction: tx, type: QueryTypes.SELECT,
  });
  if (Number(got) !== 1) return;
  try {
    const held = await heldByWitness();
    const missing = (await sealDigests(tx)).filter((seal) => !held.seals.has(seal.sha256));
    for (let i = 0; i < missing.length; i += PAGE) await append(missing.slice(i, i + PAGE), tx);
  } finally {
    await connection().query("SELECT RELEASE_LOCK(CONCAT('twinread-witness-', DATABASE()))", { transaction: tx, type: QueryTypes.SELECT });
  }
}

async function append(missing: { number: number; sha256: string }[], tx: Transaction): Promise<void> {
  const file = env().witnessFile;
  const held = await heldByWitness();
  const rows = await Seal.findAll({ attributes: ["number", "text", "signature", "keyId"], where: { number: missing.map((seal) => seal.number) }, order: ["number"], transaction: tx });
  const text = rows.map((row) => `${canonicalJson({ keyId: row.keyId, seal: row.text.toString("utf8"), signature: row.signature.toString("base64") })}\n`).join("");
  // a line that a dying writer left half is completed where it can be, and closed where not
  const toAdd = held.rest === "" ? text : text.startsWith(held.rest) ? text.slice(held.rest.length) : `\n${text}`;
  await appendWitness(file, toAdd, file.startsWith(env().dataDir + path.sep));
  const unreadable = held.unreadable + (held.rest !== "" && toAdd.startsWith("\n") && !sealIn(held.rest) ? 1 : 0);
  for (const { number, sha256 } of missing) held.seals.set(sha256, number);
  witness().held = { ...held, mark: await witnessMark(file), unreadable, rest: "" };
}

function sentence(error: unknown): string {
  const { code, message } = error as NodeJS.ErrnoException;
  const why = code === "ENOENT" ? "its folder is not there" : code === "EACCES" || code === "EPERM" || code === "EROFS" ? "Twinread may not write there" : code === "ENOSPC" || code === "EDQUOT" ? "its disk is full" : message;
  return `The witness file can't be written: ${why}. Seals are made all the same; see to ${env().witnessFile}, and what is missing is added by itself.`;
}
