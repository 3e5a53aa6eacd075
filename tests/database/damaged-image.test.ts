import { buffer } from "node:stream/consumers";
import { afterEach, describe, expect, it } from "vitest";
import { openHandedOut } from "@/lib/commands/hand-out-image";
import { verifiedStream } from "@/storage";
import { logged, readNamed, refusal, view } from "../support/bench-steps";
import { approve, freshImage, lastEntry, makeApprovedBench, makeChip, makeReady, makeReadyBench, makeUser, sha256, stateOf, store } from "../support/factory";
import { damageImage, loseImage } from "../support/tamper";

/** What a test did to the store is undone, as by a backup. */
const undo: (() => void)[] = [];
afterEach(() => undo.splice(0).forEach((put) => put()));
const harm = { damaged: (digest: string) => undo.push(damageImage(digest)), missing: (digest: string) => undo.push(loseImage(digest)) };

for (const state of ["damaged", "missing"] as const) {
  describe(`a stored image that is ${state}`, () => {
    it("is not handed out; the log says so and the approval falls", async () => {
      const bench = await makeApprovedBench();
      const { id } = await readNamed(bench, "before", 1);
      harm[state](sha256(bench.image));
      const said = await refusal(openHandedOut(bench.technician, id, {}));
      expect(said).toMatchObject({ status: 409, detail: expect.stringMatching(new RegExp(`is ${state}: it no longer matches its digest\\. Nothing was done with it\\.`)) as string });
      expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([{ sha256: sha256(bench.image), state, where: "hand-out" }]);
      expect(await logged(bench.chip.driveId, "image.handed-out")).toEqual([]);
      expect(await lastEntry(bench.chip.driveId, "approval.revoked")).toMatchObject({ cause: "image-damaged", reason: `The stored image is ${state}.` });
      const { approval, reads } = await view(bench);
      expect(approval).toBeNull();
      expect(reads.filter((r) => !r.imageSound).map((r) => `${r.stage} ${r.number}`)).toEqual(["before 1", "before 2", "before 3"]);
    });

    it("is written down once, however often it is asked for", async () => {
      const bench = await makeReadyBench();
      const { id } = await readNamed(bench, "before", 1);
      harm[state](sha256(bench.image));
      for (let i = 0; i < 3; i += 1) expect(await refusal(openHandedOut(bench.lead, id, { reason: "To look at it at home." }))).toMatchObject({ status: 409 });
      expect(await logged(bench.chip.driveId, "image.found-damaged")).toHaveLength(1);
    });

    it("stands in the log of every drive that has it, and takes nothing else down", async () => {
      const [bench, other] = [await makeApprovedBench(), await makeApprovedBench()];
      const elsewhere = await makeChip(bench.technician);
      await store(bench.technician, elsewhere.chipId, "before", bench.image);
      harm[state](sha256(bench.image));
      await refusal(openHandedOut(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "To look at it at home." }));
      expect(await logged(elsewhere.driveId, "image.found-damaged")).toHaveLength(1);
      expect(await logged(other.chip.driveId, "image.found-damaged")).toEqual([]);
      expect(await stateOf(other.technician, other.chip.chipId)).toBe("approved");
      const { stream } = await openHandedOut(other.technician, (await readNamed(other, "before", 1)).id, {});
      expect(sha256(await buffer(stream))).toBe(sha256(other.image));
    });

    it("keeps no other read out, equal reads of a sound image neither", async () => {
      const bench = await makeReadyBench();
      harm[state](sha256(bench.image));
      await refusal(approve(bench.lead, bench.chip, bench.image));
      const { reads: [next] } = await store(bench.technician, bench.chip.chipId, "before", freshImage(), 3);
      expect(next.number).toBe(4);
      expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("reads-disagree");
      const chip = await makeChip(await makeUser("technician"));
      await store(bench.technician, chip.chipId, "before", freshImage());
      expect(await stateOf(bench.technician, chip.chipId)).toBe("needs-reads");
    });

    it("bars the approval when it is the donor's own content, which the write would destroy", async () => {
      const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
      const [chip, image, own] = [await makeChip(technician), freshImage(), freshImage()];
      await makeReady(technician, chip, image, own);
      harm[state](sha256(own));
      expect(await refusal(approve(lead, chip, image))).toMatchObject({ status: 409, detail: expect.stringContaining(`is ${state}`) as string });
      const { approval, conditions } = await view({ technician, chip });
      expect(approval).toBeNull();
      expect(conditions.find((c) => c.key === "donor-saved")).toMatchObject({ state: "open", value: "0 of 2" });
      undo.pop()?.();
      await approve(lead, chip, image);
      expect(await stateOf(technician, chip.chipId)).toBe("approved");
    });

    it("can be cleared again once a backup has put it back", async () => {
      const bench = await makeApprovedBench();
      const { id } = await readNamed(bench, "before", 1);
      harm[state](sha256(bench.image));
      await refusal(openHandedOut(bench.technician, id, {}));
      undo.pop()?.();
      await approve(bench.lead, bench.chip, bench.image);
      expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
      expect((await view(bench)).reads.every((r) => r.imageSound)).toBe(true);
      expect(await lastEntry(bench.chip.driveId, "image.found-sound")).toEqual({ sha256: sha256(bench.image), where: "approval" });
    });
  });
}

describe("a stored image that changes", () => {
  it("while it flows out breaks the stream before its end", async () => {
    const bench = await makeReadyBench();
    const digest = sha256(bench.image);
    harm.damaged(digest);
    await expect(buffer(verifiedStream(digest))).rejects.toThrow("does not match its digest");
  });

  it("keeps an equal read out while it is damaged, with nothing stored", async () => {
    const bench = await makeReadyBench();
    harm.damaged(sha256(bench.image));
    const said = await refusal(store(bench.technician, bench.chip.chipId, "before", bench.image, 3));
    expect(said).toMatchObject({ status: 503, detail: "The store already holds this image but its bytes are damaged. Tell the lead; nothing was stored." });
    expect((await view(bench)).reads.filter((r) => r.stage === "before")).toHaveLength(3);
  });

  it("is back when the chip is read again after it was lost", async () => {
    const bench = await makeApprovedBench();
    const { id } = await readNamed(bench, "before", 1);
    harm.missing(sha256(bench.image));
    await refusal(openHandedOut(bench.technician, id, {}));
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
    expect(await lastEntry(bench.chip.driveId, "image.found-sound")).toEqual({ sha256: sha256(bench.image), where: "upload" });
    await approve(bench.lead, bench.chip, bench.image);
    const { stream } = await openHandedOut(bench.technician, id, {});
    expect(sha256(await buffer(stream))).toBe(sha256(bench.image));
  });
});
