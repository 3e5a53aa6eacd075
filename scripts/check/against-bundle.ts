import { createHash } from "node:crypto";
import { custodyPath, LOG_KEY, MANIFEST, SEAL_SIGNATURE, SEAL_TEXT, WORKSHOP_KEYS } from "@/lib/core/bundle-layout";
import { drivesIn } from "@/lib/core/verify/log";
import { readLog } from "@/lib/core/verify/log-lines";
import { keyTools, plainTools, type VerifyTools } from "@/lib/core/verify/tools";
import { layOut } from "@/lib/core/verify/bag";
import { type ReadFile, readFiles, textOf } from "@/lib/core/verify/read-files";
import { StepNotes } from "@/lib/core/verify/report";
import { verifyBundle } from "@/lib/core/verify/verify-bundle";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { openBundle } from "./bundle-source";
import { endOf } from "./ledger";
import { judgeOutsideSeal, outsideSeal, sealSentence, type SealsHere } from "./outside-seal";
import type { Damage, OutsideCopy } from "./report";

/** What an outside file is held against. */
export interface Here extends SealsHere {
  /** SHA-256 of every image that the database knows */
  images: ReadonlySet<string>;
}

const tools: VerifyTools = { ...plainTools, createSha256: () => createHash("sha256") };
const COMPARED = /\.(jsonl|sig|txt|pem)$/;
const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

/** A case bundle: sound in itself, and each log in it the beginning of the log here. Throws NotVerified where nothing can be read. */
export async function againstBundle(file: string, here: Here): Promise<{ copy: OutsideCopy; damage: Damage[] }> {
  const { close, ...bundle } = await openBundle(file);
  try {
    const copy: OutsideCopy = { file, kind: "bundle", holds: [], seals: [], heads: [], agrees: true };
    const damage: Damage[] = [];
    const report = await verifyBundle({ ...bundle, tools });
    copy.holds.push(`Case bundle${report.facts.caseRef ? ` of ${report.facts.caseRef}` : ""}. ${report.sentence}`);
    if (report.verdict !== "in-order") damage.push(plain(file, "The bundle itself", "outside-file", "It is not in order, so it proves less than a sound one: check it with npm run check:bundle."));
    // images were read for the bundle's own check; only what is compared is read again
    const small = [...layOut(bundle.entries, new StepNotes("again", "")).files].filter(([path]) => COMPARED.test(path));
    const files = await readFiles(new Map(small), tools, new StepNotes("again", ""), () => {}, undefined);
    damage.push(...compareKey(file, files, here), ...compareSeal(file, files, here, copy), ...compareLogs(file, files, here, copy), ...compareImages(file, files, here, copy));
    return { copy, damage };
  } finally {
    await close();
  }
}

const plain = (file: string, place: string, problem: Damage["problem"], sentence: string, expected?: string, found?: string): Damage =>
  ({ place, seq: null, problem, sentence, chain: null, sha256: null, reads: [], expected, found, file });

type Files = Map<string, ReadFile>;

function compareKey(file: string, files: Files, { ledger }: Here): Damage[] {
  const pem = textOf(files, LOG_KEY);
  const keyId = pem === null ? null : keyTools(tools).keyId(pem);
  if (keyId === null || ledger.ring.keys.has(keyId)) return [];
  return [plain(file, "The log key", "outside-key", "The bundle's log key is not among those that the workshop's log introduces: it was made by somebody else, or the database was replaced or put back to before a change of key.", [...ledger.ring.keys.keys()].at(-1), keyId)];
}

function compareSeal(file: string, files: Files, here: Here, copy: OutsideCopy): Damage[] {
  const text = textOf(files, SEAL_TEXT);
  const seal = text === null ? null : outsideSeal(text, files.get(SEAL_SIGNATURE)?.bytes ?? null);
  if (!seal) return [];
  const judged = judgeOutsideSeal(seal, here, file);
  copy.seals.push(judged.copy);
  copy.holds.push(sealSentence(judged.copy));
  return judged.damage;
}

function compareLogs(file: string, files: Files, here: Here, copy: OutsideCopy): Damage[] {
  const paths = [...drivesIn(files).map(custodyPath), WORKSHOP_KEYS];
  return paths.flatMap((path): Damage[] => {
    if (!files.get(`${path}.jsonl`)?.bytes) return [];
    const lines = readLog(files, path, new StepNotes("again", "")).map(({ body }) => ({ ...placeIn(body), hash: sha256(body) }));
    const last = lines.at(-1);
    if (last && path !== WORKSHOP_KEYS) {
      copy.heads.push({ chain: last.chain, place: here.ledger.place(last.chain), seq: last.seq, hash: last.hash });
      copy.holds.push(`${here.ledger.place(last.chain)}: ${lines.length} entries, the last with SHA-256 ${last.hash}.`);
    }
    return firstDifference(file, lines, here);
  });
}

/** Hostile input: the place that an entry gives itself. */
function placeIn(body: Uint8Array): { chain: string; seq: number } {
  try {
    const { drive, seq } = JSON.parse(new TextDecoder().decode(body)) as { drive?: unknown; seq?: unknown };
    return { chain: typeof drive === "string" ? drive : "", seq: typeof seq === "number" ? seq : 0 };
  } catch {
    return { chain: "", seq: 0 };
  }
}

/** Of one log only the first: what comes after it differs for that reason alone. */
function firstDifference(file: string, lines: { chain: string; seq: number; hash: string }[], { ledger }: Here): Damage[] {
  for (const { chain, seq, hash } of lines) {
    const ours = ledger.entries.get(chain)?.get(seq);
    if (ours === hash) continue;
    const common = { place: ledger.place(chain), seq, chain, sha256: null, reads: [], file, expected: hash };
    if (ours !== undefined) return [{ ...common, problem: "outside-entry", sentence: `Entry ${seq} here is another one than the bundle holds.`, found: ours }];
    const end = endOf(ledger, chain);
    const why = end > 0 ? `the log here ends at entry ${end}` : "there is no such log here";
    const gone = chain === WORKSHOP_CHAIN && end >= seq ? "it was removed" : "the database was put back to an earlier state, or the log was cut";
    return [{ ...common, problem: "outside-entry-missing", sentence: `The bundle holds it, and ${why}: ${gone}.` }];
  }
  return [];
}

const IMAGE = /^([0-9a-f]{64}) {2}(data\/drives\/[1-9]\d*\/[^/]+\/[^/]+\.bin)$/;

function compareImages(file: string, files: Files, here: Here, copy: OutsideCopy): Damage[] {
  const images = (textOf(files, MANIFEST) ?? "").split("\n").flatMap((line) => {
    const found = IMAGE.exec(line);
    return found ? [{ sha256: found[1], path: found[2] }] : [];
  });
  copy.holds.push(`${images.length} ${images.length === 1 ? "image" : "images"}.`);
  return images.filter((image) => !here.images.has(image.sha256)).map((image): Damage => ({
    ...plain(file, image.path, "outside-image", "The bundle holds this image, and the database knows none with its digest: it was removed or replaced.", image.sha256), sha256: image.sha256,
  }));
}

