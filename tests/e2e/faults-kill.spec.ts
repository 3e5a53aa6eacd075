import { request as httpRequest } from "node:http";
import { expect } from "@playwright/test";
import { approve, chipOf, custodyOf, makePair, makeReady, randomImage, sha256Of, type Stored, upload } from "./support/bench";
import { asAdmin } from "./support/database";
import { checkStore, SecondServer } from "./support/second-server";
import { type Answer, call, tokenOf } from "./support/station";
import { test } from "./support/test";

const server = new SecondServer();
let mira: string;
let ines: string;

test.beforeAll(async () => {
  [mira, ines] = await Promise.all([tokenOf("mira"), tokenOf("ines")]);
});
test.beforeEach(() => server.start());
test.afterAll(() => server.kill());

/**
 * When the power goes: while the change waits for the drive's log (asked and claimed, nothing written), some
 * milliseconds after it was let go on, when the database has it but hardly anybody was told, or after its answer.
 */
const MOMENTS = ["before anything is written", 15, "as soon as it is committed", "after the answer"] as const;
type Moment = (typeof MOMENTS)[number];
const nameOf = (moment: Moment) => (typeof moment === "number" ? `${moment} ms after it could go on` : moment);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** Sends a change to the second server and kills that at the moment; gives the status when there was an answer. */
async function killedAt(moment: Moment, driveId: string, key: string, change: () => Promise<Answer>): Promise<number | null> {
  const asked = async () => change().then((answer) => answer.status, () => null);
  if (moment === "after the answer") {
    const status = await asked();
    await server.kill();
    return status;
  }
  return asAdmin(async (db) => {
    await db.beginTransaction();
    const head = async (how = "") => Number((await db.query<{ seq: number }[]>(`SELECT seq FROM custody_heads WHERE chain_id = ? ${how}`, [driveId]))[0].seq);
    const before = await head("FOR UPDATE");
    const answer = asked();
    await expect.poll(() => isClaimed(key), { intervals: [10] }).toBe(true);
    await pause(120);
    if (moment === "before anything is written") await server.kill();
    await db.rollback();
    const until = moment === "as soon as it is committed" ? Date.now() + 10_000 : 0;
    while (Date.now() < until && (await head()) === before);
    if (typeof moment === "number") await pause(moment);
    await server.kill();
    return answer;
  });
}

/** The claim of the key is committed ahead of the change; a little later the change stands at the lock. */
async function isClaimed(key: string): Promise<boolean> {
  return asAdmin(async (db) => (await db.query<unknown[]>("SELECT 1 FROM idempotency_keys WHERE idempotency_key = ?", [key])).length > 0);
}

/** After the restart the same request gives its answer, twice the same one. */
async function repeated(change: () => Promise<Answer>): Promise<Answer> {
  await server.start();
  const first = await change();
  expect(first.status, first.bytes.toString("utf8")).toBe(201);
  const second = await change();
  expect(second.bytes.equals(first.bytes)).toBe(true);
  return first;
}

const timesLogged = async (driveId: string, action: string) => (await custodyOf(mira, driveId)).filter((entry) => entry.action === action).length;
const newKey = () => ({ "idempotency-key": crypto.randomUUID() });

