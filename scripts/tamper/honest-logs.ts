import { createHash, createPublicKey, generateKeyPairSync, type KeyObject, sign, verify } from "node:crypto";
import { type ChainLine, type CustodyBody, custodyText, signedBytes, ZERO_HASH } from "@/lib/core/custody";
import { type Action, ACTIONS } from "@/lib/core/custody-actions";
import { inLeafOrder, leafText, type SealLeaf, sealRoot, sealText } from "@/lib/core/seal";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import type { SealRow } from "@/scripts/check/seals";
import { type Random, randomOf } from "@/scripts/engine/random";
import { keyIdOf } from "@/storage";

/** A workshop's logs as an honest app writes them: random steps with real facts, odd text, clocks that step, keys that change, heads that were turned back. */
export interface House {
  chains: Map<string, HonestChain>;
  seals: SealRow[];
  /** of each chain: entries that say that the head had been turned back */
  repaired: Map<string, number[]>;
}

export interface HonestChain {
  lines: ChainLine[];
  head: { seq: number; hash: string };
}

interface Key {
  id: string;
  pem: string;
  secret: KeyObject;
}

const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest();
const hex = (bytes: Uint8Array | string) => digest(bytes).toString("hex");
const uuid = (name: string) => hex(name).replace(/^(.{8})(.{4}).(.{3}).(.{3})(.{12}).*$/, "$1-$2-4$3-8$4-$5");

const TEXTS = [
  "Power surge", "Käthe & Søn", "e\u0301 beside \u00e9", "\u202eright to left\u202c", "\u0000\u0001\u001f", "\u2028 \u2029", "\ufeffbyte order", "\u{1f9ea}\u{1f469}\u200d\u{1f527}", "\"quoted\" \\ back", "line\nfeed\r\ttab", "\u007f\u0080\uffff",
  "\ud7ff\ue000", "</script><!--", "'; DROP TABLE x; --", "漢字 ｶﾅ ﷺ", "", " ", "9007199254740993", "\"prev\":\"0\",\"seq\":1", "İıſK",
];

function key(): Key {
  const { publicKey, privateKey } = generateKeyPairSync("ed25519");
  return { id: keyIdOf(publicKey), pem: publicKey.export({ type: "spki", format: "pem" }) as string, secret: privateKey };
}

/** Making keys is slow: a few are shared by all houses. */
const POOL = Array.from({ length: 12 }, key);

const FACTS: { [A in Action]?: (text: () => string, random: Random) => object } = {
  "drive.recorded": (text) => ({ caseRef: "26-0042", letter: "A", partNumber: text(), model: null, serial: text(), interface: null, caseReceivedAt: text() }),
  "drive.corrected": (text) => ({ changes: [{ field: "serial", from: text(), to: null }, { field: "model", from: 3, to: true }], reason: text() }),
  "board.recorded": (text) => ({ role: "donor", boardNumber: text(), revision: null, controllerMarking: text(), motorDriverMarking: null, condition: text(), fit: { verdict: "fits", differences: [text(), text()], reason: null } }),
  "read.set-aside": (text, random) => ({ read: { id: uuid(`r${random.below(9)}`), stage: "before", number: 1 + random.below(9) }, chip: { id: uuid("c"), designator: text() }, sha256: hex(text()), reason: text() }),
  "read.stored": (text, random) => ({
    read: { id: uuid(`r${random.below(99)}`), stage: "before", number: 1 + random.below(99) }, chip: { id: uuid("c"), designator: "U12" }, seating: 1, sizeBytes: random.below(67_108_865), crc32: hex(text()).slice(0, 8), sha256: hex(text()), format: "raw",
    fileName: text(), reader: text(), method: null, toolVersion: text(), adapter: null, supplyMillivolts: "unknown", clockKilohertz: null, controllerHeld: false, statusBits: "not read", takenAt: null, modifiedAt: null, note: text(), transfer: null,
  }),
  "approval.given": (text) => ({
    chip: { id: uuid("c"), designator: "U12" }, donorChip: { id: uuid("d"), designator: text(), boardNumber: text() }, sha256: hex(text()), sizeBytes: 8192, crc32: "0000000f", reads: [text()], seatings: [1, 2], statement: text(),
    reasons: { z: text(), a: text(), "\u{1f600}": "x", "é": "y", "\ufb33": "w" }, lookedAt: [], twoPersonRule: true, readsTakenBy: [{ id: uuid("p"), name: text() }],
  }),
  "images.checked": (_, random) => ({ images: random.below(99), bytes: Number.MAX_SAFE_INTEGER, damaged: 0, missing: 0, oldestBefore: null }),
  "log.assessed": (text) => ({ text: text() }),
  "user.created": (text) => ({ user: { id: uuid(text()), name: text() }, role: "lead" }),
  "sign-in.limited": (text) => ({ address: text(), accountDigest: hex(text()) }),
};
const OF_DRIVES: Action[] = ["drive.recorded", "drive.corrected", "board.recorded", "read.set-aside", "read.stored", "approval.given", "images.checked", "log.assessed"];
const OF_WORKSHOP: Action[] = ["user.created", "sign-in.limited", "log.assessed"];

class Writer {
  readonly chains = new Map<string, HonestChain>();
  readonly seals: SealRow[] = [];
  readonly repaired = new Map<string, number[]>();
  private readonly at = new Map<string, string>();
  private clock = Date.parse("2026-03-12T09:00:00Z");
  private next = 0;
  private logKey: Key;
  private sealKey: Key;

