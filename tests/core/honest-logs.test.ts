import { describe, expect, it, vi } from "vitest";
import { checkChain } from "@/lib/core/custody";
import { honestHouse } from "@/scripts/tamper/honest-logs";
import { falseAlarms } from "@/scripts/tamper/judge-house";
import { eightEntries, sweepLog, sweepSeal } from "@/scripts/tamper/log-flips";
import { sha256Hex } from "./stream";

vi.setConfig({ testTimeout: 120_000 });

describe("an honest log", () => {
  // 1,000 of them in tests/long/tamper-matrix.test.ts
  it("is clean in 60 random workshops, whatever the text, the clock, the keys and the heads did", async () => {
    for (let seed = 1; seed <= 60; seed += 1) expect([seed, await falseAlarms(honestHouse(seed))]).toEqual([seed, []]);
  });

  it("takes in what it is meant to: repaired heads, changed keys, clocks that stepped back, several seals", () => {
    const houses = Array.from({ length: 60 }, (_, i) => honestHouse(i + 1));
    const bodies = houses.flatMap(({ chains }) => [...chains.values()].flatMap(({ lines }) => lines.map(({ body }) => Buffer.from(body).toString())));
    expect(houses.some(({ repaired }) => repaired.size > 0)).toBe(true);
    expect(houses.some(({ seals }) => seals.length > 2)).toBe(true);
    for (const sign of ["clockBehindMs", '"purpose":"log","reason"', '"purpose":"seal","reason"', "\u202e"]) expect(bodies.some((body) => body.includes(sign)), sign).toBe(true);
  });
});

// every single one in tests/long/tamper-matrix.test.ts
describe("one flipped bit", () => {
  const eight = eightEntries();

  it("of a log of eight entries is found, and its entry or the head named first", async () => {
    const { flips, missed } = await sweepLog(eight, 9);
    expect(missed).toEqual([]);
    expect(flips).toBeGreaterThan(800);
  });

  it("of a seal, its list of heads or what stands beside it is found, and the seal named first", async () => {
    expect((await sweepSeal(eight, 9)).missed).toEqual([]);
  });

  it("is not needed: what has no canonical form, or whose digest can't be taken, is said to be so and the check goes on", async () => {
    const { lines, head, chain } = eight;
    const tools = { sha256: (bytes: Uint8Array) => sha256Hex(bytes), verify: () => true };
    for (const odd of ['"\\ud800"', "1.5", "9007199254740993"]) {
      const body = Buffer.from(Buffer.from(lines[2].body).toString().replace('"facts":{', `"facts":{"0":${odd},`));
      const found = await checkChain(lines.map((line, i) => (i === 2 ? { ...line, body } : line)), head, tools, chain);
      expect(found, odd).toContainEqual(expect.objectContaining({ seq: 3, problem: "not-canonical" }));
    }
    const broken = { ...tools, sha256: (bytes: Uint8Array) => (bytes === lines[2].body ? Promise.reject(new Error("no digest")) : sha256Hex(bytes)) };
    expect(await checkChain(lines, head, broken, chain)).toEqual([{ seq: 3, problem: "could-not-check", expected: "a digest of the body", found: "no digest" }]);
    const unable = { ...tools, verify: () => Promise.reject(new Error("no such curve")) };
    expect(await checkChain(lines.slice(0, 1), { seq: 1, hash: lines[0].hash! }, unable, chain)).toEqual([{ seq: 1, problem: "signature", expected: "a signature over this body", found: "no such curve" }]);
  });
});
