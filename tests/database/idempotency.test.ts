import { randomUUID } from "node:crypto";
import { describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { createCase } from "@/lib/commands/create-case";
import { AppError } from "@/lib/errors";
import { once, requestHash } from "@/lib/http/idempotency";
import { Approval, Case, connection, IdempotencyKey } from "@/models";
import { logOf, makeReadyBench, makeUser, refusalOf, sha256 } from "../support/factory";
import { race, times } from "../support/race";

const CASE = { customer: { name: "Quarry Lane Stores", email: "desk@quarrylane.example" }, damage: "Dropped" };
const HASH = requestHash(["POST", "/api/cases", "one"]);

async function mine(userId: string): Promise<number> {
  return Case.count({ where: { createdBy: userId } });
}

describe("one request under one key", () => {
  it("is done once and answered alike, however often it comes", async () => {
    const technician = await makeUser("technician");
    const key = randomUUID();
    const ask = () => once(technician.id, "POST /api/cases", key, HASH, 201, () => createCase(technician, CASE));
    const first = await ask();
    expect(first.status).toBe(201);
    for (let i = 0; i < 3; i += 1) expect(await ask()).toEqual(first);
    expect(await mine(technician.id)).toBe(1);
  });

  it("is done once by eight at the same time; whoever comes too early is told to wait", async () => {
    const technician = await makeUser("technician");
    for (let round = 0; round < 10; round += 1) {
      const key = randomUUID();
      const { won, lost } = await race(times(8, () => () => once(technician.id, "POST /api/cases", key, HASH, 201, () => createCase(technician, CASE))));
      expect(won.length).toBeGreaterThan(0);
      expect(new Set(won.map((answer) => JSON.stringify(answer))).size).toBe(1);
      for (const error of lost) expect(error).toMatchObject({ code: "rule-against", detail: expect.stringMatching(/still under way/), extra: { retryAfterSeconds: 2 } });
      expect(await mine(technician.id)).toBe(round + 1);
    }
  }, 60_000);

  it("is refused when it is another request", async () => {
    const technician = await makeUser("technician");
    const key = randomUUID();
    await once(technician.id, "POST /api/cases", key, HASH, 201, () => createCase(technician, CASE));
    const other = once(technician.id, "POST /api/cases", key, requestHash(["POST", "/api/cases", "two"]), 201, () => createCase(technician, CASE));
    expect(await refusalOf(other)).toEqual({ code: "does-not-fit", detail: expect.stringMatching(/^This Idempotency-Key was used for another request/) });
    expect(await mine(technician.id)).toBe(1);
  });

  it("is another user's or another route's own", async () => {
    const [one, two] = [await makeUser("technician"), await makeUser("technician")];
    const key = randomUUID();
    await once(one.id, "POST /api/cases", key, HASH, 201, () => createCase(one, CASE));
    await once(two.id, "POST /api/cases", key, HASH, 201, () => createCase(two, CASE));
    await once(one.id, "POST /api/other", key, HASH, 201, () => createCase(one, CASE));
    expect([await mine(one.id), await mine(two.id)]).toEqual([2, 1]);
  });

  it("may be sent again after a refusal, which is not kept", async () => {
    const technician = await makeUser("technician");
    const key = randomUUID();
    const refuse = once(technician.id, "POST /api/cases", key, HASH, 201, () => Promise.reject(new AppError("rule-against", "Not yet.")));
    expect(await refusalOf(refuse)).toEqual({ code: "rule-against", detail: "Not yet." });
    await once(technician.id, "POST /api/cases", key, HASH, 201, () => createCase(technician, CASE));
    expect(await mine(technician.id)).toBe(1);
  });

  it("is answered from what was committed when the server died before its answer", async () => {
    const technician = await makeUser("technician");
    const key = randomUUID();
    // the change commits with its receipt, then everything after it is lost
    await expect(once(technician.id, "POST /api/cases", key, HASH, 201, async () => {
      await createCase(technician, CASE);
      throw new Error("killed here");
    })).rejects.toThrow("killed here");
    const again = await once(technician.id, "POST /api/cases", key, HASH, 201, () => Promise.reject(new Error("must not run")));
    expect(again).toMatchObject({ status: 201, body: { ref: expect.stringMatching(/^\d\d-\d{4}$/) } });
    expect(await mine(technician.id)).toBe(1);
  });

  it("is free again when its claim is left from a server that died before it changed anything", async () => {
    const technician = await makeUser("technician");
    const key = randomUUID();
    const where = { userId: technician.id, route: "POST /api/cases", idempotencyKey: key };
    await IdempotencyKey.create({ ...where, requestHash: HASH, createdAt: new Date(Date.now() - 3 * 3_600_000) });
    await once(technician.id, "POST /api/cases", key, HASH, 201, () => createCase(technician, CASE));
    expect(await mine(technician.id)).toBe(1);
  });

  it("is a new one after seven days", async () => {
    const technician = await makeUser("technician");
    const key = randomUUID();
    const ask = () => once(technician.id, "POST /api/cases", key, HASH, 201, () => createCase(technician, CASE));
    const first = await ask();
    const age = (days: number) => connection().query("UPDATE idempotency_keys SET created_at = UTC_TIMESTAMP(6) - INTERVAL ? DAY WHERE idempotency_key = ?", { replacements: [days, key] });
    await age(6);
    expect(await ask()).toEqual(first);
    await age(8);
    expect(await ask()).not.toEqual(first);
    expect(await mine(technician.id)).toBe(2);
  });

  it("approves once; the refusal that the log keeps is not taken for its answer", async () => {
    const { lead, chip, image } = await makeReadyBench();
    const input = { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Clean.", reasons: {}, lookedAt: [] };
    const ask = (key: string, sha = input.sha256) => once(lead.id, "POST approval", key, requestHash([sha]), 201, () => approveImage(lead, chip.chipId, { ...input, sha256: sha }));
    const refused = randomUUID();
    expect(await refusalOf(ask(refused, "a".repeat(64)))).toMatchObject({ code: "rule-against" });
    expect(await IdempotencyKey.count({ where: { idempotencyKey: refused } })).toBe(0);
    const key = randomUUID();
    const { won } = await race(times(6, () => () => ask(key)));
    expect(won.length).toBeGreaterThan(0);
    expect(await ask(key)).toEqual(won[0]);
    expect(await Approval.count({ where: { chipId: chip.chipId } })).toBe(1);
    expect((await logOf(chip.driveId)).filter((e) => e.action === "approval.given")).toHaveLength(1);
  });

  it("has 1 to 200 characters", async () => {
    const technician = await makeUser("technician");
    for (const key of ["", "k".repeat(201)]) expect(await refusalOf(once(technician.id, "POST x", key, HASH, 201, () => createCase(technician, CASE)))).toMatchObject({ code: "malformed" });
    await once(technician.id, "POST x", "k".repeat(200), HASH, 201, () => createCase(technician, CASE));
    expect(await mine(technician.id)).toBe(1);
  });
});
