import { generateKeyPairSync, sign } from "node:crypto";
import { describe, expect, it } from "vitest";
import { signedBytes } from "@/lib/core/custody";
import { keyring, type KeyEntry } from "@/lib/queries/keyring";
import { keyIdOf } from "@/storage";

function newKey() {
  const { publicKey, privateKey } = generateKeyPairSync("ed25519");
  return { id: keyIdOf(publicKey), pem: publicKey.export({ type: "spki", format: "pem" }) as string, secret: privateKey };
}
type Key = ReturnType<typeof newKey>;

function introduce(seq: number, key: Key, signer: Key, facts: object = {}): KeyEntry {
  const body = Buffer.from(JSON.stringify({ facts: { keyId: key.id, purpose: "log", publicKeyPem: key.pem, ...facts } }));
  return { seq, body, keyId: signer.id, signature: sign(null, signedBytes(body), signer.secret) };
}

const [first, second, forger] = [newKey(), newKey(), newKey()];

describe("the keys that may sign the log", () => {
  it("begin with one that introduces itself and go on by signature", () => {
    const ring = keyring([introduce(1, first, first), introduce(9, second, first)], second.pem);
    expect([...ring.keys.keys()]).toEqual([first.id, second.id]);
    expect(ring.problems).toEqual([]);
  });

  it("do not include one that somebody inserted with a signature of their own", () => {
    const ring = keyring([introduce(1, first, first), introduce(9, forger, forger)], first.pem);
    expect([...ring.keys.keys()]).toEqual([first.id]);
    expect(ring.problems).toEqual([expect.objectContaining({ seq: 9, sentence: expect.stringContaining("no earlier key signed") })]);
  });

  it("do not include one that only claims an earlier key's signature", () => {
    const entry = { ...introduce(9, forger, forger), keyId: first.id };
    expect(keyring([introduce(1, first, first), entry], first.pem).problems).toEqual([expect.objectContaining({ seq: 9, sentence: expect.stringContaining("does not fit") })]);
  });

  it("must include the data folder's: a log that was replaced whole is noticed", () => {
    expect(keyring([introduce(1, forger, forger)], first.pem).problems).toEqual([expect.objectContaining({ sentence: expect.stringContaining("not among the keys") })]);
  });

  it("are named by their fingerprint and nothing else", () => {
    expect(keyring([introduce(1, first, first, { keyId: second.id })], null)).toMatchObject({ problems: [{ seq: 1 }] });
  });

  it("survive an entry that cannot be read", () => {
    const broken = { ...introduce(5, second, first), body: Buffer.from([0xff, 0x7b]) };
    const ring = keyring([introduce(1, first, first), broken], first.pem);
    expect([...ring.keys.keys()]).toEqual([first.id]);
    expect(ring.problems).toHaveLength(1);
  });
});
