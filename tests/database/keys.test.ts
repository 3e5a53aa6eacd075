import { createHash, createPublicKey, randomUUID } from "node:crypto";
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import { beforeAll, beforeEach, describe, expect, it } from "vitest";
import { GET as listRoute, POST as changeRoute } from "@/app/api/keys/route";
import { appendEntry } from "@/lib/commands/append-entry";
import { changeKey } from "@/lib/commands/change-key";
import { introduceKey } from "@/lib/commands/introduce-key";
import { makeSeal } from "@/lib/commands/make-seal";
import { canonicalJson } from "@/lib/core/canonical";
import { signedBytes } from "@/lib/core/custody";
import { type Actor, SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { checkCustody, logKeys } from "@/lib/queries/custody";
import { keyList } from "@/lib/queries/keys";
import { sealKeys } from "@/lib/queries/seals";
import type { KeyRow } from "@/lib/views";
import { CustodyEntry, CustodyHead, inTransaction } from "@/models";
import { dropNextKey, keyIdOf, type KeyUse, logKey, makeNextKey, nextKeyId, placeNextKey, sealKey } from "@/storage";
import { refusal } from "../support/bench-steps";
import { lastEntry, makeChip, makeUser } from "../support/factory";
import { race, times } from "../support/race";
import { callAs, lastSealRow, opensslAccepts } from "../support/sealed";

const folder = path.join(env().dataDir, "keys");
const file = (name: string) => readFileSync(path.join(folder, name), "utf8");
const idIn = (name: string) => keyIdOf(createPublicKey(file(name)));
const keyInUse = (use: KeyUse) => (use === "log" ? logKey() : sealKey());
/** As after a start: nothing is remembered of the files. */
const restarted = () => (globalThis as unknown as { twinreadKeys?: Map<string, unknown> }).twinreadKeys?.clear();
const REASON = "A laptop with a backup was stolen.";

let admin: Actor;
beforeAll(async () => {
  admin = await makeUser("admin");
});
beforeEach(() => restarted());

const note = (chain: string) => inTransaction((tx) => appendEntry(tx, chain, admin, "log.assessed", { type: "drive", id: chain }, { text: "Looked at all of it." }));
const lastKeyId = async (chain: string) => (await CustodyEntry.findOne({ where: { chainId: chain }, order: [["seq", "DESC"]] }))!.keyId;

describe("a change of the log's key", () => {
  it("is introduced by the former key, comes into use at once, and leaves old entries sound", async () => {
    const { driveId } = await makeChip(await makeUser("technician"));
    const former = logKey();
    const formerFile = file("log-key.pem");
    const changed = await changeKey(admin, { purpose: "log", reason: REASON });
    expect(changed).toEqual({ purpose: "log", keyId: logKey().keyId, formerKeyId: former.keyId });
    expect(changed.keyId).not.toBe(former.keyId);
    const entry = (await CustodyEntry.findOne({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: [["seq", "DESC"]] }))!;
    expect(entry.keyId).toBe(former.keyId);
    expect(await lastEntry(WORKSHOP_CHAIN, "key.introduced")).toEqual({ keyId: changed.keyId, purpose: "log", publicKeyPem: logKey().publicKeyPem, reason: REASON });
    await note(driveId);
    expect(await lastKeyId(driveId)).toBe(changed.keyId);
    for (const chain of [driveId, WORKSHOP_CHAIN]) expect((await checkCustody(chain)).findings).toEqual([]);

    expect(file("log-key.pem")).not.toBe(formerFile);
    expect(idIn("log-key.pub.pem")).toBe(changed.keyId);
    expect(idIn(`old/${former.keyId}.pub.pem`)).toBe(former.keyId);
    expect(existsSync(path.join(folder, "log-key.next.pem"))).toBe(false);
    for (const name of readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((one) => one.endsWith(".pem"))) expect([name, statSync(path.join(folder, name)).mode & 0o777]).toEqual([name, 0o600]);
    restarted();
    await introduceKey();
    expect(logKey().keyId).toBe(changed.keyId);
  });

  it("reaches another process that had the former key in its memory", async () => {
    const former = logKey();
    const { keyId } = await changeKey(admin, { purpose: "log", reason: REASON });
    (globalThis as unknown as { twinreadKeys: Map<string, unknown> }).twinreadKeys.set(path.join(folder, "log-key.pem"), former);
    await note(WORKSHOP_CHAIN);
    expect(await lastKeyId(WORKSHOP_CHAIN)).toBe(keyId);
  });

  it("asked for by four at once is four that follow one another", async () => {
    const before = (await logKeys()).size;
    const { won, lost } = await race(times(4, () => () => changeKey(admin, { purpose: "log", reason: REASON })));
    expect(lost).toEqual([]);
    const ids = [...(await logKeys()).keys()].slice(before);
    expect(ids.sort()).toEqual(won.map((one) => one.keyId).sort());
    expect(logKey().keyId).toBe([...(await logKeys()).keys()].at(-1));
    expect(nextKeyId("log")).toBeNull();
    expect((await checkCustody(WORKSHOP_CHAIN)).findings).toEqual([]);
  });

  it("makes an entry with the replaced key show, where a later key has signed before", async () => {
    const { driveId } = await makeChip(await makeUser("technician"));
    const former = logKey();
    await changeKey(admin, { purpose: "log", reason: REASON });
    const forge = async () => {
      const head = (await CustodyHead.findByPk(driveId))!;
      const body = Buffer.from(canonicalJson({ v: 1, drive: driveId, seq: head.seq + 1, at: head.at, app: "1.0.0", actor: { id: randomUUID(), name: "Thief", role: "lead" }, action: "drive.corrected", subject: { type: "drive", id: driveId }, facts: { changes: [], reason: "None." }, prev: head.hash.toString("hex") }));
      const hash = createHash("sha256").update(body).digest();
      await CustodyEntry.create({ chainId: driveId, seq: head.seq + 1, body, hash, prev: head.hash, keyId: former.keyId, signature: former.sign(signedBytes(body)), action: "drive.corrected" });
      await CustodyHead.update({ seq: head.seq + 1, hash }, { where: { chainId: driveId } });
      return head.seq + 1;
    };
    // before the new key has signed in this chain nothing tells it from a late honest entry
    await forge();
    expect((await checkCustody(driveId)).findings).toEqual([]);
    await note(driveId);
    const seq = await forge();
    expect((await checkCustody(driveId)).findings).toEqual([{ seq, problem: "old-key", expected: logKey().keyId, found: former.keyId }]);
    // what follows it is not to blame
    await note(driveId);
    expect((await checkCustody(driveId)).findings).toHaveLength(1);
  });
});

describe("a change of the seals' key", () => {
  it("is introduced by the log's key, and seals made before and after verify with the key of their time", async () => {
    const before = await makeSeal(SYSTEM, "bundle");
    const former = sealKey().keyId;
    const { keyId } = await changeKey(admin, { purpose: "seal", reason: REASON });
    const after = await makeSeal(SYSTEM, "bundle");
    expect([before.keyId, after.keyId]).toEqual([former, keyId]);
    const keys = await sealKeys();
    for (const seal of [before, after]) expect(opensslAccepts(seal.text, Buffer.from(seal.signature, "base64"), keys.get(seal.keyId)!)).toBe(true);
    expect(opensslAccepts(after.text, Buffer.from(after.signature, "base64"), keys.get(before.keyId)!)).toBe(false);
    expect([(await lastSealRow()).keyId, (await logKeys()).has(keyId)]).toEqual([keyId, false]);
  });
});

describe("a crash in the middle of a change", () => {
  for (const use of ["log", "seal"] as const) {
    const introduced = async () => {
      const { keyId, publicKeyPem } = makeNextKey(use);
      await inTransaction((tx) => appendEntry(tx, WORKSHOP_CHAIN, admin, "key.introduced", { type: "key", id: WORKSHOP_CHAIN }, { keyId, purpose: use, publicKeyPem, reason: REASON }));
      return keyId;
    };

    it(`of the ${use} key before the log introduced the new one: the former goes on, the new one is removed`, async () => {
      const former = keyInUse(use).keyId;
      makeNextKey(use);
      restarted();
      await introduceKey();
      expect([keyInUse(use).keyId, nextKeyId(use)]).toEqual([former, null]);
    });

    it(`of the ${use} key while its file was being written: the former goes on`, async () => {
      const former = keyInUse(use).keyId;
      writeFileSync(path.join(folder, `${use}-key.next.pem`), "-----BEGIN PRIV", { mode: 0o600 });
      restarted();
      await introduceKey();
      expect([keyInUse(use).keyId, nextKeyId(use)]).toEqual([former, null]);
    });

    it(`of the ${use} key after the log introduced the new one: it comes into use`, async () => {
      const former = keyInUse(use).keyId;
      const keyId = await introduced();
      restarted();
      await introduceKey();
      expect([keyInUse(use).keyId, nextKeyId(use), idIn(`${use}-key.pub.pem`), idIn(`old/${former}.pub.pem`)]).toEqual([keyId, null, keyId, former]);
    });

    it(`of the ${use} key after the public half was put in place: the rest follows`, async () => {
      const keyId = await introduced();
      const next = createPublicKey(file(`${use}-key.next.pem`)).export({ type: "spki", format: "pem" });
      writeFileSync(path.join(folder, `${use}-key.pub.pem`), next);
      restarted();
      await introduceKey();
      expect([keyInUse(use).keyId, idIn(`${use}-key.pub.pem`)]).toEqual([keyId, keyId]);
    });

    it(`of the ${use} key is ended by the next change too, and by the next seal`, async () => {
      const keyId = await introduced();
      const changed = await changeKey(admin, { purpose: use, reason: REASON });
      expect(changed.formerKeyId).toBe(keyId);
      const again = await introduced();
      await makeSeal(SYSTEM, "bundle");
      expect(keyInUse(use).keyId).toBe(again);
      expect((await checkCustody(WORKSHOP_CHAIN)).findings).toEqual([]);
    });
  }

  it("never puts another key in place than the one that was introduced", () => {
    const former = logKey().keyId;
    makeNextKey("log");
    expect(() => makeNextKey("log")).toThrow(/EEXIST/);
    expect([placeNextKey("log", "0".repeat(64)), placeNextKey("log", ""), logKey().keyId]).toEqual([false, false, former]);
    dropNextKey("log");
  });
});

describe("a key folder from an old backup", () => {
  it("is refused at the start: the log has introduced another key since", async () => {
    const [secret, open] = [file("seal-key.pem"), file("seal-key.pub.pem")];
    await changeKey(admin, { purpose: "seal", reason: REASON });
    const now = [file("seal-key.pem"), file("seal-key.pub.pem")];
    const put = ([s, o]: string[]) => {
      writeFileSync(path.join(folder, "seal-key.pem"), s);
      writeFileSync(path.join(folder, "seal-key.pub.pem"), o);
      restarted();
    };
    put([secret, open]);
    await expect(introduceKey()).rejects.toThrow("The seal key in the data folder is a former one");
    put(now);
    await introduceKey();
  });
});

describe("the interface", () => {
  it("lets an admin alone change a key, with a reason, once for a repeated request", async () => {
    for (const role of ["technician", "lead", "auditor"] as const) {
      expect(await refusal(changeKey(await makeUser(role), { purpose: "seal", reason: REASON }))).toMatchObject({ status: 403 });
    }
    expect((await callAs(admin, changeRoute, "/api/keys", { body: { purpose: "seal", reason: "" } })).status).toBe(422);
    expect((await callAs(admin, changeRoute, "/api/keys", { body: { purpose: "images", reason: REASON } })).status).toBe(422);
    const ask = () => callAs(admin, changeRoute, "/api/keys", { body: { purpose: "seal", reason: REASON }, key: "one change" });
    const first = await ask();
    expect(first.status).toBe(201);
    const changed = (await first.json()) as { keyId: string };
    expect(await (await ask()).json()).toEqual(changed);
    expect(sealKey().keyId).toBe(changed.keyId);
  });

  it("lists every key with who introduced it, and which is in use", async () => {
    expect(await refusal(keyList(await makeUser("technician")))).toMatchObject({ status: 403 });
    const { keys } = (await (await callAs(await makeUser("auditor"), listRoute, "/api/keys")).json()) as { keys: KeyRow[] };
    expect(keys.filter((key) => key.current).map((key) => [key.purpose, key.keyId]).sort()).toEqual([["log", logKey().keyId], ["seal", sealKey().keyId]]);
    expect(keys.at(-1)).toMatchObject({ purpose: "log", introducedBy: { name: "Twinread", role: "system" }, reason: null });
    expect(keys[0]).toMatchObject({ introducedBy: { name: admin.name, role: "admin" }, reason: REASON, since: expect.stringMatching(/Z$/) as string });
    expect(JSON.stringify(keys)).not.toContain("PRIVATE");
  });
});
