import { createHash, createPrivateKey, createPublicKey, generateKeyPairSync, sign, verify } from "node:crypto";
import { beforeEach, describe, expect, it } from "vitest";
import { checkChain, custodyText, signedBytes, ZERO_HASH, type ChainLine, type CustodyBody } from "@/lib/core/custody";
import { sha256Hex } from "./stream";

const DRIVE = "0b6a07e1-8853-4f70-8a00-000000000001";
const keys = generateKeyPairSync("ed25519");
const tools = {
  sha256: (bytes: Uint8Array) => sha256Hex(bytes),
  verify: (keyId: string, bytes: Uint8Array, signature: Uint8Array) => keyId === "key-1" && verify(null, bytes, keys.publicKey, signature),
  knows: (keyId: string) => keyId === "key-1",
};

function line(body: Partial<CustodyBody>, text = custodyText(body as CustodyBody)): ChainLine {
  return {
    body: new TextEncoder().encode(text), hash: sha256Hex(text), keyId: "key-1",
    signature: sign(null, signedBytes(text), keys.privateKey).toString("base64"),
  };
}
function entry(seq: number, prev: string, over: Partial<CustodyBody> = {}): ChainLine {
  return line({
    v: 1, drive: DRIVE, seq, at: `2026-11-03T09:14:0${seq}.123456Z`, app: "1.0.0", actor: { id: "a", name: "Mira Hollis", role: "technician" },
    action: "read.stored", subject: { type: "read", id: "r" }, facts: { n: seq, note: "é \u{1f600}" }, prev, ...over,
  });
}
function chainOf(length: number): ChainLine[] {
  const lines: ChainLine[] = [];
  for (let seq = 1; seq <= length; seq += 1) lines.push(entry(seq, lines.at(-1)?.hash ?? ZERO_HASH));
  return lines;
}
const headOf = (lines: ChainLine[]) => ({ seq: lines.length, hash: lines.at(-1)?.hash ?? ZERO_HASH });

let lines: ChainLine[] = [];
let head = { seq: 0, hash: ZERO_HASH };
beforeEach(() => {
  lines = chainOf(5);
  head = headOf(lines);
});
async function problems(over: Partial<{ head: typeof head | null; chain: string }> = {}): Promise<string[]> {
  const found = await checkChain(lines, over.head === undefined ? head : over.head, tools, over.chain ?? DRIVE);
  return found.map((one) => `${one.seq ?? "head"} ${one.problem}`);
}

