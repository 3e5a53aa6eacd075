import { randomUUID } from "node:crypto";
import { expect } from "@playwright/test";
import { custodyOf, makeReady, sha256Of } from "./support/bench";
import { call, expectProblem, tokenOf } from "./support/station";
import { test } from "./support/test";

test("a hand-out that is asked for again under one key gives the image again, never a note in its place", async () => {
  const [mira, ines] = await Promise.all([tokenOf("mira"), tokenOf("ines")]);
  const chip = await makeReady(mira, { customer: "Asked for twice", sizeBytes: 4096 });
  const ask = (reason: string) => call("POST", `/api/reads/${chip.reads[0].id}/download`, { token: ines, json: { reason }, headers: { "idempotency-key": key } });
  const key = randomUUID();
  for (let time = 1; time <= 3; time += 1) {
    const out = await ask("The first answer broke off on its way.");
    expect(out.status).toBe(200);
    expect(sha256Of(out.bytes)).toBe(chip.sha256);
    // each time bytes leave the house, and each time it is written down
    expect((await custodyOf(mira, chip.driveId)).filter((entry) => entry.action === "image.handed-out")).toHaveLength(time);
  }
});

test("text that is no UTF-8 is refused, not mended on its way into the log", async () => {
  const mira = await tokenOf("mira");
  const body = Buffer.concat([Buffer.from('{"customer":{"name":"Ren\xe9e","email":"desk@latin.example"},"damage":"Surge"}', "latin1")]);
  const answer = await call("POST", "/api/cases", { token: mira, body: new Uint8Array(body), headers: { "content-type": "application/json" } });
  expectProblem(answer, 400, /UTF-8/);
});