  constructor(private readonly random: Random) {
    this.next = random.below(POOL.length);
    this.logKey = this.take();
    this.sealKey = this.take();
    this.introduce(this.logKey, "log");
    this.introduce(this.sealKey, "seal");
  }

  private take = (): Key => POOL[this.next++ % POOL.length];
  private text = () => TEXTS[this.random.below(TEXTS.length)] + (this.random.below(3) === 0 ? String(this.random.below(1000)) : "");
  private introduce = (one: Key, purpose: string) => this.append(WORKSHOP_CHAIN, "key.introduced", { keyId: one.id, purpose, publicKeyPem: one.pem, ...(this.next > 2 ? { reason: this.text() } : {}) });

  append(chain: string, action: Action, given: object, headBehind?: number): void {
    const log = this.chains.get(chain) ?? { lines: [], head: { seq: 0, hash: ZERO_HASH } };
    this.chains.set(chain, log);
    this.clock += this.random.below(12) === 0 ? -this.random.below(7_200_000) : this.random.below(60_000);
    const now = new Date(this.clock).toISOString().replace("Z", `${String(this.random.below(1000)).padStart(3, "0")}Z`);
    const before = this.at.get(chain) ?? "";
    const clockBehindMs = now < before ? Math.ceil(Date.parse(before) - Date.parse(now)) : undefined;
    const facts = JSON.parse(JSON.stringify(ACTIONS[action].facts.parse({ ...given, clockBehindMs, headBehind }))) as Record<string, unknown>;
    const seq = log.lines.length + 1;
    const body: CustodyBody = {
      v: 1, drive: chain, seq, at: clockBehindMs === undefined ? now : before, app: "1.4.0", actor: { id: uuid("somebody"), name: this.text(), role: "lead" }, action, subject: { type: "drive", id: chain }, facts,
      prev: log.head.seq === 0 ? ZERO_HASH : hex(log.lines[seq - 2].body),
    };
    const bytes = Buffer.from(custodyText(body), "utf8");
    this.at.set(chain, body.at);
    log.lines.push({ body: bytes, hash: hex(bytes), keyId: this.logKey.id, signature: sign(null, signedBytes(bytes), this.logKey.secret).toString("base64"), beside: { seq, prev: body.prev, action } });
    log.head = { seq, hash: hex(bytes) };
  }

  seal(): void {
    const leaves = inLeafOrder([...this.chains].map(([drive, { head }]): SealLeaf => ({ drive, head: head.hash, seq: head.seq })));
    const before = this.seals.at(-1);
    const at = [`${new Date(this.clock).toISOString().slice(0, -1)}000Z`, this.at.get(WORKSHOP_CHAIN) ?? "", before?.madeAt ?? ""].sort().at(-1)!;
    const [number, root] = [this.seals.length + 1, sealRoot(leaves, digest)];
    const text = Buffer.from(sealText({ number, at, chains: leaves.length, root, prev: before?.sha256 ?? ZERO_HASH }));
    const cause = this.random.below(2) === 0 ? "daily" : "asked";
    this.seals.push({
      number, text, sha256: hex(text), prev: before?.sha256 ?? ZERO_HASH, keyId: this.sealKey.id, signature: sign(null, text, this.sealKey.secret), cause, madeAt: at, chains: leaves.length,
      leaves: Buffer.from(leaves.map((leaf) => `${leafText(leaf)}\n`).join("")),
    });
    this.append(WORKSHOP_CHAIN, "seal.made", { number, sha256: hex(text), root, chains: leaves.length, keyId: this.sealKey.id, cause });
  }

  step(drives: string[]): void {
    const dice = this.random.below(20);
    if (dice === 0) this.seal();
    else if (dice === 1) this.changeKey();
    else if (dice < 5) this.something(WORKSHOP_CHAIN, OF_WORKSHOP);
    else this.something(drives[this.random.below(drives.length)], OF_DRIVES);
  }

  private something(chain: string, actions: Action[]): void {
    const action = actions[this.random.below(actions.length)];
    const length = this.chains.get(chain)?.lines.length ?? 0;
    const behind = length > 1 && this.random.below(40) === 0 ? this.random.below(length) : undefined;
    this.append(chain, action, FACTS[action]!(this.text, this.random), behind);
    if (behind !== undefined) this.repaired.set(chain, [...(this.repaired.get(chain) ?? []), length + 1]);
  }

  private changeKey(): void {
    const seal = this.random.below(2) === 0;
    const next = this.take();
    if (this.chains.get(WORKSHOP_CHAIN)!.lines.some((line) => Buffer.from(line.body).includes(next.id))) return;
    this.introduce(next, seal ? "seal" : "log");
    if (seal) this.sealKey = next;
    else this.logKey = next;
  }
}

/** The same seed gives the same steps and facts; keys and signatures are those of this process. */
export function honestHouse(seed: number): House {
  const random = randomOf(seed);
  const writer = new Writer(random);
  const drives = Array.from({ length: 1 + random.below(3) }, (_, i) => uuid(`drive ${seed} ${i}`));
  const steps = 4 + random.below(36);
  for (let i = 0; i < steps; i += 1) writer.step(drives);
  writer.seal();
  return { chains: writer.chains, seals: writer.seals, repaired: writer.repaired };
}

/** Public keys are parsed once. */
const parsed = new Map<string, KeyObject>();
export function verifies(pem: string, bytes: Uint8Array, signature: Uint8Array): boolean {
  try {
    const known = parsed.get(pem) ?? createPublicKey(pem);
    parsed.set(pem, known);
    return verify(null, bytes, known, signature);
  } catch {
    return false;
  }
}