describe("a chain's check", () => {
  it("finds nothing in a sound chain, nor in an empty one", async () => {
    expect(await problems()).toEqual([]);
    expect(await checkChain([], { seq: 0, hash: ZERO_HASH }, tools, DRIVE)).toEqual([]);
    expect(await checkChain([], null, tools, DRIVE)).toEqual([]);
  });
  it("finds a changed byte at the entry, its signature and the next link", async () => {
    const text = Buffer.from(lines[2].body).toString().replace('"n":3', '"n":4');
    lines[2] = { ...lines[2], body: new TextEncoder().encode(text) };
    expect(await problems()).toEqual(["3 stored-hash", "3 signature", "4 prev"]);
  });
  it("finds a changed entry whose stored hash was changed with it", async () => {
    const text = Buffer.from(lines[2].body).toString().replace('"n":3', '"n":4');
    lines[2] = { ...lines[2], body: new TextEncoder().encode(text), hash: sha256Hex(text) };
    expect(await problems()).toEqual(["3 signature", "4 prev"]);
  });
  it("finds a removed entry once, at the one after it", async () => {
    lines.splice(2, 1);
    expect(await problems()).toEqual(["4 sequence", "4 prev"]);
  });
  it("finds a cut tail, which only the head can show", async () => {
    lines.pop();
    expect(await problems()).toEqual(["head tail-missing"]);
    lines = [];
    expect(await problems()).toEqual(["head tail-missing"]);
  });
  it("finds a head that is gone, behind, or of another entry", async () => {
    expect(await problems({ head: null })).toEqual(["head head"]);
    expect(await problems({ head: { seq: 4, hash: lines[3].hash! } })).toEqual(["head head"]);
    expect(await problems({ head: { seq: 5, hash: ZERO_HASH } })).toEqual(["head head"]);
  });
  it("finds two entries that changed places", async () => {
    [lines[1], lines[2]] = [lines[2], lines[1]];
    const found = await problems();
    expect(found).toContain("3 sequence");
    expect(found.filter((one) => one.endsWith("prev")).length).toBeGreaterThan(1);
  });
  it("finds an entry appended with a right link and without the key", async () => {
    const forged = entry(6, lines[4].hash!);
    lines.push({ ...forged, signature: lines[4].signature });
    head = headOf(lines);
    expect(await problems()).toEqual(["6 signature"]);
  });
  it("finds a key that nobody introduced and a signature that is no base64", async () => {
    lines[1] = { ...lines[1], keyId: "key-2" };
    lines[3] = { ...lines[3], signature: "%%%" };
    expect(await problems()).toEqual(["2 unknown-key", "4 signature"]);
  });
  it("finds an entry of another drive", async () => {
    expect((await problems({ chain: "another" })).every((one) => one.endsWith("other-chain"))).toBe(true);
    lines = [entry(1, ZERO_HASH, { drive: "another" })];
    head = headOf(lines);
    expect(await problems()).toEqual(["1 other-chain"]);
  });
  it("finds a signed body that is not in canonical form", async () => {
    lines[4] = line({}, ` ${Buffer.from(lines[4].body).toString()}`);
    head = headOf(lines);
    expect(await problems()).toEqual(["5 not-canonical"]);
  });
  it("finds a time that went back and a first entry that links to something", async () => {
    lines = [entry(1, "1".repeat(64))];
    lines.push(entry(2, lines[0].hash!, { at: "2026-11-03T09:14:00.000000Z" }));
    head = headOf(lines);
    expect(await problems()).toEqual(["1 prev", "2 time-went-back"]);
  });
  it("finds a body with a fact too many at its top or of another version", async () => {
    lines = [entry(1, ZERO_HASH, { v: 2 as never }), ];
    lines.push(entry(2, lines[0].hash!, { extra: 1 } as never));
    head = headOf(lines);
    expect(await problems()).toEqual(["1 wrong-shape", "2 wrong-shape"]);
  });
  it.each([
    ["nothing", ""], ["no JSON", "{"], ["a list", "[]"], ["a number", "1"], ["null", "null"], ["a lone surrogate", '{"a":"\\ud800"}'],
    ["a fraction", '{"seq":1.5}'], ["types all wrong", '{"at":1,"drive":[],"prev":{},"seq":"x"}'],
  ])("reports and goes on where a body is %s", async (_name, text) => {
    lines[2] = line({}, text);
    const found = await problems();
    expect(found.length).toBeGreaterThan(0);
    expect(found.some((one) => one.startsWith("3 "))).toBe(true);
    expect(found).toContain("4 prev");
    expect(found.some((one) => one.startsWith("5 "))).toBe(false);
  });
  it("reports bytes that are no UTF-8", async () => {
    lines[2] = { ...lines[2], body: Uint8Array.of(0xff, 0xfe, 0x00) };
    expect(await problems()).toContain("3 not-readable");
  });
  describe("with several keys", () => {
    // three keys in the order of their introduction; one pair signs for all
    const order = (keyId: string) => ({ "key-1": 0, "key-2": 1, "key-3": 2 })[keyId];
    const several = { ...tools, knows: (keyId: string) => order(keyId) !== undefined, verify: (_: string, bytes: Uint8Array, signature: Uint8Array) => verify(null, bytes, keys.publicKey, signature), order };
    const signedWith = async (...ids: string[]) => {
      const found = await checkChain(lines.map((one, i) => ({ ...one, keyId: ids[i] ?? ids.at(-1)! })), head, several, DRIVE);
      return found.map((one) => `${one.seq ?? "head"} ${one.problem}`);
    };
    it("finds an entry of a key that a later one had followed, and that entry alone", async () => {
      expect(await signedWith("key-1", "key-1", "key-2", "key-2", "key-3")).toEqual([]);
      expect(await signedWith("key-1", "key-3", "key-3")).toEqual([]);
      expect(await signedWith("key-1", "key-2", "key-1", "key-2", "key-2")).toEqual(["3 old-key"]);
      expect(await signedWith("key-3", "key-1", "key-2", "key-3", "key-3")).toEqual(["2 old-key", "3 old-key"]);
    });
    it("takes a later key's word only where its signature holds: a forged entry makes no honest one look old", async () => {
      lines[1] = { ...lines[1], signature: Buffer.alloc(64).toString("base64") };
      expect(await signedWith("key-1", "key-3", "key-1", "key-1", "key-1")).toEqual(["2 signature"]);
      expect(await signedWith("key-1", "key-9", "key-1", "key-1", "key-1")).toEqual(["2 unknown-key"]);
    });
    it("says nothing of a key's age where no order is known", async () => {
      const found = await checkChain(lines.map((one, i) => ({ ...one, keyId: i === 1 ? "key-2" : "key-1" })), head, { ...several, order: undefined }, DRIVE);
      expect(found).toEqual([]);
    });
  });
  it("says what was expected and what was found", async () => {
    lines.splice(2, 1);
    const [sequence] = await checkChain(lines, head, tools, DRIVE);
    expect(sequence).toEqual({ seq: 4, problem: "sequence", expected: "3", found: "4" });
  });
});

