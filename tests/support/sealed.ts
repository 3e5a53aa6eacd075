import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { createBenchToken } from "@/lib/commands/create-bench-token";
import type { Actor } from "@/lib/core/words";
import { Seal } from "@/models";

/** What an auditor does with three files and nothing of ours: Debian's openssl. */
export function opensslAccepts(text: string | Buffer, signature: Buffer, keyPem: string): boolean {
  const dir = mkdtempSync(path.join(os.tmpdir(), "twinread-seal-"));
  try {
    writeFileSync(path.join(dir, "seal.txt"), text);
    writeFileSync(path.join(dir, "seal.sig"), signature);
    writeFileSync(path.join(dir, "seal-key.pem"), keyPem);
    const { status, stdout } = spawnSync("openssl", ["pkeyutl", "-verify", "-pubin", "-inkey", "seal-key.pem", "-rawin", "-in", "seal.txt", "-sigfile", "seal.sig"], { cwd: dir, encoding: "utf8" });
    return status === 0 && stdout.includes("Verified Successfully");
  } finally {
    rmSync(dir, { recursive: true });
  }
}

export const lastSealRow = async () => (await Seal.findOne({ order: [["number", "DESC"]] }))!;

type Route = (request: Request, context: { params: Promise<Record<string, string>> }) => Promise<Response>;

/** Calls a route as a bench script would, with a token of this person. */
export async function callAs(actor: Actor, route: Route, address: string, { params = {}, body, key }: { params?: Record<string, string>; body?: object; key?: string } = {}): Promise<Response> {
  const { token } = await createBenchToken(actor, { name: "Seals", userId: actor.id });
  const headers: Record<string, string> = { authorization: `Bearer ${token}`, ...(key ? { "idempotency-key": key } : {}), ...(body ? { "content-type": "application/json" } : {}) };
  const method = body || key ? "POST" : "GET";
  return route(new Request(`http://127.0.0.1${address}`, { method, headers, ...(body ? { body: JSON.stringify(body) } : {}) }), { params: Promise.resolve(params) });
}
