import { createHash, createPrivateKey, createPublicKey, type KeyObject, sign } from "node:crypto";
import {
  bagInfoTxt, bagitTxt, CASE_JSON, custodyPath, LOG_KEY, MANIFEST, manifestLine, readmeTxt, SEAL_KEY, SEAL_PROOF, SEAL_SIGNATURE, SEAL_TEXT, signatureLine,
  TAG_MANIFEST, TAG_SIGNATURE, WORKSHOP_KEYS,
} from "@/lib/core/bundle-layout";
import { canonicalJson } from "@/lib/core/canonical";
import { CHECK_SCRIPT } from "@/lib/core/check-script";
import { custodyText, signedBytes, ZERO_HASH } from "@/lib/core/custody";
import { inLeafOrder, type SealLeaf, sealProof, sealRoot, sealText } from "@/lib/core/seal";
import { WORKSHOP_CHAIN } from "@/lib/core/words";

/** A case bundle made from nothing: every file, every signature, no database. The same options give the same bytes. */
export type Bag = Map<string, Buffer>;

export interface TestKey {
  id: string;
  pem: string;
  secret: KeyObject;
}

const PKCS8 = Buffer.from("302e020100300506032b657004220420", "hex");
const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest();
export const hex = (bytes: Uint8Array | string) => digest(bytes).toString("hex");

export function testKey(name: string): TestKey {
  const secret = createPrivateKey({ key: Buffer.concat([PKCS8, digest(`key ${name}`)]), format: "der", type: "pkcs8" });
  const open = createPublicKey(secret);
  return { id: hex(open.export({ type: "spki", format: "der" })), pem: open.export({ type: "spki", format: "pem" }) as string, secret };
}

const uuid = (name: string) => digest(name).toString("hex").replace(/^(.{8})(.{4}).(.{3}).(.{3})(.{12}).*$/, "$1-$2-4$3-8$4-$5");

export interface Entry {
  body: string;
  key: TestKey;
}

/** Appends as the app does: number, time and prev follow from what is there. */
export class Chain {
  readonly entries: Entry[] = [];

  constructor(readonly id: string) {}

  add(key: TestKey, action: string, subject: { type: string; id: string }, facts: Record<string, unknown>, change: Record<string, unknown> = {}): void {
    const seq = this.entries.length + 1;
    const body = custodyText({
      v: 1, drive: this.id, seq, at: `2026-03-12T09:14:${String(seq % 60).padStart(2, "0")}.000000Z`, app: "1.4.0", actor: { id: uuid("person"), name: "Ada \"Q\" Lund", role: "lead" },
      action, subject, facts, prev: seq === 1 ? ZERO_HASH : hex(this.entries[seq - 2].body), ...change,
    } as Parameters<typeof custodyText>[0]);
    this.entries.push({ body, key });
  }

  get head(): SealLeaf {
    return { drive: this.id, head: hex(this.entries.at(-1)!.body), seq: this.entries.length };
  }

  files(path: string, only: (body: string) => boolean = () => true): [string, Buffer][] {
    const kept = this.entries.filter(({ body }) => only(body));
    return [
      [`${path}.jsonl`, Buffer.from(kept.map(({ body }) => `${body}\n`).join(""))],
      [`${path}.sig`, Buffer.from(kept.map(({ body, key }) => signatureLine(key.id, sign(null, signedBytes(body), key.secret).toString("base64"))).join(""))],
    ];
  }
}

export interface BagOptions {
  drives?: number;
  /** the log key was changed between the drives' first and second half */
  twoKeys?: boolean;
  sealed?: boolean;
  imageBytes?: number;
  /** chains besides those of the bundle, under the seal's root */
  others?: number;
  /** one of the drive, one of a chip with words in its name that a line-by-line reader could trip over, and one of a shelf board */
  photos?: boolean;
  /** changes a drive's chain before the bundle is started */
  onChain?(chain: Chain, drive: number, key: TestKey): void;
  /** the drives' entries are signed by this key whatever the workshop's log says */
  signer?: TestKey;
}

