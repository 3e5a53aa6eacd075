import { z } from "zod";
import { canonicalJson } from "./canonical";

/** The custody log's format `twinread-custody/1` (CUSTODY.md). */
export interface CustodyBody {
  v: 1;
  /** the chain: a drive's id, or the nil UUID for `workshop` */
  drive: string;
  /** counts up by one from 1 */
  seq: number;
  /** the database's UTC clock, "2026-11-03T09:14:05.123456Z" */
  at: string;
  app: string;
  actor: { id: string; name: string; role: string };
  action: string;
  subject: { type: string; id: string };
  facts: Record<string, unknown>;
  /** SHA-256 of the previous body's bytes, lower-case hex; ZERO_HASH for the first */
  prev: string;
}

export const ZERO_HASH = "0".repeat(64);
export const SIGNED_PREFIX = "twinread-custody/1\n";

/** The stored text of a body: RFC 8785. Throws CanonicalError where a fact can't be evidence. */
export function custodyText(body: CustodyBody): string {
  return canonicalJson(body);
}

/** What is signed: the prefix, a newline, the body's bytes. */
export function signedBytes(body: string | Uint8Array): Uint8Array<ArrayBuffer> {
  const prefix = new TextEncoder().encode(SIGNED_PREFIX);
  const bytes = typeof body === "string" ? new TextEncoder().encode(body) : body;
  const out = new Uint8Array(prefix.length + bytes.length);
  out.set(prefix);
  out.set(bytes, prefix.length);
  return out;
}

export type ChainProblem =
  | "not-readable" | "not-canonical" | "wrong-shape" | "other-chain" | "sequence" | "time-went-back" | "prev" | "stored-hash" | "stored-beside"
  | "unknown-key" | "old-key" | "signature" | "head" | "head-was-behind" | "tail-missing" | "could-not-check";

export interface ChainFinding {
  /** the entry's place in the chain; null for the head */
  seq: number | null;
  problem: ChainProblem;
  expected?: string;
  found?: string;
}

export interface ChainLine {
  body: Uint8Array;
  /** the hash stored beside the body, lower-case hex, where there is one */
  hash?: string;
  /** base64 */
  signature: string;
  keyId: string;
  /** what the database says of the entry beside its body, where it comes from one */
  beside?: { seq: number; prev: string; action: string };
}

export interface ChainTools {
  /** lower-case hex */
  sha256(bytes: Uint8Array): Promise<string> | string;
  verify(keyId: string, bytes: Uint8Array, signature: Uint8Array): Promise<boolean> | boolean;
  /** without it an unknown key shows as a signature that doesn't fit */
  knows?(keyId: string): boolean;
  /** the key's place among the log keys in the order in which they were introduced; without it no key is too old */
  order?(keyId: string): number | undefined;
}

const hash = z.string().regex(/^[0-9a-f]{64}$/);
const bodyShape = z.strictObject({
  v: z.literal(1),
  drive: z.string().min(1),
  seq: z.int().min(1),
  at: z.string().regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}\.\d{6}Z$/),
  app: z.string(),
  actor: z.strictObject({ id: z.string(), name: z.string(), role: z.string() }),
  action: z.string().min(1),
  subject: z.strictObject({ type: z.string(), id: z.string() }),
  facts: z.record(z.string(), z.unknown()),
  prev: hash,
});

type Report = (problem: ChainProblem, expected?: string, found?: string) => void;

const sayError = (error: unknown) => (error instanceof Error ? error.message : String(error));
const text = (value: unknown) => (typeof value === "string" || typeof value === "number" ? String(value) : typeof value);

/** Hostile input: bytes that may be anything. A body whose shape is off is still read for what it has. */
function readBody(bytes: Uint8Array, report: Report): Partial<CustodyBody> | null {
  let source: string;
  let value: unknown;
  try {
    source = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(bytes);
    value = JSON.parse(source);
  } catch (error) {
    report("not-readable", "JSON in UTF-8", sayError(error));
    return null;
  }
  try {
    if (canonicalJson(value) !== source) report("not-canonical", "the RFC 8785 form", "another form of the same content");
  } catch (error) {
    report("not-canonical", "the RFC 8785 form", sayError(error));
  }
  const shape = bodyShape.safeParse(value);
  if (!shape.success) {
    const [issue] = shape.error.issues;
    report("wrong-shape", "twinread-custody/1", `${issue.path.map(String).join(".") || "body"}: ${issue.message}`);
  }
  return typeof value === "object" && value !== null && !Array.isArray(value) ? value : null;
}

function fromBase64(encoded: string): Uint8Array | null {
  try {
    return Uint8Array.from(atob(encoded), (character) => character.charCodeAt(0));
  } catch {
    return null;
  }
}

