import { execFile, spawnSync } from "node:child_process";
import { createHash, randomUUID } from "node:crypto";
import { chmodSync, cpSync, createWriteStream, existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { pipeline } from "node:stream/promises";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { POST } from "@/app/api/cases/[id]/bundle/route";
import { approveImage } from "@/lib/commands/approve-image";
import { startBundle } from "@/lib/commands/bundle-plan";
import { changeKey } from "@/lib/commands/change-key";
import { createBenchToken } from "@/lib/commands/create-bench-token";
import { createCase } from "@/lib/commands/create-case";
import { makeBundle, writeBundle } from "@/lib/commands/make-bundle";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { canonicalJson } from "@/lib/core/canonical";
import { parseSeal, proofHolds, type SealProof } from "@/lib/core/seal";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { chipView } from "@/lib/queries/chip-view";
import { chainEntries, checkCustody } from "@/lib/queries/custody";
import { logKey } from "@/storage";
import { type MadeChip, makeChip, makeReady, makeUser, sha256, store, firmware } from "../support/factory";
import { opensslAccepts } from "../support/sealed";

const run = promisify(execFile);
const work = mkdtempSync(path.join(os.tmpdir(), "twinread-bundle-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

let technician: Actor;
let lead: Actor;
let chip: MadeChip;
let bag = "";
let zip = "";
// of this run alone: equal images on two drives would be a finding
const seed = randomUUID();
const image = firmware(`bundle-image ${seed}`, 8192);
const donorImage = firmware(`donor-image ${seed}`, 8192);

async function pack(name: string): Promise<string> {
  const { stream: bytes } = await makeBundle(lead, chip.caseId);
  const file = path.join(work, `${name}.zip`);
  await pipeline(bytes, createWriteStream(file));
  return file;
}

async function unpack(file: string): Promise<string> {
  const dir = mkdtempSync(path.join(work, "bag-"));
  await run("unzip", ["-q", file, "-d", dir]);
  return path.join(dir, `twinread-${chip.ref}`);
}

const check = (dir: string, ...words: string[]) => {
  const { status, stdout, stderr } = spawnSync("sh", [path.join(dir, "check.sh"), ...words], { encoding: "utf8" });
  return { status, text: stdout + stderr };
};

function copy(): string {
  const dir = mkdtempSync(path.join(work, "copy-"));
  cpSync(bag, dir, { recursive: true });
  return dir;
}

const filesOf = (dir: string) => readdirSync(dir, { recursive: true, encoding: "utf8" }).filter((name) => statSync(path.join(dir, name)).isFile()).sort();
const digest = (file: string) => createHash("sha256").update(readFileSync(file)).digest("hex");

/** What a forger without the key would do: bring the lists in line with the changed files. */
function relist(dir: string): void {
  const all = filesOf(dir);
  const lines = (names: string[]) => names.map((name) => `${digest(path.join(dir, name))}  ${name}\n`).join("");
  writeFileSync(path.join(dir, "manifest-sha256.txt"), lines(all.filter((name) => name.startsWith("data/"))));
  writeFileSync(path.join(dir, "tagmanifest-sha256.txt"), lines(all.filter((name) => !name.startsWith("data/") && !name.startsWith("tagmanifest"))));
}

beforeAll(async () => {
  technician = await makeUser("technician");
  lead = await makeUser("lead");
  chip = await makeChip(technician);
  await recordDrive(technician, chip.caseId, { partNumber: "PN 4471-0093-C", serial: `SECOND-${Date.now()}` });
  await makeReady(technician, chip, image, donorImage);
  await store(technician, chip.chipId, "before", firmware(`odd one ${seed}`, 8192), 2, { note: 'Says "sha256":"00", {"prev":1} and ünïcödé ǁ' }, "../../x \"q\".bin");
  const odd = (await chipView(lead, chip.chipId)).reads.find((r) => r.stage === "before" && r.number === 4)!;
  await setReadAside(lead, odd.id, { reason: "Slipped clip" });
  const approval = await approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] });
  await recordTransfer(technician, approval.id, { kind: "write", donorChipId: chip.donorChipId });
  for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
  zip = await pack("first");
  bag = await unpack(zip);
});