export const REF = "26-0042";
export const FOLDER = `twinread-${REF}`;
export const logKeyA = testKey("log a");
export const logKeyB = testKey("log b");
export const sealKeyA = testKey("seal a");

const image = (seed: string, length: number) => Buffer.from(Array.from({ length }, (_, i) => digest(`${seed} ${i >> 5}`)[i & 31]));

interface CaseDrive {
  chain: Chain;
  record: Record<string, unknown>;
  files: [string, Buffer][];
}

function makeDrive(n: number, options: BagOptions, first: TestKey, later: TestKey): CaseDrive {
  const chain = new Chain(uuid(`drive ${n}`));
  const files: [string, Buffer][] = [];
  const read = (stage: string, number: number, bytes: Buffer) => {
    const id = uuid(`read ${n} ${stage} ${number}`);
    const path = `data/drives/${n}/${stage === "before" ? "original" : "donor-1"}-U12/${stage}-${number}.bin`;
    files.push([path, bytes]);
    chain.add(options.signer ?? first, "read.stored", { type: "read", id }, {
      read: { id, stage, number }, chip: { id: uuid(`chip ${n}`), designator: "U12" }, seating: number, sizeBytes: bytes.length, crc32: "00000000", sha256: hex(bytes), format: "raw",
      fileName: `x "${number}".bin`, note: "says \"prev\":\"1\",\"seq\":7 and ünïcödé",
    });
    return { name: `Read ${number}`, path, id, number, stage, seating: number, sizeBytes: bytes.length, sha256: hex(bytes) };
  };
  chain.add(first, "drive.recorded", { type: "drive", id: chain.id }, { caseRef: REF, letter: "A" });
  const content = image(`image ${n}`, options.imageBytes ?? 64);
  const reads = [read("before", 1, content), read("before", 2, content), read("donor", 1, image(`donor ${n}`, options.imageBytes ?? 64))];
  const approval = uuid(`approval ${n}`);
  const key = options.signer ?? later;
  chain.add(key, "approval.given", { type: "approval", id: approval }, { sha256: hex(content), statement: "Two clean reads." });
  if (options.photos) files.push(...photoFiles(chain, n, key));
  options.onChain?.(chain, n, key);
  chain.add(key, "bundle.started", { type: "bundle", id: uuid("case") }, { caseRef: REF, head: { seq: chain.head.seq, hash: chain.head.head } });
  const { seq, head: hash } = chain.head;
  const record = {
    number: n, letter: "A", id: chain.id, logUpTo: { seq, hash },
    boards: [{ label: "original", chips: [{ designator: "U12", reads, approvals: [{ id: approval, sha256: hex(content), crc32: "00000000", composite: null, revoked: null }] }] }],
  };
  return { chain, record, files };
}

export const PHOTO = image("photo 1 drive", 90);

function photoFiles(chain: Chain, n: number, key: TestKey): [string, Buffer][] {
  const add = (type: string, name: string, file: string, bytes: Buffer, told = true): [string, Buffer] => {
    if (told) chain.add(key, "photo.added", { type: "photo", id: uuid(`photo ${n} ${type}`) }, {
      by: "workshop", caption: 'burnt","of":{"type":"case"},"photo":"0', kind: "photo", mediaType: "image/jpeg", of: { id: uuid(`${type} ${n}`), name, type }, photo: uuid(`photo ${n} ${type}`),
      sha256: hex(bytes), sizeBytes: bytes.length,
    });
    return [`data/drives/${n}/photos/${file}`, bytes];
  };
  // that of the shelf stands in the workshop's log, which no bundle holds
  return [
    add("drive", "the drive", "drive-1.jpg", image(`photo ${n} drive`, 90)), add("chip", 'U12","type":"case"},"photo":"0', "original.U12-1.jpg", image(`photo ${n} chip`, 90)),
    add("shelf-board", "S-1", "donor-1.shelf-1.jpg", image(`photo ${n} shelf`, 90), false),
  ];
}

