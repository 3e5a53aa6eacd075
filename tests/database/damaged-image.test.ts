import { chmodSync, lstatSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, symlinkSync, truncateSync, writeFileSync } from "node:fs";
import path from "node:path";
import { buffer } from "node:stream/consumers";
import { Op } from "sequelize";
import { afterEach, describe, expect, it } from "vitest";
import { openHandedOut } from "@/lib/commands/hand-out-image";
import { makeBundle } from "@/lib/commands/make-bundle";
import { makeComposite } from "@/lib/commands/make-composite";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { reportImage, requireSoundImage } from "@/lib/commands/report-image";
import { chipStrips } from "@/lib/queries/chip-view";
import { comparedReads, comparison } from "@/lib/queries/compare";
import { findInRead, readBytes } from "@/lib/queries/read-bytes";
import { ComparisonRow, Mail, Read } from "@/models";
import { verifiedStream } from "@/storage";
import { logged, readNamed, refusal, view } from "../support/bench-steps";
import { approve, type Bench, freshImage, lastEntry, logOf, makeApprovedBench, makeChip, makeReady, makeReadyBench, makeUser, sha256, stateOf, store } from "../support/factory";
import { damageImage, imageFile, loseImage } from "../support/tamper";

/** What may lie under an image's name and is not the image. */
const INSTEAD: Record<string, (file: string, image: Buffer) => void> = {
  "a file cut to nothing": (file) => {
    chmodSync(file, 0o640);
    truncateSync(file, 0);
  },
  "a folder": (file) => {
    rmSync(file);
    mkdirSync(file);
  },
  "a link to the very bytes somewhere else": (file, image) => {
    rmSync(file);
    writeFileSync(`${file}.elsewhere`, image);
    symlinkSync(`${file}.elsewhere`, file);
  },
};