describe("the format", () => {
  it("is canonical, and the signature covers prefix and body", () => {
    const text = Buffer.from(entry(1, ZERO_HASH).body).toString();
    expect(text.startsWith('{"action":"read.stored","actor":{"id":"a",')).toBe(true);
    expect(Buffer.from(signedBytes("{}")).toString()).toBe("twinread-custody/1\n{}");
    expect(signedBytes(new TextEncoder().encode("{}"))).toEqual(signedBytes("{}"));
  });
});

describe("Ed25519 as Node makes it", () => {
  // RFC 8032 section 7.1, tests 1 to 3 and SHA(abc)
  it.each([
    ["9d61b19deffd5a60ba844af492ec2cc44449c5697b326919703bac031cae7f60", "d75a980182b10ab7d54bfed3c964073a0ee172f3daa62325af021a68f707511a", "", "e5564300c360ac729086e2cc806e828a84877f1eb8e5d974d873e065224901555fb8821590a33bacc61e39701cf9b46bd25bf5f0595bbe24655141438e7a100b"],
    ["4ccd089b28ff96da9db6c346ec114e0f5b8a319f35aba624da8cf6ed4fb8a6fb", "3d4017c3e843895a92b70aa74d1b7ebc9c982ccf2ec4968cc0cd55f12af4660c", "72", "92a009a9f0d4cab8720e820b5f642540a2b27b5416503f8fb3762223ebdb69da085ac1e43e15996e458f3613d0f11d8c387b2eaeb4302aeeb00d291612bb0c00"],
    ["c5aa8df43f9f837bedb7442f31dcb7b166d38535076f094b85ce3a2e0b4458f7", "fc51cd8e6218a1a38da47ed00230f0580816ed13ba3303ac5deb911548908025", "af82", "6291d657deec24024827e69c3abe01a30ce548a284743a445e3680d7db5ac3ac18ff9b538d16f290ae67f760984dc6594a7c15e9716ed28dc027beceea1ec40a"],
    ["833fe62409237b9d62ec77587520911e9a759cec1d19755b7da901b96dca3d42", "ec172b93ad5e563bf4932c70e1245034c35467ef2efd4d64ebf819683467e2bf", createHash("sha512").update("abc").digest("hex"), "dc2a4459e7369633a52b1bf277839a00201009a3efbf3ecb69bea2186c26b58909351fc9ac90b3ecfdfbc7c66431e0303dca179c138ac17ad9bef1177331a704"],
  ])("%s", (secret, publicKey, message, signature) => {
    const key = createPrivateKey({ key: Buffer.from(`302e020100300506032b657004220420${secret}`, "hex"), format: "der", type: "pkcs8" });
    const bytes = Buffer.from(message, "hex");
    const made = sign(null, bytes, key);
    expect(made.toString("hex")).toBe(signature);
    const open = createPublicKey(key);
    expect(open.export({ format: "der", type: "spki" }).subarray(-32).toString("hex")).toBe(publicKey);
    expect(verify(null, bytes, open, made)).toBe(true);
    made[0] ^= 1;
    expect(verify(null, bytes, open, made)).toBe(false);
  });
});
