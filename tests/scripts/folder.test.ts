import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { createPrivateKey, createPublicKey } from "node:crypto";
import os from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { prepareFolder } from "@/scripts/start/folder.mjs";

let dataDir: string;
beforeEach(() => {
  dataDir = mkdtempSync(path.join(os.tmpdir(), "twinread-folder-"));
});
afterEach(() => rmSync(dataDir, { recursive: true }));

const mode = (name: string) => statSync(path.join(dataDir, name)).mode & 0o777;
const content = (name: string) => readFileSync(path.join(dataDir, name), "utf8");

describe("the data folder", () => {
  it("is closed to others, and so are its secrets and keys", () => {
    chmodSync(dataDir, 0o755);
    prepareFolder(dataDir, "demo");
    expect(mode(".")).toBe(0o700);
    const files = ["secrets", "keys"].flatMap((folder) => readdirSync(path.join(dataDir, folder)).map((name) => `${folder}/${name}`));
    expect(files.sort()).toEqual([
      "keys/log-key.pem", "keys/log-key.pub.pem", "keys/seal-key.pem", "keys/seal-key.pub.pem", "secrets/db-admin-password", "secrets/db-app-password", "secrets/outbox-key", "secrets/session-secret",
    ]);
    for (const file of files) expect([file, mode(file)]).toEqual([file, 0o600]);
  });

  it("keeps its secrets from one start to the next", () => {
    prepareFolder(dataDir, "live");
    const before = ["secrets/session-secret", "secrets/outbox-key", "keys/log-key.pem"].map(content);
    prepareFolder(dataDir, "live");
    expect(["secrets/session-secret", "secrets/outbox-key", "keys/log-key.pem"].map(content)).toEqual(before);
  });

  it("gets two Ed25519 keys, one for the log and one for seals, whose public halves fit", () => {
    prepareFolder(dataDir, "demo");
    for (const use of ["log", "seal"]) {
      const secret = createPrivateKey(content(`keys/${use}-key.pem`));
      expect(secret.asymmetricKeyType).toBe("ed25519");
      expect(createPublicKey(secret).export({ type: "spki", format: "pem" })).toBe(content(`keys/${use}-key.pub.pem`));
    }
    expect(content("keys/seal-key.pem")).not.toBe(content("keys/log-key.pem"));
    expect(Buffer.from(content("secrets/outbox-key").trim(), "hex")).toHaveLength(32);
  });

  it("of an older version gets a seal key and keeps its log key", () => {
    prepareFolder(dataDir, "live");
    const log = content("keys/log-key.pem");
    for (const name of ["seal-key.pem", "seal-key.pub.pem"]) rmSync(path.join(dataDir, "keys", name));
    prepareFolder(dataDir, "live");
    expect([mode("keys/seal-key.pem"), content("keys/log-key.pem")]).toEqual([0o600, log]);
  });

  it("never mixes demo data and real work", () => {
    prepareFolder(dataDir, "demo");
    expect(() => prepareFolder(dataDir, "live")).toThrow(/holds demo data/);
    rmSync(path.join(dataDir, "kind"));
    expect(() => prepareFolder(dataDir, "live")).toThrow(/not made by Twinread/);
  });

  it("does not take a folder that belongs to something else", () => {
    writeFileSync(path.join(dataDir, "letter.txt"), "mine");
    expect(() => prepareFolder(dataDir, "demo")).toThrow(/not empty and was not made by Twinread/);
    expect(content("letter.txt")).toBe("mine");
  });

  it("refuses a secret that others could read", () => {
    prepareFolder(dataDir, "demo");
    chmodSync(path.join(dataDir, "secrets/session-secret"), 0o644);
    expect(() => prepareFolder(dataDir, "demo")).toThrow(/can be read by others/);
  });

  it("does not make a new key where one is half missing", () => {
    prepareFolder(dataDir, "live");
    rmSync(path.join(dataDir, "keys/log-key.pub.pem"));
    expect(() => prepareFolder(dataDir, "live")).toThrow(/Bring the folder keys back from your backup/);
  });
});