export function makeBag(options: BagOptions = {}): Bag {
  const later = options.twoKeys ? logKeyB : logKeyA;
  const workshop = new Chain(WORKSHOP_CHAIN);
  const introduce = (key: TestKey, purpose: string, signer: TestKey, reason?: string) =>
    workshop.add(signer, "key.introduced", { type: "key", id: WORKSHOP_CHAIN }, { keyId: key.id, purpose, publicKeyPem: key.pem, ...(reason === undefined ? {} : { reason }) });
  introduce(logKeyA, "log", logKeyA);
  if (options.sealed !== false) introduce(sealKeyA, "seal", logKeyA);
  workshop.add(logKeyA, "policy.changed", { type: "policy", id: WORKSHOP_CHAIN }, { changes: [] });
  if (options.twoKeys) introduce(logKeyB, "log", logKeyA, "The \"data folder\" was on a laptop, \\ that was lost.");
  const drives = Array.from({ length: options.drives ?? 1 }, (_, i) => makeDrive(i + 1, options, logKeyA, later));
  const record = { format: "twinread-case/1", workshop: "Alder Lane", madeAt: "2026-03-12T14:00:00Z", ref: REF, id: uuid("case"), drives: drives.map((one) => one.record) };
  const data: [string, Buffer][] = [
    [CASE_JSON, Buffer.from(`${JSON.stringify(record, null, 2)}\n`)],
    ...drives.flatMap(({ chain, files }, i) => [...chain.files(custodyPath(i + 1)), ...files]),
    ...workshop.files(WORKSHOP_KEYS, (body) => body.startsWith('{"action":"key.introduced"')),
    [LOG_KEY, Buffer.from(later.pem)],
  ];
  if (options.sealed !== false) data.push(...sealFiles([...drives.map(({ chain }) => chain.head), workshop.head, ...Array.from({ length: options.others ?? 4 }, (_, i) => ({ drive: uuid(`other ${i}`), head: hex(`other ${i}`), seq: i + 1 }))], drives.map(({ chain }) => chain.id)));
  return withLists(new Map(data), later);
}

const sha = (bytes: Uint8Array) => digest(bytes);

function sealFiles(heads: SealLeaf[], chains: string[]): [string, Buffer][] {
  const leaves = inLeafOrder(heads);
  const text = Buffer.from(sealText({ number: 7, at: "2026-03-12T14:00:00.000000Z", chains: leaves.length, root: sealRoot(leaves, sha), prev: hex("seal 6") }));
  return [[SEAL_TEXT, text], [SEAL_SIGNATURE, sign(null, text, sealKeyA.secret)], [SEAL_KEY, Buffer.from(sealKeyA.pem)], [SEAL_PROOF, Buffer.from(canonicalJson(sealProof(7, leaves, chains, sha)))]];
}

/** Lists, pages and signature over whatever the payload is now: as a forger would who has `key`. */
export function withLists(payload: Bag, key: TestKey = logKeyA): Bag {
  const data = [...payload].filter(([path]) => path.startsWith("data/"));
  const list = (files: [string, Buffer][]) => Buffer.from([...files].sort(([a], [b]) => (a < b ? -1 : 1)).map(([path, bytes]) => manifestLine(hex(bytes), path)).join(""));
  const tags: [string, Buffer][] = [
    ["bagit.txt", Buffer.from(bagitTxt())],
    ["bag-info.txt", Buffer.from(bagInfoTxt({ date: "2026-03-12", ref: REF, octets: data.reduce((sum, [, bytes]) => sum + bytes.length, 0), files: data.length }))],
    [MANIFEST, list(data)],
    ["README.txt", Buffer.from(readmeTxt({ ref: REF, workshop: "Alder Lane", madeAt: "2026-03-12T14:00:00Z", drives: 1, images: 3, twoPersonRule: true, composites: [], seal: 7 }))],
    ["check.sh", Buffer.from(CHECK_SCRIPT)],
  ];
  const tagList = list(tags);
  return new Map([...tags, [TAG_MANIFEST, tagList], [TAG_SIGNATURE, sign(null, tagList, key.secret)], ...data]);
}
