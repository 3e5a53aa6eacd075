import { describe, expect, it } from "vitest";
import { AppError } from "@/lib/errors";
import { checkCustody } from "@/lib/queries/custody";
import { flipped, logged, view } from "../support/bench-steps";
import { approve, freshImage, makeChip, makeReadyBench, makeUser, sha256, stateOf, store } from "../support/factory";

/** What each of several simultaneous commands came to: "done" or the status of its refusal. */
async function outcomes(runs: Promise<unknown>[]): Promise<(number | "done")[]> {
  return (await Promise.allSettled(runs)).map((result) => {
    if (result.status === "fulfilled") return "done";
    if (result.reason instanceof AppError) return result.reason.status;
    throw result.reason;
  });
}

describe("at the same moment", () => {
  it("an approval and a differing read never both stand", async () => {
    for (let round = 1; round <= 10; round += 1) {
      const bench = await makeReadyBench();
      const [approval, read] = await outcomes([
        approve(bench.lead, bench.chip, bench.image),
        store(bench.technician, bench.chip.chipId, "before", flipped(bench.image), 3),
      ]);
      expect(read).toBe("done");
      expect(["done", 409]).toContain(approval);
      const { approval: standing, approvals, state } = await view(bench);
      expect(standing, `round ${round}`).toBeNull();
      expect(state.state).toBe("reads-disagree");
      if (approval === "done") expect(approvals.at(-1)?.revoked).toMatchObject({ cause: "differing-read" });
      expect((await checkCustody(bench.chip.driveId)).findings).toEqual([]);
    }
  }, 120_000);

  it("an approval and a read by the approver never both stand", async () => {
    for (let round = 1; round <= 5; round += 1) {
      const bench = await makeReadyBench();
      await outcomes([
        approve(bench.lead, bench.chip, bench.image),
        store(bench.lead, bench.chip.chipId, "before", bench.image, 3),
      ]);
      expect((await view(bench)).approval, `round ${round}`).toBeNull();
      expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("ready");
    }
  }, 60_000);

  it("24 equal reads on one drive make one chain without a gap", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const image = freshImage();
    const stored = await Promise.all(Array.from({ length: 24 }, (_, i) => store(technician, chip.chipId, "before", image, 1 + (i % 3))));
    expect(stored.map((s) => s.reads[0].number).sort((a, b) => a - b)).toEqual(Array.from({ length: 24 }, (_, i) => i + 1));
    await expectWholeChain(chip.driveId, 24);
    expect(await stateOf(technician, chip.chipId)).toBe("ready");
  }, 60_000);

  it("24 reads that all differ are all stored, and none waits for another for good", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const images = Array.from({ length: 24 }, () => freshImage());
    const started = performance.now();
    await Promise.all(images.map((image) => store(technician, chip.chipId, "before", image)));
    expect(performance.now() - started).toBeLessThan(30_000);
    await expectWholeChain(chip.driveId, 24);
    const { state, reads } = await view({ technician, chip });
    expect(state.state).toBe("reads-disagree");
    expect(reads.map((r) => r.sha256).sort()).toEqual(images.map(sha256).sort());
  }, 120_000);

  it("one image stored on 6 drives is found on all the others", async () => {
    const technician = await makeUser("technician");
    const chips = await Promise.all(Array.from({ length: 6 }, () => makeChip(technician)));
    const image = freshImage();
    await Promise.all(chips.map((chip) => store(technician, chip.chipId, "before", image)));
    for (const chip of chips) {
      expect((await view({ technician, chip })).reads[0].findings).toMatchObject([{ code: "other-drive", severity: "blocks" }]);
      expect((await checkCustody(chip.driveId)).findings).toEqual([]);
    }
  }, 60_000);
});

async function expectWholeChain(driveId: string, reads: number): Promise<void> {
  const check = await checkCustody(driveId);
  expect(check.findings).toEqual([]);
  expect(check.head.seq).toBe(check.entries);
  expect((await logged(driveId, "read.stored")).map((f) => (f.read as { number: number }).number)).toEqual(Array.from({ length: reads }, (_, i) => i + 1));
}
