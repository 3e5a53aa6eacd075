import { execFile } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { promisify } from "node:util";
import { plainTools } from "@/lib/core/verify/tools";
import { verifyBundle } from "@/lib/core/verify/verify-bundle";
import { openBundle } from "@/scripts/check/bundle-source";
import { asAdmin, withoutTriggers } from "@/tests/support/tamper";
import type { Cell } from "./cells";
import { logOperations } from "./operations";
import { recordOperations } from "./record-operations";
import { rewritingCells } from "./rewriting-cells";
import { bytesOf, dropDump, dump, putBack, type Scene } from "./scene";

export interface BundleAgreement {
  name: string;
  page: "in order" | "not in order" | "not made";
  script: "in order" | "not in order" | "could not check" | "not made";
  first: string;
}

type Tried = Pick<Cell, "name" | "row" | "run">;

/** Attacks that alter what a bundle of drive A's case holds. */
export function bundleAttacks(): Tried[] {
  const log = logOperations().filter(({ name }) => /^(change (body|signature|key_id|prev)|delete$|swap|duplicate|body and hash|append a forged entry|append a forged log key|replace the public key)/.test(name));
  const record = recordOperations().filter(({ name }) => /^(approval: (of another image|given by another|revoked without)|read: (another image|another seating)|transfer: by another)/.test(name));
  const strong = rewritingCells().filter(({ name, attacker }) => attacker === "A4" && /^(change an entry|cut the tail, head turned back: (one|half|all but))/.test(name));
  return [...log, ...record, ...strong];
}

const run = promisify(execFile);

async function byScript(zip: string, folder: string): Promise<BundleAgreement["script"]> {
  await run("unzip", ["-qq", "-o", zip, "-d", folder]);
  const [name] = (await run("ls", [folder])).stdout.trim().split("\n");
  const code = await run("sh", [path.join(folder, name, "check.sh")]).then(() => 0, (error: { code?: unknown }) => error.code);
  return code === 0 ? "in order" : code === 1 ? "not in order" : "could not check";
}

async function judge(name: string, zip: Buffer): Promise<BundleAgreement> {
  const folder = mkdtempSync(path.join(os.tmpdir(), "twinread-agree-"));
  const file = path.join(folder, "case.zip");
  writeFileSync(file, zip);
  const { close, ...bundle } = await openBundle(file);
  try {
    const report = await verifyBundle({ ...bundle, tools: plainTools });
    const fault = report.steps.flatMap((step) => step.faults)[0];
    return { name, page: report.verdict === "in-order" ? "in order" : "not in order", script: await byScript(file, path.join(folder, "out")), first: fault ? `${fault.place}: ${fault.sentence}` : "" };
  } finally {
    await close();
    rmSync(folder, { recursive: true });
  }
}

/** Carries out each attack, has the app make a bundle of what is there, and asks both checks. Everything is put back from a dump. */
export async function compareChecks(scene: Scene, attacks: readonly Tried[]): Promise<BundleAgreement[]> {
  const agreements: BundleAgreement[] = [];
  await asAdmin((db) => dump(db, "bundle"));
  try {
    for (const attack of [{ name: "nothing done", row: "" as const, run: () => Promise.resolve() }, ...attacks]) {
      const name = `${attack.name}${attack.row ? ` (${attack.row})` : ""}`;
      try {
        await withoutTriggers(["custody_entries", "custody_heads", "seals"], async (db) => {
          await attack.run(db, scene);
        });
        const zip = await bytesOf(scene.a).catch((error: Error) => error);
        agreements.push(zip instanceof Error ? { name, page: "not made", script: "not made", first: zip.message } : await judge(name, zip));
      } finally {
        await withoutTriggers(["custody_entries", "custody_heads", "seals"], (db) => putBack(db, "bundle"));
      }
    }
    return agreements;
  } finally {
    await asAdmin((db) => dropDump(db, "bundle"));
  }
}