/** True when the signature holds. */
async function checkSignature(line: ChainLine, tools: ChainTools, report: Report): Promise<boolean> {
  try {
    if (tools.knows && !tools.knows(line.keyId)) report("unknown-key", "a key introduced in the workshop's log", line.keyId);
    else {
      const signature = fromBase64(line.signature);
      if (!signature) report("signature", "base64", "something else");
      else if (await tools.verify(line.keyId, signedBytes(line.body), signature)) return true;
      else report("signature", "a signature over this body", "one that doesn't fit");
    }
  } catch (error) {
    report("signature", "a signature over this body", sayError(error));
  }
  return false;
}

/** Entries are looked up by these: one that stands under another number or name than its own would not be found. */
function checkBeside({ beside }: ChainLine, body: Partial<CustodyBody>, report: Report): void {
  if (!beside) return;
  for (const name of ["seq", "action", "prev"] as const) {
    if (beside[name] !== body[name]) return report("stored-beside", `${name} ${text(body[name])}`, `${name} ${text(beside[name])}`);
  }
}

/** The newest key that has signed in this chain so far; only a signature that holds moves it on. */
interface NewestKey {
  order: number;
  keyId: string;
}

/** Whoever kept a replaced key could go on writing with it: from the first entry of a later key on that shows. */
function checkKeyOrder(keyId: string, newest: NewestKey, tools: ChainTools, report: Report): NewestKey {
  const order = tools.order?.(keyId);
  if (order === undefined || order === newest.order) return newest;
  if (order > newest.order) return { order, keyId };
  report("old-key", newest.keyId, keyId);
  return newest;
}

function checkHead(head: { seq: number; hash: string } | null, last: { seq: number; hash: string | null }, findings: ChainFinding[]): void {
  if (!head) {
    if (last.seq > 0) findings.push({ seq: null, problem: "head", expected: `entry ${last.seq}`, found: "no head" });
    return;
  }
  if (head.seq > last.seq) {
    findings.push({ seq: null, problem: "tail-missing", expected: `${head.seq} entries`, found: `${last.seq}` });
  } else if (head.seq < last.seq) {
    findings.push({ seq: null, problem: "head", expected: `entry ${last.seq}`, found: `entry ${head.seq}` });
  } else if (last.hash !== null && head.hash !== last.hash) {
    findings.push({ seq: null, problem: "head", expected: last.hash, found: head.hash });
  }
}

/**
 * Checks a whole chain, in order, and reports everything it finds; an empty list means clean. It never throws on
 * damaged input and never repairs: each line is judged against the bytes before it, so that one damaged entry
 * shows at itself and at the next one's `prev`, and not in all that follow. `chain` is the chain's id.
 */
export async function checkChain(
  lines: ChainLine[], head: { seq: number; hash: string } | null, tools: ChainTools, chain: string,
): Promise<ChainFinding[]> {
  const findings: ChainFinding[] = [];
  let previous: { seq: number; hash: string | null; at: string } = { seq: 0, hash: ZERO_HASH, at: "" };
  let newest: NewestKey = { order: -1, keyId: "" };
  for (const line of lines) {
    const expectedSeq = previous.seq + 1;
    const here: ChainFinding[] = [];
    const report: Report = (problem, expected, found) => here.push({ seq: expectedSeq, problem, expected, found });
    const body = readBody(line.body, report);
    const next = { seq: expectedSeq, hash: null as string | null, at: previous.at };
    if (body) {
      if (body.drive !== chain) report("other-chain", chain, text(body.drive));
      if (body.seq !== expectedSeq) report("sequence", String(expectedSeq), text(body.seq));
      if (typeof body.at === "string") {
        if (body.at < previous.at) report("time-went-back", `${previous.at} or later`, body.at);
        next.at = body.at;
      }
      const behind = body.facts?.headBehind;
      if (behind !== undefined) report("head-was-behind", `the head at entry ${expectedSeq - 1}`, `at entry ${text(behind)}`);
      if (previous.hash !== null && body.prev !== previous.hash) report("prev", previous.hash, text(body.prev));
      checkBeside(line, body, report);
    }
    try {
      next.hash = await tools.sha256(line.body);
      if (line.hash !== undefined && line.hash !== next.hash) report("stored-hash", next.hash, line.hash);
    } catch (error) {
      report("could-not-check", "a digest of the body", sayError(error));
    }
    if (await checkSignature(line, tools, report)) {
      newest = checkKeyOrder(line.keyId, newest, tools, report);
      // after a gap go on from what is there, so that one missing entry is one finding; only a signed number counts
      if (body && Number.isSafeInteger(body.seq) && body.seq! > expectedSeq) next.seq = body.seq!;
    }
    findings.push(...here.map((finding) => ({ ...finding, seq: next.seq })));
    previous = next;
  }
  checkHead(head, previous, findings);
  return findings;
}
