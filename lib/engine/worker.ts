import { createHash } from "node:crypto";
import { open } from "node:fs/promises";
import { type Comparison, compareImages } from "../core/compare";
import { type CompositeSource, compositeReport, makeComposite } from "../core/composite";
import { compositeFindings } from "../core/composite-findings";
import { CompositeRefusal } from "../core/composite-rules";
import { type Cause, causeOfPair } from "../core/diagnose-pair";
import { diagnoseReadBack, type ReadBackDiagnosis } from "../core/diagnose-read-back";
import { type Likeness, likenessOf } from "../core/family";
import { type ImageFacts, inspectWhole } from "../core/inspect";
import { FormatError, fromImage, type ImageWindow, toImage } from "../core/text-format";
import type { DerivedFacts } from "../core/derived";
import { gunzips } from "./gunzips";
import type { Format } from "../core/words";

/**
 * The heavy rules in a thread of their own: they get names of stored files and give back plain facts or bytes. Bundled
 * to plain JavaScript by the build (dist/engine-worker.mjs).
 */
export interface Tasks {
  inspect: { input: { file: string }; output: ImageFacts };
  compare: { input: { fileA: string; fileB: string; chipBytes: number }; output: Compared };
  likeness: { input: { file: string; others: string[] }; output: (Likeness | null)[] };
  readBack: { input: { approved: string; old: string | null; readBack: string; comparison: Comparison }; output: ReadBackDiagnosis };
  expand: { input: { file: string; format: Format; window: ImageWindow }; output: { bytes: Uint8Array } | { refused: string } };
  encode: { input: { file: string; format: Format; base: number }; output: Uint8Array };
  vote: { input: { sources: (Omit<CompositeSource, "bytes"> & { file: string; number: number })[] }; output: VoteResult };
}

/** Byte by byte from A to B, and one primary cause of the difference. */
export type Compared = Comparison & { cause: Cause };

export type VoteResult =
  | { refused: string }
  | { bytes: Uint8Array; derived: Omit<DerivedFacts, "reportSha256">; report: string };

// Files are read into the same few buffers again and again: left to the garbage collector, images of 64 MiB pile up.
const slots: Uint8Array<ArrayBuffer>[] = [];
const KEPT_SLOTS = 3;

async function bytesOf(path: string, slot = 0): Promise<Uint8Array<ArrayBuffer>> {
  const file = await open(path, "r");
  try {
    const { size } = await file.stat();
    if (!slots[slot] || slots[slot].length < size) slots[slot] = new Uint8Array(size);
    for (let at = 0; at < size; ) {
      const { bytesRead } = await file.read(slots[slot], at, size - at, at);
      if (bytesRead === 0) throw new Error(`${path} ended early`);
      at += bytesRead;
    }
    return slots[slot].subarray(0, size);
  } finally {
    await file.close();
  }
}

// what this thread has just inspected is often compared next
const seen = new Map<string, ImageFacts>();
const KEPT = 32;

async function factsOf(file: string, bytes: Uint8Array): Promise<ImageFacts> {
  const facts = seen.get(file) ?? inspectWhole(bytes, await gunzips(bytes));
  seen.set(file, facts);
  if (seen.size > KEPT) seen.delete(seen.keys().next().value!);
  return facts;
}

export async function inspect({ file }: Tasks["inspect"]["input"]): Promise<ImageFacts> {
  return factsOf(file, await bytesOf(file));
}

export async function compare({ fileA, fileB, chipBytes }: Tasks["compare"]["input"]): Promise<Compared> {
  const [a, b] = await Promise.all([bytesOf(fileA), bytesOf(fileB, 1)]);
  const comparison = compareImages(a, b);
  const cause = causeOfPair(a, b, await factsOf(fileA, a), await factsOf(fileB, b), chipBytes, comparison);
  return { ...comparison, cause };
}

/** One image against others of its size; null for one that is gone. */
export async function likeness({ file, others }: Tasks["likeness"]["input"]): Promise<Tasks["likeness"]["output"]> {
  const bytes = await bytesIfStored(file, 0);
  const found: Tasks["likeness"]["output"] = [];
  for (const other of others) {
    const there = bytes && (await bytesIfStored(other, 1));
    found.push(bytes && there && there.length === bytes.length ? likenessOf(bytes, there) : null);
  }
  return found;
}

async function bytesIfStored(path: string, slot: number): Promise<Uint8Array | null> {
  return bytesOf(path, slot).catch((error: NodeJS.ErrnoException) => {
    if (error.code === "ENOENT") return null;
    throw error;
  });
}

export async function readBack({ approved, old, readBack: back, comparison }: Tasks["readBack"]["input"]): Promise<ReadBackDiagnosis> {
  const [a, r, o] = await Promise.all([bytesOf(approved), bytesOf(back, 1), old ? bytesOf(old, 2).catch(() => null) : null]);
  return diagnoseReadBack(r, a, o, { readBack: await factsOf(back, r), approved: await factsOf(approved, a), comparison });
}

export async function expand({ file, format, window }: Tasks["expand"]["input"]): Promise<Tasks["expand"]["output"]> {
  try {
    return { bytes: toImage(format, await bytesOf(file), window).bytes };
  } catch (error) {
    if (error instanceof FormatError) return { refused: error.message };
    throw error;
  }
}

export async function encode({ file, format, base }: Tasks["encode"]["input"]): Promise<Uint8Array> {
  return fromImage(format, await bytesOf(file), { base });
}

/** The vote, with the digest of its image worked out here so that the report can name it. */
export async function vote({ sources }: Tasks["vote"]["input"]): Promise<VoteResult> {
  try {
    const loaded = await Promise.all(sources.map(async ({ file, ...source }, i) => ({ ...source, bytes: await bytesOf(file, i) })));
    const composite = makeComposite(loaded);
    const sha256 = createHash("sha256").update(composite.bytes).digest("hex");
    return {
      bytes: composite.bytes, report: compositeReport(composite, sha256),
      derived: {
        method: composite.method, version: composite.version, disputedBytes: composite.disputedBytes, counts: composite.counts, limit: composite.limit,
        voters: composite.sources.map(({ number, seating, sha256: digest }) => ({ number: number ?? 0, seating, sha256: digest })),
        excluded: composite.excluded.map(({ number, cause }) => ({ number: number ?? 0, cause })),
        odds: { bitErrorRate: composite.odds.bitErrorRate, expectedWrongBitsByMargin: composite.odds.expectedWrongBitsByMargin, leastSureByte: composite.odds.leastSureByte },
        findings: compositeFindings(composite) as DerivedFacts["findings"],
      },
    };
  } catch (error) {
    if (error instanceof CompositeRefusal) return { refused: error.message };
    throw error;
  } finally {
    slots.length = Math.min(slots.length, KEPT_SLOTS);
  }
}