for (const moment of MOMENTS) {
  test(`an upload is neither lost nor doubled: kill -9 ${nameOf(moment)}`, async () => {
    const pair = await makePair(mira, { customer: "Killed in an upload", sizeBytes: 524_288 });
    const bytes = randomImage(524_288);
    const headers = newKey();
    const change = () => upload(mira, pair.chipId, {}, [{ bytes }], { headers, base: server.base });
    const status = await killedAt(moment, pair.driveId, headers["idempotency-key"], change);
    const held = (await chipOf(mira, pair.chipId)).reads;
    if (status !== null) expect([status, held.length]).toEqual([201, 1]);
    if (moment === "before anything is written") expect(held).toEqual([]);
    const [read] = (await repeated(change)).json<Stored>().reads;
    const { reads } = await chipOf(mira, pair.chipId);
    expect(reads.map((one) => [one.id, one.sha256, one.number])).toEqual([[read.id, sha256Of(bytes), 1]]);
    if (held.length > 0) expect(held[0].id).toBe(read.id);
    expect(await timesLogged(pair.driveId, "read.stored")).toBe(1);
  });

  test(`an approval is neither lost nor doubled: kill -9 ${nameOf(moment)}`, async () => {
    const chip = await makeReady(mira, { customer: "Killed in an approval", sizeBytes: 4096 });
    const headers = newKey();
    const change = () => approve(ines, chip, chip.sha256, { headers, base: server.base });
    const status = await killedAt(moment, chip.driveId, headers["idempotency-key"], change);
    const held = (await chipOf(mira, chip.chipId)).approvals;
    if (status !== null) expect([status, held.length]).toEqual([201, 1]);
    const { id } = (await repeated(change)).json<{ id: string }>();
    const after = await chipOf(mira, chip.chipId);
    expect([after.state, after.approvals.map((one) => one.id)]).toEqual(["approved", [id]]);
    expect(await timesLogged(chip.driveId, "approval.given")).toBe(1);
    expect(await timesLogged(chip.driveId, "approval.refused")).toBe(0);
  });

  test(`a transfer is neither lost nor doubled: kill -9 ${nameOf(moment)}`, async () => {
    const chip = await makeReady(mira, { customer: "Killed in a transfer", sizeBytes: 4096 });
    const { id: approvalId } = (await approve(ines, chip, chip.sha256)).json<{ id: string }>();
    const headers = newKey();
    const json = { kind: "write", donorChipId: chip.donorChipId, programmer: "R2" };
    const change = () => call("POST", `/api/approvals/${approvalId}/transfer`, { token: mira, json, headers, base: server.base });
    const status = await killedAt(moment, chip.driveId, headers["idempotency-key"], change);
    const held = (await chipOf(mira, chip.chipId)).transfers;
    if (status !== null) expect([status, held.length]).toEqual([201, 1]);
    const { id } = (await repeated(change)).json<{ id: string }>();
    const after = await chipOf(mira, chip.chipId);
    expect([after.state, after.transfers.map((one) => one.id)]).toEqual(["written", [id]]);
    expect(await timesLogged(chip.driveId, "transfer.recorded")).toBe(1);
  });
}

for (const part of [0.01, 0.5, 0.999]) {
  test(`an upload of which ${part * 100} % had arrived leaves no read behind, and goes through when sent again`, async () => {
    const sizeBytes = 4 * 1024 * 1024;
    const pair = await makePair(mira, { customer: "Killed while bytes came in", sizeBytes });
    const image = randomImage(sizeBytes);
    const headers = newKey();
    const boundary = "bench-41d7";
    const field = (name: string, value: string) => `--${boundary}\r\ncontent-disposition: form-data; name="${name}"\r\n\r\n${value}\r\n`;
    const body = Buffer.concat([
      Buffer.from(`${field("stage", "before")}${field("seating", "1")}${field("reader", "R2")}--${boundary}\r\ncontent-disposition: form-data; name="file"; filename="read1.bin"\r\n\r\n`),
      image, Buffer.from(`\r\n--${boundary}--\r\n`),
    ]);
    const request = httpRequest(`${server.base}/api/chips/${pair.chipId}/reads`, {
      method: "POST", headers: { ...headers, authorization: `Bearer ${mira}`, "content-type": `multipart/form-data; boundary=${boundary}`, "content-length": body.length },
    });
    const gone = new Promise<void>((resolve) => request.on("error", () => resolve()));
    await new Promise<void>((resolve) => request.write(body.subarray(0, Math.max(1, Math.floor(body.length * part))), () => resolve()));
    await pause(120);
    await server.kill();
    await gone;
    expect((await chipOf(mira, pair.chipId)).reads).toEqual([]);
    await repeated(() => upload(mira, pair.chipId, {}, [{ bytes: image }], { headers, base: server.base }));
    const { reads } = await chipOf(mira, pair.chipId);
    expect(reads.map((read) => read.sha256)).toEqual([sha256Of(image)]);
    expect(await timesLogged(pair.driveId, "read.stored")).toBe(1);
  });
}

test("after all that every log, every signature and every stored image is as written down", async () => {
  const report = await checkStore();
  expect(report.damage).toEqual([]);
  expect(report.notChecked).toEqual([]);
  expect([report.code, report.clean]).toEqual([0, true]);
});
