import { mkdtempSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, describe, expect, it, vi } from "vitest";
import { CHECK_SCRIPT } from "@/lib/core/check-script";
import { type Bag, type BagOptions, type Chain, hex, logKeyA, logKeyB, makeBag, sealKeyA, testKey, withLists } from "../support/make-bag";
import { faultsOf, runCheckScript, stateOfStep, verifyBag, writeBag } from "../support/verify-bag";

const work = mkdtempSync(path.join(os.tmpdir(), "twinread-verify-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

// check.sh starts two programs for each signature; on a busy machine that takes its time
vi.setConfig({ testTimeout: 60_000 });

let count = 0;
/** Both checkers on the same files. */
async function both(bag: Bag, key: string | null = null) {
  const folder = path.join(work, String((count += 1)));
  writeBag(bag, folder);
  const [report, script] = [await verifyBag(bag, key), runCheckScript(folder, ...(key === null ? [] : [key]))];
  rmSync(folder, { recursive: true });
  return { report, script, verdicts: [report.verdict === "in-order" ? 0 : 1, script.status] };
}

const LOG = "data/drives/1/custody";
const edit = (bag: Bag, file: string, change: (text: string) => string): Bag => new Map(bag).set(file, Buffer.from(change(bag.get(file)!.toString("utf8"))));
const without = (bag: Bag, ...names: string[]): Bag => new Map([...bag].filter(([name]) => !names.includes(name)));
const lines = (change: (lines: string[]) => string[]) => (text: string) => change(text.trimEnd().split("\n")).map((line) => `${line}\n`).join("");
const entries = (bag: Bag, change: (lines: string[]) => string[]) => edit(edit(bag, `${LOG}.jsonl`, lines(change)), `${LOG}.sig`, lines(change));

const foundDamaged = (chain: Chain, sha256: string) => chain.add(logKeyA, "image.found-damaged", { type: "image", id: chain.id }, { sha256, state: "damaged", where: "scrub" });
const addPhoto = (chain: Chain, sha256: string) => chain.add(logKeyA, "photo.added", { type: "photo", id: chain.id }, { by: "workshop", caption: null, kind: "photo", mediaType: "image/jpeg", of: { id: chain.id, name: "the drive", type: "drive" }, photo: chain.id, sha256, sizeBytes: 9 });
const lost = (chain: Chain) => {
  addPhoto(chain, hex("lost"));
  foundDamaged(chain, hex("lost"));
};

describe("a good bundle", () => {
  it.each<[string, BagOptions, string[]]>([
    ["of one drive", {}, ["fingerprint"]],
    ["of two drives", { drives: 2 }, ["fingerprint"]],
    ["of three drives in a workshop that changed its log key", { drives: 3, twoKeys: true, others: 11 }, ["fingerprint"]],
    ["whose seal is over its own logs alone", { others: 0 }, ["fingerprint"]],
    ["with photos of drive, chip and shelf board", { drives: 2, photos: true }, ["fingerprint"]],
    ["that lacks a photo which the log says was found damaged", { photos: true, onChain: lost }, ["fingerprint"]],
    ["from before there were seals", { sealed: false }, ["seal", "proof", "fingerprint"]],
  ])("%s is in order for page and script", async (_, options, open) => {
    const { report, script, verdicts } = await both(makeBag(options));
    expect(faultsOf(report)).toEqual([]);
    expect(script.text).not.toContain("NOT IN ORDER");
    expect(verdicts).toEqual([0, 0]);
    expect(report.steps.filter((step) => step.state === "not-checked").map((step) => step.key)).toEqual(open);
  });

  it("says where each log ends, which seal it carries and whose keys these are", async () => {
    const { report, script } = await both(makeBag({ drives: 2 }));
    expect(report.facts).toMatchObject({ caseRef: "26-0042", logKey: logKeyA.id, sealKey: sealKeyA.id, seal: { number: 7 }, entries: 12 });
    for (const { seq, hash } of report.facts.heads) expect(script.text).toContain(`head of this log: ${seq} ${hash}`);
    expect(script.text).toContain(`seal key in this bundle: ${sealKeyA.id}`);
  });

  it("is compared with the log's or the seal's key, and never silently not", async () => {
    const bag = makeBag({ twoKeys: true });
    for (const key of [logKeyB, sealKeyA]) expect((await both(bag, key.id)).verdicts).toEqual([0, 0]);
    const replaced = await both(bag, logKeyA.id);
    expect(replaced.verdicts).toEqual([1, 1]);
    expect(replaced.report.sentence).toContain("a key that was replaced");
    const stranger = await both(bag, testKey("stranger").id);
    expect(stranger.verdicts).toEqual([1, 1]);
    expect(stranger.report.sentence).toContain("somebody else may have made this bundle");
    expect(stateOfStep(await verifyBag(bag), "fingerprint")).toBe("not-checked");
  });
});

describe("a bundle that somebody changed who can make new lists and has no key", () => {
  const bag = makeBag({ drives: 2 });
  const forged = testKey("forger");
  it.each<[string, () => Bag, string]>([
    ["a cut tail", () => entries(bag, (l) => l.slice(0, -1)), "does not end with the start"],
    ["a cut middle", () => entries(bag, (l) => l.filter((_, i) => i !== 2)), "does not continue"],
    ["a cut beginning", () => entries(bag, (l) => l.slice(1)), "does not continue"],
    ["swapped entries", () => entries(bag, ([a, b, c, ...l]) => [a, c, b, ...l]), "does not continue"],
    ["an entry put in twice", () => entries(bag, (l) => [...l.slice(0, 3), l[2], ...l.slice(3)]), "does not continue"],
    ["an empty log", () => entries(bag, () => []), "empty"],
    ["an edited statement", () => edit(bag, `${LOG}.jsonl`, (t) => t.replace("Two clean reads.", "Ten clean reads.")), "signature does not fit"],
    ["a signature of another entry", () => edit(bag, `${LOG}.sig`, lines(([a, , ...l]) => [a, a, ...l])), "signature does not fit"],
    ["an image swapped", () => new Map(bag).set("data/drives/1/original-U12/before-1.bin", Buffer.alloc(64, 7)), "does not hold it with this digest"],
    ["an image added", () => new Map(bag).set("data/drives/1/original-U12/before-9.bin", Buffer.alloc(64, 7)), "does not name this file"],
    ["another digest in the record", () => edit(bag, "data/case.json", (t) => t.replace(/"sha256": "[0-9a-f]{64}"/, `"sha256": "${hex("x")}"`)), "another digest"],
    ["an approval revoked in the record", () => edit(bag, "data/case.json", (t) => t.replace('"revoked": null', '"revoked": {}')), "never revokes"],
    ["the record of another drive", () => edit(bag, "data/case.json", (t) => t.replace(/("number": 1,\s+"letter": "A",\s+"id": ")[0-9a-f]{8}/, "$1deadbeef")), "another drive"],
    ["two drives with one log", () => new Map(bag).set("data/drives/2/custody.jsonl", bag.get(`${LOG}.jsonl`)!).set("data/drives/2/custody.sig", bag.get(`${LOG}.sig`)!), "the custody log of drive 1"],
    ["a seal with another root", () => edit(bag, "data/seal/seal.txt", (t) => t.replace(/\n[0-9a-f]{64}\n/, `\n${hex("x")}\n`)), "does not fit the seal"],
    ["a seal with a line too many", () => edit(bag, "data/seal/seal.txt", (t) => `${t}\n`), "to the letter"],
    ["a seal key of somebody else", () => new Map(bag).set("data/seal/seal-key.pem", Buffer.from(forged.pem)), "not among the seal keys"],
    ["a proof of another place in the tree", () => edit(bag, "data/seal/proof.json", (t) => t.replace(/"index":(\d)/, (_, i: string) => `"index":${(Number(i) + 1) % 7}`)), "does not lead to the seal's root"],
    ["a proof with a step turned", () => edit(bag, "data/seal/proof.json", (t) => t.replace(/("path":\[)("[0-9a-f]{64}"),("[0-9a-f]{64}")/, "$1$3,$2")), "does not lead to the seal's root"],
    ["a proof of one drive only", () => edit(bag, "data/seal/proof.json", (t) => t.replace(/,\{"drive".*\}\]/, "]")), "says nothing of drive"],
    ["no seal though there is a seal key", () => without(bag, "data/seal/seal.txt", "data/seal/seal.sig", "data/seal/seal-key.pem", "data/seal/proof.json"), "had a seal key"],
    ["half a seal", () => without(bag, "data/seal/seal.sig"), "missing"],
    ["no key", () => without(bag, "data/seal/log-key.pem"), "missing"],
    ["a key that is none", () => edit(bag, "data/seal/log-key.pem", (t) => t.replace("MCow", "MCox")), "not an Ed25519 public key"],
    ["no drive at all", () => new Map([...bag].filter(([name]) => !name.startsWith("data/drives/"))), "no drive"],
    ["a drive's number left out", () => new Map([...bag].map(([name, bytes]) => [name.replace("drives/1/", "drives/3/"), bytes])), "without a gap"],
  ])("with %s is found by page and script", async (_, change, words) => {
    const { report, script, verdicts } = await both(withLists(change(), forged));
    expect([verdicts, script.text]).toEqual([[1, 1], script.text]);
    expect(faultsOf(report).join("\n")).toContain(words);
    expect(report.steps.find((step) => step.key === "tag-signature")?.state).toBe("not-in-order");
  });
});

describe("a bundle whose lists somebody with the log key signed anew", () => {
  const bag = makeBag({ drives: 2, photos: true });
  const photo = "data/drives/1/photos/drive-1.jpg";
  it.each<[string, () => Bag, string]>([
    ["a photo swapped", () => new Map(bag).set(photo, Buffer.alloc(90, 7)), "It names a photo, and the bundle does not hold it"],
    ["a photo added", () => new Map(bag).set("data/drives/1/photos/drive-2.jpg", Buffer.alloc(90, 7)), "does not name this photo"],
    ["a photo of another drive", () => new Map(bag).set("data/drives/1/photos/drive-2.jpg", bag.get(photo.replace("drives/1", "drives/2"))!), "does not name this photo"],
    ["a photo left out", () => without(bag, photo), "It names a photo, and the bundle does not hold it"],
  ])("with %s is found by page and script", async (_, change, words) => {
    const { report, script, verdicts } = await both(withLists(change(), logKeyA));
    expect([verdicts, script.text]).toEqual([[1, 1], expect.stringMatching(/photo that/)]);
    expect(faultsOf(report).join("\n")).toContain(words);
  });
});

describe("a bundle by somebody who has a key", () => {
  const add = (key: typeof logKeyA, change: Record<string, unknown> = {}, facts: Record<string, unknown> = {}) => (chain: Chain) =>
    chain.add(key, "log.assessed", { type: "drive", id: chain.id }, { text: "All sound.", ...facts }, change);
  it.each<[string, BagOptions, string]>([
    ["an entry signed with a replaced key", { twoKeys: true, onChain: add(logKeyA) }, "had been replaced"],
    ["an entry signed with a stranger's key", { onChain: add(testKey("stranger")) }, "no log introduces"],
    ["a number left out", { onChain: add(logKeyA, { seq: 9 }) }, "number does not follow"],
    ["an earlier time", { onChain: add(logKeyA, { at: "2025-03-12T09:14:00.000000Z" }) }, "a time before"],
    ["another drive's entry", { onChain: add(logKeyA, { drive: "11111111-2222-4333-8444-555555555555" }) }, "belongs to another log"],
    ["a head that was turned back", { onChain: add(logKeyA, {}, { headBehind: 3 }) }, "had been turned back"],
    ["another form of entry", { onChain: add(logKeyA, { v: 2 }) }, "does not have the parts"],
    ["a part too many", { onChain: add(logKeyA, { zzz: 1 }) }, "does not have the parts"],
  ])("with %s is found by page and script, though all lists and the seal are made anew", async (_, options, words) => {
    const { report, verdicts, script } = await both(makeBag(options));
    expect([verdicts, script.text]).toEqual([[1, 1], script.text]);
    expect(faultsOf(report)[0]).toContain(words);
    expect(report.sentence).toContain(`${LOG}.jsonl, entry`);
  });

  it("takes a log for sound whose texts look like parts of an entry", async () => {
    const text = '","prev":"00","seq":1,"headBehind":9,"facts":{"keyId":"","purpose":"log"},"subject":{"id":"","type":""},"v":1}\\';
    const { report, script, verdicts } = await both(makeBag({ onChain: add(logKeyA, {}, { text }) }));
    expect([verdicts, faultsOf(report), script.text]).toEqual([[0, 0], [], script.text]);
  });
});

describe("the keys of the workshop", () => {
  it("are refused where a key that was replaced introduces another", async () => {
    const bag = makeBag({ twoKeys: true });
    const order = (l: string[]) => [l[0], l[2], l[1]];
    const swapped = edit(edit(bag, "data/workshop-keys.jsonl", lines(order)), "data/workshop-keys.sig", lines(order));
    const { report, verdicts } = await both(withLists(swapped, logKeyB));
    expect(verdicts).toEqual([1, 1]);
    expect(faultsOf(report).join("\n")).toContain("a log key that had been replaced");
  });

  it("cannot be cut back to a key that was replaced while the bundle is signed with the new one", async () => {
    const bag = makeBag({ twoKeys: true });
    const cut = edit(edit(bag, "data/workshop-keys.jsonl", lines((l) => l.slice(0, 2))), "data/workshop-keys.sig", lines((l) => l.slice(0, 2)));
    const { report, verdicts } = await both(withLists(cut, logKeyB));
    expect(verdicts).toEqual([1, 1]);
    expect(faultsOf(report).join("\n")).toContain("not among the keys");
  });
});

describe("files that are anything", () => {
  const bag = makeBag();
  const junk = [Buffer.alloc(0), Buffer.from("\0\0\n"), Buffer.from("[".repeat(200_000)), Buffer.from('{"a":'.repeat(50_000)), Buffer.from([0xff, 0xfe, 0x0a]), Buffer.from("null\n"), Buffer.from(`${"9".repeat(5000)}\n`)];
  const looked = [...bag.keys()].filter((name) => !/\.bin$|README|check\.sh/.test(name));
  it.each(looked)("%s never breaks the check", async (name) => {
    for (const bytes of junk) {
      const changed = withLists(new Map(bag).set(name, bytes));
      if (!name.startsWith("data/")) changed.set(name, bytes);
      const report = await verifyBag(changed);
      expect([name, bytes.length, report.verdict]).toEqual([name, bytes.length, "not-in-order"]);
    }
  });

  it("stops when it is asked to", async () => {
    const stop = new AbortController();
    const { entriesOf } = await import("../support/verify-bag");
    const { verifyBundle } = await import("@/lib/core/verify/verify-bundle");
    const { plainTools } = await import("@/lib/core/verify/tools");
    const call = verifyBundle({ entries: entriesOf(bag), source: "folder", tools: plainTools, signal: stop.signal, onProgress: () => stop.abort() });
    await expect(call).rejects.toMatchObject({ name: "AbortError" });
  });
});

it("says nothing in the script that the page would not name by the same file", () => {
  for (const file of ["data/seal/seal.txt", "data/seal/proof.json", "data/workshop-keys.jsonl", "data/case.json"]) expect(CHECK_SCRIPT).toContain(file);
});
