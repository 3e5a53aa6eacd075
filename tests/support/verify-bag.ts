import { createHash } from "node:crypto";
import { chmodSync, mkdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { spawnSync } from "node:child_process";
import { Uint8ArrayReader } from "@zip.js/zip.js/lib/zip-core-custom.js";
import { openArchive } from "@/lib/core/verify/archive";
import type { BagEntry } from "@/lib/core/verify/bag";
import type { VerifyReport } from "@/lib/core/verify/report";
import { plainTools, type VerifyTools } from "@/lib/core/verify/tools";
import { verifyBundle } from "@/lib/core/verify/verify-bundle";
import { type Bag, FOLDER } from "./make-bag";

async function* once(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}

export const entriesOf = (bag: Bag): BagEntry[] =>
  [...bag].map(([name, bytes]) => ({ path: `${FOLDER}/${name}`, sizeBytes: bytes.length, kind: "file", open: () => once(bytes) }));

/** Signatures are looked at once for each key, text and signature: a sweep repeats them thousands of times. */
export function rememberingTools(): VerifyTools {
  const known = new Map<string, boolean>();
  return {
    createSha256: () => createHash("sha256"),
    verifyEd25519(publicKey, message, signature) {
      const name = createHash("sha256").update(publicKey).update(createHash("sha256").update(message).digest()).update(signature).digest("hex");
      const answer = known.get(name) ?? plainTools.verifyEd25519(publicKey, message, signature);
      known.set(name, answer);
      return answer;
    },
  };
}

export const verifyBag = (bag: Bag, expectedKey: string | null = null, tools: VerifyTools = plainTools): Promise<VerifyReport> =>
  verifyBundle({ entries: entriesOf(bag), source: "folder", tools, expectedKey });

export async function verifyZip(zip: Uint8Array, tools: VerifyTools = plainTools, expectedKey: string | null = null): Promise<VerifyReport> {
  const { entries, faults } = await openArchive(new Uint8ArrayReader(zip));
  return verifyBundle({ entries, archiveFaults: faults, source: "archive", tools, expectedKey });
}

export function writeBag(bag: Bag, folder: string): void {
  for (const [name, bytes] of bag) {
    mkdirSync(path.join(folder, path.dirname(name)), { recursive: true });
    writeFileSync(path.join(folder, name), bytes);
  }
  chmodSync(path.join(folder, "check.sh"), 0o755);
}

export function runCheckScript(folder: string, ...words: string[]): { status: number | null; text: string } {
  const { status, stdout, stderr } = spawnSync("sh", [path.join(folder, "check.sh"), ...words], { encoding: "utf8" });
  return { status, text: stdout + stderr };
}

export const stateOfStep = (report: VerifyReport, key: string) => report.steps.find((step) => step.key === key)?.state;
export const faultsOf = (report: VerifyReport) => report.steps.flatMap((step) => step.faults.map((fault) => `${fault.place}: ${fault.sentence}`));
