import { execFile } from "node:child_process";
import { randomUUID } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { promisify } from "node:util";
import { afterAll, describe, expect, it, vi } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { changeKey } from "@/lib/commands/change-key";
import { makeBundle } from "@/lib/commands/make-bundle";
import { makeComposite } from "@/lib/commands/make-composite";
import { recordDrive } from "@/lib/commands/record-drive";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { fromImage } from "@/lib/core/text-format";
import type { Actor } from "@/lib/core/words";
import { logKey } from "@/storage";
import { firmware, makeChip, makeReady, makeUser, sha256, store } from "../support/factory";
import { withoutTriggers } from "../support/tamper";
import { faultsOf, runCheckScript, stateOfStep, verifyZip } from "../support/verify-bag";

vi.setConfig({ testTimeout: 120_000 });
const run = promisify(execFile);
const work = mkdtempSync(path.join(os.tmpdir(), "twinread-bundle-verify-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

/** The bundle as it leaves, by the page's check and by its own check.sh. */
async function bothOn(actor: Actor, chip: { caseId: string; ref: string }, key: string | null = null) {
  const chunks: Buffer[] = [];
  for await (const chunk of (await makeBundle(actor, chip.caseId)).stream) chunks.push(chunk as Buffer);
  const zip = Buffer.concat(chunks);
  const folder = mkdtempSync(path.join(work, "bag-"));
  writeFileSync(path.join(folder, "bundle.zip"), zip);
  await run("unzip", ["-q", path.join(folder, "bundle.zip"), "-d", folder]);
  const bag = path.join(folder, `twinread-${chip.ref}`);
  const report = await verifyZip(zip, undefined, key);
  const script = runCheckScript(bag, ...(key === null ? [] : [key]));
  return { zip, bag, report, script, verdicts: [report.verdict === "in-order" ? 0 : 1, script.status] };
}

const seed = randomUUID();

describe("a bundle of the app", () => {
  it("of one drive and of two is in order for page and script, seal and proof included", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const chip = await makeChip(technician);
    const image = firmware(`verify ${seed}`, 8192);
    await makeReady(technician, chip, image, firmware(`verify donor ${seed}`, 8192));
    const approval = await approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] });
    const one = await bothOn(lead, chip, logKey().keyId);
    expect([faultsOf(one.report), one.verdicts, one.script.text]).toEqual([[], [0, 0], one.script.text]);
    for (const key of ["seal", "proof", "fingerprint", "record"]) expect([key, stateOfStep(one.report, key)]).toEqual([key, "in-order"]);
    await recordDrive(technician, chip.caseId, { partNumber: "PN 4471-0093-C", serial: `SECOND-${Date.now()}` });
    await revokeApproval(lead, approval.id, { reason: "Wrong donor" });
    const two = await bothOn(lead, chip);
    expect([faultsOf(two.report), two.verdicts, two.script.text]).toEqual([[], [0, 0], two.script.text]);
    expect(two.report.facts.heads).toHaveLength(2);
  });

  it("with a composite and reads that came as texts is in order, and votes and texts are held to the log", async () => {
    const technician = await makeUser("technician");
    const lead = await makeUser("lead");
    const chip = await makeChip(technician);
    const image = firmware(`voted ${seed}`, 8192);
    for (const [i, seating] of [1, 1, 2].entries()) {
      const read = Buffer.from(image);
      read[1000 + 700 * i] ^= 1;
      await store(technician, chip.chipId, "before", read, seating);
    }
    for (const format of ["intel-hex", "s-record"] as const) {
      await store(technician, chip.donorChipId, "donor", fromImage(format, firmware(`${format} ${seed}`, 8192), { base: 0 }), 1, { format, base: 0, size: 8192, fill: 0xff }, "read.txt");
    }
    await makeComposite(lead, chip.chipId, { reads: [1, 2, 3], reason: "Single bits differ, each in one read only" });
    const { report, script, verdicts, bag } = await bothOn(lead, chip);
    expect([faultsOf(report), verdicts, script.text]).toEqual([[], [0, 0], script.text]);
    const list = readFileSync(path.join(bag, "manifest-sha256.txt"), "utf8");
    for (const ending of ["-votes.json", ".hex", ".srec"]) expect(list).toContain(ending);
  });

  it("after a change of the log key is in order, and the former key's fingerprint no longer fits", async () => {
    const [admin, technician, lead] = [await makeUser("admin"), await makeUser("technician"), await makeUser("lead")];
    const chip = await makeChip(technician);
    const former = logKey().keyId;
    await changeKey(admin, { purpose: "log", reason: 'The "old" disk left the house' });
    await store(technician, chip.chipId, "before", firmware(`after ${seed}`, 8192));
    const now = await bothOn(lead, chip, logKey().keyId);
    expect([faultsOf(now.report), now.verdicts, now.script.text]).toEqual([[], [0, 0], now.script.text]);
    const then = await bothOn(lead, chip, former);
    expect(then.verdicts).toEqual([1, 1]);
    expect(then.report.sentence).toContain("a key that was replaced");
  });

  it("whose log's head had been turned back says so to both", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const chip = await makeChip(technician);
    await withoutTriggers(["custody_heads"], (db) => db.query("UPDATE custody_heads SET seq = seq - 1, hash = (SELECT hash FROM custody_entries e WHERE e.chain_id = custody_heads.chain_id AND e.seq = custody_heads.seq - 1) WHERE chain_id = ?", [chip.driveId]));
    const { report, script, verdicts } = await bothOn(lead, chip);
    expect(verdicts).toEqual([1, 1]);
    expect(faultsOf(report).join("\n")).toContain("turned back");
    expect(script.text).toContain("turned back");
  });
});