function asideOf(digest: string): string[] {
  const folder = path.join(process.env.TWINREAD_DATA ?? "", "images", "damaged");
  return readdirSync(folder).filter((name) => name.startsWith(digest)).map((name) => path.join(folder, name));
}

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

  it("gives its place to the right bytes when the chip is read again, and is put aside, not deleted", async () => {
    const bench = await makeApprovedBench();
    const digest = sha256(bench.image);
    harm.damaged(digest);
    const wrong = readFileSync(imageFile(digest));
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
    expect(readFileSync(imageFile(digest)).equals(bench.image)).toBe(true);
    const aside = asideOf(digest);
    expect(aside).toHaveLength(1);
    expect(readFileSync(aside[0]).equals(wrong)).toBe(true);
    expect((await logOf(bench.chip.driveId)).map((entry) => entry.action).filter((action) => /found|revoked|second/.test(action))).toEqual(["image.found-damaged", "approval.revoked", "image.found-sound"]);
    expect(await lastEntry(bench.chip.driveId, "image.found-damaged")).toEqual({ sha256: digest, state: "damaged", where: "upload" });
    expect((await view(bench)).reads.filter((r) => r.stage === "before" && r.imageSound)).toHaveLength(4);
    await approve(bench.lead, bench.chip, bench.image);
  });

  for (const [what, put] of Object.entries(INSTEAD)) {
    it(`gives its place to the right bytes when there is ${what} instead`, async () => {
      const bench = await makeReadyBench();
      const digest = sha256(bench.image);
      put(imageFile(digest), bench.image);
      await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
      expect(lstatSync(imageFile(digest)).isFile()).toBe(true);
      expect(readFileSync(imageFile(digest)).equals(bench.image)).toBe(true);
      expect(asideOf(digest)).toHaveLength(1);
      expect(await logged(bench.chip.driveId, "image.found-sound")).toEqual([{ sha256: digest, where: "upload" }]);
    });
  }

  it("is refused by every way that opens it, before anybody has noticed, and no wrong byte is shown", async () => {
    const approvals = new Map<string, string>();
    const approvalOf = (bench: Bench) => Promise.resolve(approvals.get(bench.chip.chipId)!);
    const ways: Record<string, (bench: Bench) => Promise<unknown>> = {
      "its bytes": async (bench) => readBytes(bench.technician, (await readNamed(bench, "before", 1)).id, { offset: 0, length: 16 }),
      "a search in it": async (bench) => findInRead(bench.technician, (await readNamed(bench, "before", 1)).id, { text: "A", from: 0, way: "next" }),
      comparison: (bench) => comparison(bench.technician, bench.chip.chipId, { reads: [1, 4], stage: "before" }),
      "compare page": (bench) => comparedReads(bench.technician, bench.chip.chipId, { reads: [1, 4], stage: "before" }),
      "hand-out": async (bench) => openHandedOut(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "To look at it." }),
      "hand-out as text": async (bench) => openHandedOut(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "To look at it.", format: "intel-hex" }),
      approval: (bench) => approve(bench.lead, bench.chip, bench.image),
      composite: (bench) => makeComposite(bench.lead, bench.chip.chipId, { reads: [1, 2, 4], reason: "Three reads." }),
      transfer: async (bench) => recordTransfer(bench.technician, await approvalOf(bench), { kind: "write", donorChipId: bench.chip.donorChipId }),
      bundle: (bench) => makeBundle(bench.lead, bench.chip.caseId),
    };
    for (const [way, ask] of Object.entries(ways)) {
      const bench = await makeReadyBench();
      approvals.set(bench.chip.chipId, way === "transfer" ? (await approve(bench.lead, bench.chip, bench.image)).id : "");
      if (way !== "transfer") await store(bench.technician, bench.chip.chipId, "before", freshImage(), 3);
      // strips and comparisons that were made before are in memory and on record: they do not help
      await view(bench);
      harm.damaged(sha256(bench.image));
      expect([way, await refusal(ask(bench))]).toEqual([way, expect.objectContaining({ status: 409, detail: expect.stringContaining("no longer matches its digest") as string })]);
      expect(await logged(bench.chip.driveId, "image.found-damaged")).toHaveLength(1);
      const { rows } = await chipStrips(bench.technician, bench.chip.chipId, { offset: 0, length: 8192 });
      expect(rows.filter((row) => row.name !== "Read 4").every((row) => /^n+$/.test(row.cells))).toBe(true);
    }
  });

  it("is not drawn and gets no comparison kept under its digest when it comes into a judgement unnoticed", async () => {
    const bench = await makeReadyBench();
    const digest = sha256(bench.image);
    harm.damaged(digest);
    const odd = freshImage();
    const { reads: [read] } = await store(bench.technician, bench.chip.chipId, "before", odd, 3);
    expect(read.number).toBe(4);
    const [wrong, right] = [Buffer.from(digest, "hex"), Buffer.from(read.sha256, "hex")];
    expect(await ComparisonRow.count({ where: { [Op.or]: [{ sha256A: wrong, sha256B: right }, { sha256A: right, sha256B: wrong }] } })).toBe(0);
    // written down once the lock was free
    await expect.poll(() => logged(bench.chip.driveId, "image.found-damaged")).toHaveLength(1);
  });

  it("is not drawn, and is drawn again once it is whole again", async () => {
    const bench = await makeReadyBench();
    harm.damaged(sha256(bench.image));
    const cells = async () => (await chipStrips(bench.technician, bench.chip.chipId, { offset: 1024, length: 2048 })).rows.map((row) => row.cells);
    expect((await cells()).every((row) => /^n+$/.test(row))).toBe(true);
    await expect.poll(() => logged(bench.chip.driveId, "image.found-damaged")).toHaveLength(1);
    undo.pop()?.();
    await requireSoundImage(sha256(bench.image), bench.image.length, "restore");
    expect((await cells()).every((row) => !row.includes("n"))).toBe(true);
  });

  it("only while it is read the first time brings down nothing: the second look is in the log", async () => {
    const bench = await makeApprovedBench();
    expect(await reportImage(sha256(bench.image), "damaged", "hand-out", { pauseMs: 0 })).toBe("sound");
    expect(await logged(bench.chip.driveId, "image.second-look")).toEqual([{ sha256: sha256(bench.image), where: "hand-out" }]);
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([]);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
  });

  it("together with all others, because their disk is away, is no image's fault", async () => {
    const bench = await makeApprovedBench();
    const folder = path.join(process.env.TWINREAD_DATA ?? "", "images", "sha256");
    renameSync(folder, `${folder}-away`);
    undo.push(() => renameSync(`${folder}-away`, folder));
    const { id } = (await Read.findOne({ where: { chipId: bench.chip.chipId } }))!;
    expect(await refusal(openHandedOut(bench.technician, id, {}))).toMatchObject({ status: 503, detail: expect.stringContaining("missing or empty") as string });
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([]);
  });

  it("is told of to the active leads and admins, once, with what it is kept as and what to do", async () => {
    const bench = await makeApprovedBench();
    const admin = await makeUser("admin");
    harm.damaged(sha256(bench.image));
    for (let i = 0; i < 2; i += 1) await refusal(openHandedOut(bench.technician, (await readNamed(bench, "before", 1)).id, {}));
    for (const { email } of [bench.lead, admin]) {
      const mails = await Mail.findAll({ where: { recipient: email, subject: { [Op.like]: "A stored image%" } } });
      expect(mails).toHaveLength(1);
      expect(mails[0].textMasked).toContain(sha256(bench.image));
      expect(mails[0].textMasked).toContain(`Case ${bench.chip.ref}, Drive A, Orig U12, Read 2`);
      expect(mails[0].textMasked).toContain("The approval that stood on it fell.");
      expect(mails[0].textMasked).not.toContain("Lindmoor");
    }
    expect(await Mail.count({ where: { recipient: bench.technician.email } })).toBe(0);
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