describe("a case bundle", () => {
  it("opens with unzip, passes sha256sum and its own check", async () => {
    await run("unzip", ["-tq", zip]);
    for (const list of ["manifest-sha256.txt", "tagmanifest-sha256.txt"]) await run("sha256sum", ["-c", "--strict", "--quiet", list], { cwd: bag });
    const plain = check(bag);
    expect(plain.text).toContain("keys not compared");
    expect(plain).toMatchObject({ status: 0 });
    const compared = check(bag, logKey().keyId.toUpperCase());
    expect(compared.text).toContain("the fingerprint that you gave");
    expect(compared.status).toBe(0);
  });

  it("holds every image under a name of ours and the uploader's name as data", () => {
    const names = filesOf(bag);
    for (const [name, bytes] of [["data/drives/1/original-U12/before-1.bin", image], ["data/drives/1/donor-1-U12/after-2.bin", image], ["data/drives/1/donor-1-U12/donor-1.bin", donorImage]] as const) {
      expect(readFileSync(path.join(bag, name)).equals(bytes)).toBe(true);
    }
    expect(names.every((name) => /^[A-Za-z0-9._/-]+$/.test(name) && !name.includes(".."))).toBe(true);
    const record = JSON.parse(readFileSync(path.join(bag, "data/case.json"), "utf8")) as { customer: { name: string }; drives: { boards: { label: string; chips: { reads: { originalFileName: string }[]; approvals: unknown[]; transfers: unknown[] }[] }[] }[] };
    const original = record.drives[0].boards[0].chips[0];
    expect(record.customer.name).toBe("Lindmoor Veterinary Practice");
    expect(record.drives).toHaveLength(2);
    expect(original.reads[3].originalFileName).toContain("x \"q\".bin");
    expect([original.approvals.length, original.transfers.length]).toEqual([1, 1]);
    expect(filesOf(bag).filter((name) => /photos/.test(name))).toEqual([]);
  });

  it("holds the seal over the last line of each log in it, which openssl and the proof confirm", async () => {
    const [text, sig, pem] = ["seal.txt", "seal.sig", "seal-key.pem"].map((name) => readFileSync(path.join(bag, "data/seal", name)));
    expect(opensslAccepts(text, sig, pem.toString())).toBe(true);
    const seal = parseSeal(text.toString())!;
    const source = readFileSync(path.join(bag, "data/seal/proof.json"), "utf8");
    const proof = JSON.parse(source) as SealProof;
    expect(canonicalJson(proof)).toBe(source);
    expect(proof).toMatchObject({ format: "twinread-proof/1", seal: seal.number, chains: seal.chains });
    expect(proof.proofs).toHaveLength(2);
    proof.proofs.forEach((one, i) => {
      const lines = readFileSync(path.join(bag, `data/drives/${i + 1}/custody.jsonl`), "utf8").trimEnd().split("\n");
      expect([one.seq, one.head]).toEqual([lines.length, sha256(Buffer.from(lines.at(-1)!))]);
      expect(proofHolds(seal, one, (bytes) => createHash("sha256").update(bytes).digest())).toBe(true);
    });
    const keys = readFileSync(path.join(bag, "data/workshop-keys.jsonl"), "utf8").trimEnd().split("\n").map((line) => (JSON.parse(line) as { facts: { purpose: string; publicKeyPem: string } }).facts);
    expect(keys.filter((key) => key.purpose === "seal").map((key) => key.publicKeyPem)).toContain(pem.toString());
    expect(readFileSync(path.join(bag, "README.txt"), "utf8")).toContain(`seal ${seal.number} and its signature`);
  });

  it("made after both keys were changed with a reason passes its own check, and says when a key is another", async () => {
    const admin = await makeUser("admin");
    const plan = await startBundle(lead, chip.caseId);
    for (const purpose of ["log", "seal"] as const) await changeKey(admin, { purpose, reason: 'Says {"purpose":"log"} and "keyId":"00"' });
    // the former key can sign no more: nothing goes out with one that its own key entries don't name
    await expect(writeBundle(lead, plan)).rejects.toMatchObject({ code: "rule-against" });
    const dir = await unpack(await pack("new-keys"));
    const { status, text } = check(dir, logKey().keyId);
    expect(text).not.toContain("NOT IN ORDER");
    expect(status).toBe(0);
    expect(check(bag, logKey().keyId).status).toBe(1);
  });

  it("is written down in each drive's log before and after", async () => {
    const entries = await chainEntries(chip.driveId);
    const mine = entries.filter((e) => e.action.startsWith("bundle."));
    expect(mine.slice(0, 2).map((e) => e.action)).toEqual(["bundle.started", "bundle.completed"]);
    const lines = readFileSync(path.join(bag, "data/drives/1/custody.jsonl"), "utf8").trimEnd().split("\n");
    expect(lines.at(-1)).toBe(mine[0].body);
    const { facts } = JSON.parse(mine[1].body) as { facts: { tagManifestSha256: string; upToSeq: number } };
    expect(facts).toMatchObject({ tagManifestSha256: digest(path.join(bag, "tagmanifest-sha256.txt")), upToSeq: lines.length });
    expect((await checkCustody(chip.driveId)).findings).toEqual([]);
  });

  it("gives the same bytes for the same heads, and a later one continues the earlier log", async () => {
    const plan = await startBundle(lead, chip.caseId);
    const twice = await Promise.all(["a", "b"].map(async (name) => {
      const file = path.join(work, `${name}.zip`);
      await pipeline((await writeBundle(lead, plan)).stream, createWriteStream(file));
      return digest(file);
    }));
    expect(twice[0]).toBe(twice[1]);
    const later = await unpack(await pack("later"));
    const log = "data/drives/1/custody.jsonl";
    expect(readFileSync(path.join(later, log), "utf8").startsWith(readFileSync(path.join(bag, log), "utf8"))).toBe(true);
    const images = (dir: string) => readFileSync(path.join(dir, "manifest-sha256.txt"), "utf8").split("\n").filter((line) => line.endsWith(".bin"));
    expect(images(later)).toEqual(images(bag));
  });

  it("comes from its route as a file with our name, sent to a bench token's owner", async () => {
    const { token } = await createBenchToken(lead, { name: "Bench 3", userId: lead.id });
    const call = (id: string) => POST(new Request(`http://127.0.0.1/api/cases/${id}/bundle`, { method: "POST", headers: { authorization: `Bearer ${token}` } }), { params: Promise.resolve({ id }) });
    const response = await call(chip.caseId);
    expect(response.headers.get("content-type")).toBe("application/zip");
    expect(response.headers.get("content-disposition")).toBe(`attachment; filename="twinread-${chip.ref}.zip"`);
    const file = path.join(work, "route.zip");
    writeFileSync(file, Buffer.from(await response.arrayBuffer()));
    expect(check(await unpack(file)).status).toBe(0);
    expect((await call(randomUUID())).status).toBe(404);
    const empty = await createCase(lead, { customer: { name: "Lindmoor", email: "desk@lindmoor.example" }, damage: "None yet" });
    expect((await call(empty.id)).status).toBe(409);
  });

  it("is for leads and auditors", async () => {
    await expect(makeBundle(technician, chip.caseId)).rejects.toMatchObject({ code: "forbidden" });
    const auditor = await makeUser("auditor");
    (await makeBundle(auditor, chip.caseId)).stream.destroy();
  });

  it("leaves no completed entry when the receiver goes away", async () => {
    const completed = async () => (await chainEntries(chip.driveId)).filter((e) => e.action === "bundle.completed").length;
    const before = await completed();
    const { stream: bytes } = await makeBundle(lead, chip.caseId);
    for await (const chunk of bytes) {
      expect((chunk as Buffer).length).toBeGreaterThan(0);
      break;
    }
    await new Promise((done) => setTimeout(done, 200));
    expect(bytes.destroyed).toBe(true);
    expect(await completed()).toBe(before);
  });
});

