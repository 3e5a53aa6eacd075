import { custodyPath, driveFolder, VOTES_ENDING } from "../bundle-layout";
import { CHAIN_PROBLEMS } from "../chain-words";
import { checkChain } from "../custody";
import { keyOrder, type Keyring } from "../keyring";
import { FORMAT_ENDING } from "../text-format";
import { countOf } from "../quantity";
import type { Files } from "./lists";
import { readLog } from "./log-lines";
import { erasedIn } from "./erased";
import { comparePhotos } from "./photo-files";
import { entriesText, type Step, StepNotes } from "./report";
import { keyTools, sha256Hex, type VerifyTools } from "./tools";

/** What the log of one drive says, for the parts of the check that compare with it. */
export interface DriveLog {
  drive: number;
  /** the chain's id; "" where no entry gives one */
  chain: string;
  head: { seq: number; hash: string };
  entries: LogEntry[];
  /** digests of the images that it says were erased */
  erased: ReadonlySet<string>;
}

export interface LogEntry {
  seq: number;
  action: string;
  subject: string;
  facts: Record<string, unknown>;
}

/** Drives by the folders they have, in their order. */
export function drivesIn(files: Files): number[] {
  const numbers = new Set<number>();
  for (const path of files.keys()) {
    const found = /^data\/drives\/([1-9]\d{0,4})\//.exec(path);
    if (found) numbers.add(Number(found[1]));
  }
  return [...numbers].sort((a, b) => a - b);
}

export async function checkLog(files: Files, drive: number, ring: Keyring, tools: VerifyTools, onEntry: (n: number) => void): Promise<{ step: Step; log: DriveLog | null }> {
  const notes = new StepNotes(`drive-${drive}`, `Drive ${drive}: the custody log`);
  const path = custodyPath(drive);
  const lines = readLog(files, path, notes);
  if (lines.length === 0) return { step: notes.notChecked("There is no entry to check."), log: null };
  const entries = lines.map((line, i) => entryOf(line.body, i + 1));
  const chain = chainOf(lines[0].body);
  let n = 0;
  const findings = await checkChain(lines, null, {
    sha256: (bytes) => sha256Hex(bytes, tools),
    knows: (keyId) => ring.keys.has(keyId),
    order: keyOrder(ring),
    verify: (keyId, bytes, signature) => {
      onEntry((n += 1));
      return keyTools(tools).verify(ring.keys.get(keyId) ?? "", bytes, signature);
    },
  }, chain);
  const at = (seq: number | null) => `${path}.jsonl, entry ${seq ?? lines.length}`;
  // a missing head is none here: the bundle's own end is looked at below
  for (const { seq, problem, expected, found } of findings) if (problem !== "head") notes.fault(at(seq), CHAIN_PROBLEMS[problem], expected, found);
  if (entries[entries.length - 1].action !== "bundle.started") {
    notes.fault(`${path}.jsonl`, "It does not end with the start of this bundle: its end was cut, or something was added.", "bundle.started", entries[entries.length - 1].action);
  }
  const erased = erasedIn(entries);
  const compared = compareFiles(files, drive, entries, erased, notes);
  const photos = comparePhotos(files, drive, entries, erased, notes);
  const log: DriveLog = { drive, chain, head: { seq: entries[entries.length - 1].seq, hash: sha256Hex(lines[lines.length - 1].body, tools) }, entries, erased };
  return { step: notes.done(`${entriesText(lines.length)}, each following from the one before and each signed; ${countOf(compared, "image file")}${photos > 0 ? ` and ${countOf(photos, "photo")}` : ""}${erased.size > 0 ? `, each as the log names it or erased as it says (${countOf(erased.size, "image")})` : ", each as the log names it"}.`), log };
}

/** Hostile input: what an entry has of its parts. */
function entryOf(body: Uint8Array, n: number): LogEntry {
  const none = { seq: n, action: "none", subject: "", facts: {} };
  try {
    const value = JSON.parse(new TextDecoder().decode(body)) as { seq?: unknown; action?: unknown; subject?: { id?: unknown } | null; facts?: unknown } | null;
    if (value === null || typeof value !== "object") return none;
    return {
      seq: typeof value.seq === "number" ? value.seq : n, action: typeof value.action === "string" ? value.action : "none",
      subject: typeof value.subject?.id === "string" ? value.subject.id : "", facts: typeof value.facts === "object" && value.facts !== null ? (value.facts as Record<string, unknown>) : {},
    };
  } catch {
    return none;
  }
}

function chainOf(body: Uint8Array): string {
  try {
    const { drive } = JSON.parse(new TextDecoder().decode(body)) as { drive?: unknown };
    return typeof drive === "string" ? drive : "";
  } catch {
    return "";
  }
}

interface Told {
  name: string;
  sha256: string;
  seq: number;
}

const text = (value: unknown) => (typeof value === "string" ? value : "");

/** The files that the log says were kept: images, texts as they came, reports of votes. */
function toldFiles(entries: readonly LogEntry[]): Told[] {
  return entries.flatMap(({ seq, action, facts }): Told[] => {
    if (action !== "read.stored" && action !== "composite.made") return [];
    const { stage, number } = (facts.read ?? {}) as { stage?: unknown; number?: unknown };
    const base = `${text(stage)}-${typeof number === "number" ? number : ""}`;
    const told = [{ name: `${base}.bin`, sha256: text(facts.sha256), seq }];
    const { fileSha256 } = (facts.source ?? {}) as { fileSha256?: unknown };
    if (typeof fileSha256 === "string") told.push({ name: `${base}.${FORMAT_ENDING[text(facts.format) as keyof typeof FORMAT_ENDING] ?? "text"}`, sha256: fileSha256, seq });
    if (typeof facts.reportSha256 === "string") told.push({ name: `${base}${VOTES_ENDING}`, sha256: facts.reportSha256, seq });
    return told;
  });
}

/** Files of a chip whose digest stands in the log: the image, the text it came as, the report of a vote. */
const TOLD = /^[^/]+\/[^/]+(\.(bin|hex|srec)|-votes\.json)$/;

/** Each file that the log tells of is there, but for what it says was erased, and each that is there is told of. Gives their number. */
function compareFiles(files: Files, drive: number, entries: readonly LogEntry[], erased: ReadonlySet<string>, notes: StepNotes): number {
  const told = toldFiles(entries);
  const kept = new Map<string, string[]>();
  const folder = `${driveFolder(drive)}/`;
  for (const [path, { sha256 }] of files) {
    const rest = path.startsWith(folder) ? path.slice(folder.length) : "";
    if (!TOLD.test(rest)) continue;
    const key = `${sha256} ${rest.split("/").at(-1) ?? ""}`;
    kept.set(key, [...(kept.get(key) ?? []), path]);
  }
  for (const { name, sha256, seq } of told) {
    const here = kept.get(`${sha256} ${name}`);
    if (!here?.length && erased.has(sha256)) continue;
    if (!here?.length) notes.fault(`${custodyPath(drive)}.jsonl, entry ${seq}`, `It names ${name}, and the bundle does not hold it with this digest.`, sha256);
    else here.pop();
  }
  for (const paths of kept.values()) for (const path of paths) notes.fault(path, "The drive's custody log does not name this file.", undefined, files.get(path)?.sha256);
  return told.length;
}