describe("check.sh", () => {
  it("finds one flipped byte of any file", () => {
    // of the images, which are all treated alike, two
    for (const name of filesOf(bag).filter((one) => !/(before|after)-[2-9]\.bin$/.test(one))) {
      const dir = copy();
      const file = path.join(dir, name);
      const bytes = readFileSync(file);
      // in the script itself a comment, so that it still runs
      const at = name === "check.sh" ? bytes.indexOf("# It changes") + 4 : Math.floor(Math.random() * bytes.length);
      bytes[at] ^= 1;
      writeFileSync(file, bytes);
      expect([name, at, check(dir).status]).toEqual([name, at, 1]);
      rmSync(dir, { recursive: true });
    }
  }, 120_000);

  it("finds a missing file, an extra file and a link", () => {
    for (const change of [
      (dir: string) => rmSync(path.join(dir, "data/drives/1/original-U12/before-2.bin")),
      (dir: string) => rmSync(path.join(dir, "data/seal/log-key.pem")),
      (dir: string) => rmSync(path.join(dir, "tagmanifest-sha256.sig")),
      (dir: string) => rmSync(path.join(dir, "manifest-sha256.txt")),
      (dir: string) => writeFileSync(path.join(dir, "data/drives/1/more.bin"), "x"),
      (dir: string) => writeFileSync(path.join(dir, "a b\nc"), "x"),
      (dir: string) => void spawnSync("ln", ["-s", "/etc/hostname", path.join(dir, "data/link")]),
    ]) {
      const dir = copy();
      change(dir);
      expect([change.toString(), check(dir).status]).toEqual([change.toString(), 1]);
    }
  }, 60_000);

  const LOG = "data/drives/1/custody";
  const swap = (lines: string[], a: number, b: number) => lines.map((line, i) => lines[i === a ? b : i === b ? a : i]);
  it.each<[string, (lines: string[]) => string[], string]>([
    ["a cut tail", (l) => l.slice(0, -1), "does not end with the start"],
    ["a cut middle", (l) => l.filter((_, i) => i !== 3), "does not follow"],
    ["a cut beginning", (l) => l.slice(1), "does not follow"],
    ["swapped lines", (l) => swap(l, 2, 3), "does not follow"],
    ["a line put in twice", (l) => [...l.slice(0, 4), l[3], ...l.slice(4)], "does not follow"],
    ["an empty log", () => [], "is empty"],
  ])("names %s even when the forger has made new lists", (_, change, words) => {
    const dir = copy();
    for (const ending of ["jsonl", "sig"]) {
      const file = path.join(dir, `${LOG}.${ending}`);
      const lines = change(readFileSync(file, "utf8").trimEnd().split("\n"));
      writeFileSync(file, lines.map((line) => `${line}\n`).join(""));
    }
    relist(dir);
    const { status, text } = check(dir);
    expect(text).toContain(words);
    expect(text).toContain("tagmanifest-sha256.sig does not fit");
    expect(status).toBe(1);
  });

  it.each<[string, (line: string) => string, string]>([
    ["an edited entry", (line) => line.replace("Three clean reads.", "Three  lean reads."), "the signature of entry"],
    ["a number changed", (line) => line.replace(/"seq":(\d+)/, '"seq":9$1'), "has the number"],
    ["a NUL byte", (line) => `${line}\0`, "NUL byte"],
  ])("names %s even when the forger has made new lists", (_, change, words) => {
    const dir = copy();
    const file = path.join(dir, `${LOG}.jsonl`);
    const lines = readFileSync(file, "utf8").trimEnd().split("\n").map((line) => (line.startsWith('{"action":"approval.given"') ? change(line) : line));
    writeFileSync(file, `${lines.join("\n")}\n`);
    relist(dir);
    const { status, text } = check(dir);
    expect(text).toContain(words);
    expect(status).toBe(1);
  });

  it("finds images that do not belong to the log, though the lists name them", () => {
    const swapped = copy();
    writeFileSync(path.join(swapped, "data/drives/1/original-U12/before-1.bin"), firmware("another", 8192));
    relist(swapped);
    expect(check(swapped).text).toMatch(/names an image that the bundle does not hold: [0-9a-f]{64} before-1\.bin/);
    const added = copy();
    writeFileSync(path.join(added, "data/drives/1/original-U12/before-9.bin"), image);
    relist(added);
    expect(check(added).text).toContain("has an image that its custody log does not name");
  });

  it("finds a bundle that was signed anew with another key", () => {
    const dir = copy();
    const key = path.join(work, "other.pem");
    spawnSync("openssl", ["genpkey", "-algorithm", "ed25519", "-out", key]);
    spawnSync("openssl", ["pkey", "-in", key, "-pubout", "-out", path.join(dir, "data/seal/log-key.pem")]);
    relist(dir);
    spawnSync("openssl", ["pkeyutl", "-sign", "-inkey", key, "-rawin", "-in", path.join(dir, "tagmanifest-sha256.txt"), "-out", path.join(dir, "tagmanifest-sha256.sig")]);
    const { status, text } = check(dir);
    expect(text).toContain("not among the keys");
    expect(status).toBe(1);
    expect(check(dir, logKey().keyId).text).toContain("another fingerprint");
  });

  it("says 1 for another fingerprint, 2 for something that is none or without its tools", () => {
    expect(check(bag, "0".repeat(64)).status).toBe(1);
    expect(check(bag, "not a key").status).toBe(2);
    expect(spawnSync("/bin/sh", [path.join(bag, "check.sh")], { env: { ...process.env, PATH: "/nowhere" } }).status).toBe(2);
  });
});

describe("a damaged stored image", () => {
  it("lets nothing leave, and is written down", async () => {
    const stored = path.join(env().dataDir, "images/sha256", sha256(image).slice(0, 2), sha256(image));
    expect(existsSync(stored)).toBe(true);
    const good = readFileSync(stored);
    const plan = await startBundle(lead, chip.caseId);
    const bytes = Buffer.from(good);
    bytes[100] ^= 1;
    chmodSync(stored, 0o640);
    writeFileSync(stored, bytes);
    try {
      await expect(makeBundle(lead, chip.caseId)).rejects.toMatchObject({ code: "rule-against" });
      const file = path.join(work, "broken.zip");
      await expect(pipeline((await writeBundle(lead, plan)).stream, createWriteStream(file))).rejects.toThrow();
      expect(spawnSync("unzip", ["-t", file]).status).not.toBe(0);
      expect((await chainEntries(chip.driveId)).at(-1)?.action).not.toBe("bundle.completed");
      expect((await chainEntries(chip.driveId)).some((e) => e.action === "image.found-damaged")).toBe(true);
    } finally {
      writeFileSync(stored, good);
      chmodSync(stored, 0o440);
    }
  });
});
