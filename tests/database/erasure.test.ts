import { existsSync, mkdirSync, readdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { beforeAll, describe, expect, it, vi } from "vitest";
import { addPhotos } from "@/lib/commands/add-photos";
import { approveImage } from "@/lib/commands/approve-image";
import { closeCase } from "@/lib/commands/close-case";
import { eraseImages } from "@/lib/commands/erase-images";
import { finishErasures } from "@/lib/commands/erased-image";
import { openHandedOut } from "@/lib/commands/hand-out-image";
import { keepLonger } from "@/lib/commands/keep-longer";
import { openOriginal, openReduced } from "@/lib/commands/photo-open";
import { reopenCase } from "@/lib/commands/reopen-case";
import { returnCase } from "@/lib/commands/return-case";
import { scrubNextDrive } from "@/lib/commands/scrub-round";
import { withCheck } from "@/lib/core/case-number";
import { env } from "@/lib/env";
import { auditImages, imageCounts } from "@/lib/queries/audit-images";
import { comparison } from "@/lib/queries/compare";
import { readBytes } from "@/lib/queries/read-bytes";
import { findDigest } from "@/lib/queries/find";
import { photosOf } from "@/lib/queries/photos";
import { auditInput } from "@/lib/schemas/audit";
import { checkStore } from "@/scripts/check/store";
import { Case, Erasure, Image, Mail } from "@/models";
import { imagePath } from "@/storage/paths";
import { logged, makeWrittenBench, readNamed, refusal, view } from "../support/bench-steps";
import { emptyHouse } from "../support/empty-house";
import { type Bench, logOf, makeChip, makeUser, sha256, stateOf, store } from "../support/factory";
import { arrivedPhoto } from "../support/photos";
import { picture } from "../support/pictures";
import { asAdmin, changeBody } from "../support/tamper";

vi.setConfig({ testTimeout: 120_000 });

const DAYS = 100;
/** The same, on a later day: everybody's clock but the database's. */
async function later<T>(run: () => Promise<T>, days = DAYS): Promise<T> {
  vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + days * 86_400_000 });
  try {
    return await run();
  } finally {
    vi.useRealTimers();
  }
}
const fileOf = (image: Uint8Array) => imagePath(env().dataDir, sha256(image));
const rowOf = async (image: Uint8Array) => (await Image.findByPk(Buffer.from(sha256(image), "hex")))!;
const REASON = "Its day has come.";
const typed = (bench: Pick<Bench, "chip">) => ({ caseRef: bench.chip.ref, reason: REASON });

/** Read, approved, written, read back, gone back and closed. */
async function makeClosed(): Promise<Bench> {
  const bench = await makeWrittenBench();
  for (const seating of [1, 2]) await store(bench.technician, bench.chip.donorChipId, "after", bench.image, seating);
  await returnCase(bench.technician, bench.chip.caseId, { items: ["Drive A"], toPerson: "Lindmoor Veterinary Practice" });
  await closeCase(bench.lead, bench.chip.caseId, { kind: "returned" });
  return bench;
}
const erase = (bench: Bench, more: Parameters<typeof eraseImages>[3] = {}) => later(() => eraseImages(bench.lead, bench.chip.caseId, typed(bench), more));
const damageNow = async () => (await checkStore()).damage.map(({ problem }) => problem);

describe("an erasure is refused", () => {
  let bench: Bench;
  beforeAll(async () => {
    bench = await makeClosed();
  }, 60_000);

  it("to a technician and an auditor", async () => {
    for (const role of ["technician", "auditor"] as const) {
      expect(await refusal(eraseImages(await makeUser(role), bench.chip.caseId, typed(bench)))).toMatchObject({ status: 403 });
    }
  });

  it("before its day, while the customer did not ask", async () => {
    expect(await refusal(eraseImages(bench.lead, bench.chip.caseId, typed(bench)))).toMatchObject({ status: 409, detail: expect.stringContaining("are due for erasure on") });
    expect(await refusal(later(() => eraseImages(bench.lead, bench.chip.caseId, typed(bench)), 89))).toMatchObject({ status: 409 });
  });

  it("under another case's number, and under one whose check character is wrong", async () => {
    const other = await makeChip(bench.technician);
    expect(await refusal(later(() => eraseImages(bench.lead, bench.chip.caseId, { caseRef: other.ref, reason: REASON })))).toMatchObject({ status: 422, detail: expect.stringContaining(`this is case ${bench.chip.ref}`) });
    const wrong = withCheck(bench.chip.ref).slice(0, -1) + (withCheck(bench.chip.ref).endsWith("A") ? "B" : "A");
    expect(await refusal(later(() => eraseImages(bench.lead, bench.chip.caseId, { caseRef: wrong, reason: REASON })))).toMatchObject({ status: 422 });
  });

  it("while the case is kept longer, until that keeping ends", async () => {
    const until = "2099-01-01";
    await keepLonger(bench.lead, bench.chip.caseId, { until, reason: "A claim is pending." });
    expect(await refusal(erase(bench))).toMatchObject({ status: 409, detail: expect.stringContaining("kept until 1 January 2099: A claim is pending.") });
    await keepLonger(bench.lead, bench.chip.caseId, { until: null, reason: "Settled." });
    expect((await logged(bench.chip.driveId, "case.kept-longer")).map((facts) => facts.until)).toEqual([until, null]);
    expect(await refusal(keepLonger(bench.lead, bench.chip.caseId, { until: "2020-01-01", reason: "Too early." }))).toMatchObject({ status: 422 });
    expect(await refusal(keepLonger(bench.technician, bench.chip.caseId, { until, reason: "Not mine." }))).toMatchObject({ status: 403 });
  });

  it("while the case is open", async () => {
    await reopenCase(bench.lead, bench.chip.caseId, { reason: "One more look." });
    expect(await refusal(erase(bench))).toMatchObject({ status: 409, detail: expect.stringContaining("is open") });
    expect(await refusal(keepLonger(bench.lead, bench.chip.caseId, { until: "2099-01-01", reason: "Open." }))).toMatchObject({ status: 409 });
    await closeCase(bench.lead, bench.chip.caseId, { kind: "returned" });
  });

  it("while its log does not check out", async () => {
    await changeBody(bench.chip.driveId, 3, (body) => {
      body[60] ^= 1;
      return body;
    });
    expect(await refusal(erase(bench))).toMatchObject({ status: 409, detail: expect.stringContaining("doesn’t check out") });
  });

  it("and leaves every byte where it was", async () => {
    expect((await rowOf(bench.image)).state).toBe("sound");
    expect(existsSync(fileOf(bench.image))).toBe(true);
    expect(await Erasure.count({ where: { caseId: bench.chip.caseId } })).toBe(0);
    expect(await logged(bench.chip.driveId, "image.erased")).toEqual([]);
  });
});

describe("an erased case", () => {
  let bench: Bench;
  let other: Bench;
  let photo: { id: string; bytes: Buffer };
  const donor = Buffer.alloc(8192, 0xff);
  beforeAll(async () => {
    await emptyHouse();
    bench = await makeWrittenBench();
    other = await makeClosed();
    const bytes = await picture({});
    const { photos: [added] } = await addPhotos(bench.technician, "chip", bench.chip.chipId, [await arrivedPhoto(bytes)]);
    photo = { id: added.id, bytes };
    await openReduced(bench.lead, photo.id, 400);
    for (const seating of [1, 2]) await store(bench.technician, bench.chip.donorChipId, "after", bench.image, seating);
    await returnCase(bench.technician, bench.chip.caseId, { items: ["Drive A"], toPerson: "Lindmoor Veterinary Practice" });
    await closeCase(bench.lead, bench.chip.caseId, { kind: "returned" });
    mkdirSync(path.join(env().dataDir, "images/damaged"), { recursive: true });
    writeFileSync(path.join(env().dataDir, "images/damaged", `${sha256(bench.image)}-put-aside`), "nearly the image");
    expect(await erase(bench)).toMatchObject({ cause: "due", images: 1, photos: 1, kept: 1 });
  }, 120_000);

  it("has lost the bytes, with the damaged and the reduced copies", async () => {
    expect([fileOf(bench.image), fileOf(photo.bytes)].map((file) => existsSync(file))).toEqual([false, false]);
    const digest = sha256(photo.bytes);
    expect(readdirSync(path.join(env().dataDir, "reduced", digest.slice(0, 2))).filter((name) => name.startsWith(digest))).toEqual([]);
    expect(readdirSync(path.join(env().dataDir, "images/damaged")).filter((name) => name.startsWith(sha256(bench.image)))).toEqual([]);
  });

  it("keeps what another case that isn't erased uses too, and names it", async () => {
    expect((await rowOf(donor)).state).toBe("sound");
    expect(existsSync(fileOf(donor))).toBe(true);
    const [entry] = await logged(bench.chip.driveId, "case.erased");
    expect(entry).toMatchObject({ images: 1, photos: 1, kept: [{ sha256: sha256(donor), names: [expect.stringContaining("Own 1"), expect.stringContaining("Own 2")] }] });
    expect(JSON.stringify(await logOf(bench.chip.driveId))).not.toContain(other.chip.ref);
  });

  it("has one signed entry an image that says who, why and what, and tells the customer", async () => {
    const entries = (await logOf(bench.chip.driveId)).filter((entry) => entry.action === "image.erased");
    expect(entries.map((entry) => entry.facts.sha256).sort()).toEqual([sha256(bench.image), sha256(photo.bytes)].sort());
    for (const { facts, actor } of entries) {
      expect(facts).toMatchObject({ cause: "due", reason: REASON, erasure: (await Erasure.findOne({ where: { caseId: bench.chip.caseId } }))!.id });
      expect(actor.id).toBe(bench.lead.id);
    }
    const mail = (await Mail.findAll()).find((one) => one.kind === "case-erased");
    expect(mail?.textMasked).toContain("1 image of chips, 1 photo or document");
  });

  it("says so wherever the image is met", async () => {
    const { lead, chip } = bench;
    const read = await readNamed(bench, "before", 1);
    expect(read).toMatchObject({ imageSound: false, erased: { cause: "due", text: expect.stringMatching(/^This image was erased on .*; its SHA-256 stays in the log\.$/) } });
    const erased = expect.stringContaining("This image was erased on");
    expect(await refusal(openHandedOut(lead, read.id, { reason: "A look." }))).toMatchObject({ status: 409, detail: erased });
    expect(await refusal(readBytes(lead, read.id, { offset: 0, length: 16 }))).toMatchObject({ status: 409, detail: erased });
    expect(await refusal(comparison(lead, chip.chipId, { reads: [1, 2], stage: "before" }))).toMatchObject({ status: 409, detail: erased });
    expect(await refusal(openOriginal(lead, photo.id))).toMatchObject({ status: 409, detail: erased });
    expect(await refusal(openReduced(lead, photo.id, 400))).toMatchObject({ status: 409, detail: erased });
    expect((await photosOf(lead, "chip", chip.chipId))[0]).toMatchObject({ sound: false, erased: { cause: "due" } });
    expect((await view(bench)).stack.rows.every((row) => !row.name.startsWith("Read"))).toBe(true);
  });

  it("still knows how its chip stood, and is found by its digest", async () => {
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("verified");
    const found = await findDigest(bench.technician, sha256(bench.image));
    expect(JSON.stringify(found)).toContain(bench.chip.ref);
  });

  it("can't have its image cleared again, even when it is opened once more", async () => {
    await reopenCase(bench.lead, bench.chip.caseId, { reason: "A question came." });
    expect(await refusal(approveImage(bench.lead, bench.chip.chipId, { sha256: sha256(bench.image), donorChipId: bench.chip.donorChipId, statement: "Again.", reasons: {}, lookedAt: [] }))).toMatchObject({ status: 409, detail: expect.stringContaining("was erased on") });
    await closeCase(bench.lead, bench.chip.caseId, { kind: "returned" });
  });

  it("counts as erased with the auditor, neither as missing nor as overdue", async () => {
    const auditor = await makeUser("auditor");
    expect(await imageCounts(auditor)).toMatchObject({ damaged: 0, missing: 0 });
    const list = await auditImages(auditor, auditInput.parse({ what: "erased" }));
    expect(list.items.map((row) => row.sha256).sort()).toEqual([sha256(bench.image), sha256(photo.bytes)].sort());
    expect(list.items[0].erasedAt).not.toBeNull();
    expect((await auditImages(auditor, auditInput.parse({ what: "not-sound" }))).total).toBe(0);
  });

  it("is left alone by the checking of stored images", async () => {
    await scrubNextDrive({ days: 0, bytesPerSecond: null, secondLookMs: 0 });
    expect((await rowOf(bench.image)).state).toBe("erased");
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([]);
  });

  it("is clean for check:store", async () => {
    const report = await checkStore();
    expect(report.damage).toEqual([]);
    expect(report.images.erased).toBe(2);
  });

  it("is not erased a second time", async () => {
    const [mails, entries] = [await Mail.count(), (await logOf(bench.chip.driveId)).length];
    // it was opened and closed since, and nothing of its own is stored: only what the other case uses, too
    await later(() => eraseImages(bench.lead, bench.chip.caseId, typed(bench)), DAYS * 2);
    expect(await refusal(later(() => eraseImages(bench.lead, bench.chip.caseId, typed(bench)), DAYS * 2))).toMatchObject({ status: 409, detail: expect.stringContaining("were erased on") });
    expect(await Mail.count()).toBe(mails);
    expect((await logOf(bench.chip.driveId)).length).toBe(entries + 1);
  });

  it("lets go of what it shared when the other case is erased, and both logs say so", async () => {
    await later(() => eraseImages(other.lead, other.chip.caseId, typed(other)), DAYS * 2);
    expect((await rowOf(donor)).state).toBe("erased");
    expect(existsSync(fileOf(donor))).toBe(false);
    for (const { chip } of [bench, other]) expect((await logged(chip.driveId, "image.erased")).map((facts) => facts.sha256)).toContain(sha256(donor));
    // what was typed about one case stays out of the other's log
    expect((await logged(bench.chip.driveId, "image.erased")).at(-1)!.reason).toContain("These bytes stayed for another case");
    expect(JSON.stringify(await logOf(bench.chip.driveId))).not.toContain(other.chip.ref);
    expect(await damageNow()).toEqual([]);
  });

  it("is stored again when the same bytes come once more, and every log says so", async () => {
    const next = await makeChip(bench.technician);
    await store(bench.technician, next.chipId, "before", bench.image);
    expect(await rowOf(bench.image)).toMatchObject({ state: "sound", erasedAt: null });
    expect(existsSync(fileOf(bench.image))).toBe(true);
    expect((await logged(bench.chip.driveId, "image.found-sound")).map((facts) => facts.sha256)).toEqual([sha256(bench.image)]);
    expect((await readNamed(bench, "before", 1)).imageSound).toBe(true);
    expect(await damageNow()).toEqual([]);
  });
});

describe("a crash", () => {
  const crash = (at: string) => (step: string) => {
    if (step === at) throw new Error("the server dies");
  };

  it("before the transaction ends leaves everything as it was", async () => {
    const bench = await makeClosed();
    await expect(erase(bench, { at: crash("entered") })).rejects.toThrow("the server dies");
    expect((await rowOf(bench.image)).state).toBe("sound");
    expect(existsSync(fileOf(bench.image))).toBe(true);
    expect(await logged(bench.chip.driveId, "image.erased")).toEqual([]);
  });

  it("between the entry and the file is finished at the next start, and twice is as good as once", async () => {
    const bench = await makeClosed();
    await expect(erase(bench, { at: crash("committed") })).rejects.toThrow("the server dies");
    expect((await rowOf(bench.image)).state).toBe("erased");
    expect(existsSync(fileOf(bench.image))).toBe(true);
    // still there, and shown to nobody
    const read = await readNamed(bench, "before", 1);
    expect(await refusal(openHandedOut(bench.lead, read.id, { reason: "A look." }))).toMatchObject({ detail: expect.stringContaining("was erased on") });
    expect(await damageNow()).toContain("image-left");
    expect(await finishErasures()).toBeGreaterThan(0);
    expect(existsSync(fileOf(bench.image))).toBe(false);
    expect(await finishErasures()).toBe(0);
  });

  it("is finished by the round that reads stored images again, too", async () => {
    const bench = await makeClosed();
    await expect(erase(bench, { at: crash("committed") })).rejects.toThrow("the server dies");
    await scrubNextDrive({ days: 7, bytesPerSecond: null, secondLookMs: 0 });
    expect(existsSync(fileOf(bench.image))).toBe(false);
  });

  it("takes no file away that somebody has put back since", async () => {
    const bench = await makeClosed();
    await expect(erase(bench, { at: crash("committed") })).rejects.toThrow("the server dies");
    await store(bench.technician, (await makeChip(bench.technician)).chipId, "before", bench.image);
    expect(await finishErasures()).toBe(0);
    expect(existsSync(fileOf(bench.image))).toBe(true);
    expect((await rowOf(bench.image)).state).toBe("sound");
  });
});

describe("at once", () => {
  it("two erase a case once", async () => {
    const bench = await makeClosed();
    const done = await later(() => Promise.allSettled([1, 2, 3].map(() => eraseImages(bench.lead, bench.chip.caseId, typed(bench)))));
    expect(done.filter((one) => one.status === "fulfilled")).toHaveLength(1);
    expect((await logged(bench.chip.driveId, "case.erased"))).toHaveLength(1);
    expect(await Erasure.count({ where: { caseId: bench.chip.caseId } })).toBe(1);
  });

  it("an upload that found the bytes stored is refused when they go before its row is written, and goes through when sent again", async () => {
    const bench = await makeClosed();
    const next = await makeChip(bench.technician);
    let upload: Promise<unknown> = Promise.resolve();
    await erase(bench, {
      at: async (step) => {
        if (step !== "entered") return;
        // it sees the image as stored, and waits for its row at the end
        upload = refusal(store(bench.technician, next.chipId, "before", bench.image));
        await new Promise((done) => setTimeout(done, 2_000));
      },
    });
    expect(await upload).toMatchObject({ status: 409, detail: expect.stringContaining("erased at this very moment") });
    const reads = async () => (await view({ technician: bench.technician, chip: next })).reads;
    expect(await reads()).toEqual([]);
    await store(bench.technician, next.chipId, "before", bench.image);
    expect([(await reads()).length, existsSync(fileOf(bench.image)), (await rowOf(bench.image)).state]).toEqual([1, true, "sound"]);
  });

  it("an upload of the same bytes either keeps them or is stored again: no read is without its image", async () => {
    for (let i = 0; i < 4; i += 1) {
      const bench = await makeClosed();
      const next = await makeChip(bench.technician);
      await later(() => Promise.allSettled([eraseImages(bench.lead, bench.chip.caseId, typed(bench)), store(bench.technician, next.chipId, "before", bench.image)]));
      const reads = (await view({ technician: bench.technician, chip: next })).reads.length;
      expect({ reads: reads > 0, stored: existsSync(fileOf(bench.image)), state: (await rowOf(bench.image)).state === "sound" }).toEqual({ reads: reads > 0, stored: reads > 0, state: reads > 0 });
    }
  });
});

describe("check:store", () => {
  it("finds an image that a row alone calls erased", async () => {
    await emptyHouse();
    const bench = await makeClosed();
    expect(await damageNow()).toEqual([]);
    await asAdmin((db) => db.query("UPDATE images SET state = 'erased', erased_at = UTC_TIMESTAMP(6), erased_cause = 'due' WHERE sha256 = ?", [Buffer.from(sha256(bench.image), "hex")]));
    const { damage } = await checkStore();
    expect(damage.map((one) => one.problem).sort()).toEqual(["image-left", "image-not-in-log"]);
    expect(damage.find((one) => one.problem === "image-not-in-log")?.reads).toContain(`Case ${bench.chip.ref}, Drive A, Orig U12, Read 1`);
    await asAdmin((db) => db.query("UPDATE images SET state = 'sound', erased_at = NULL, erased_cause = NULL"));
  });

  it("finds a day of erasure, an end of keeping and an erasure that no entry tells of", async () => {
    const bench = await makeClosed();
    await Case.update({ eraseOn: "2020-01-01" }, { where: { id: bench.chip.caseId } });
    expect(await damageNow()).toEqual(["thing-differs-from-log"]);
    await Case.update({ eraseOn: String((await logged(bench.chip.driveId, "case.closed")).at(-1)!.eraseOn), keptUntil: "2099-01-01" }, { where: { id: bench.chip.caseId } });
    expect(await damageNow()).toEqual(["thing-differs-from-log"]);
    await Case.update({ keptUntil: null }, { where: { id: bench.chip.caseId } });
    expect(await damageNow()).toEqual([]);
  });

  it("finds an erased image that a row calls sound again", async () => {
    const bench = await makeClosed();
    await erase(bench);
    expect(await damageNow()).toEqual([]);
    await asAdmin((db) => db.query("UPDATE images SET state = 'sound', erased_at = NULL, erased_cause = NULL WHERE sha256 = ?", [Buffer.from(sha256(bench.image), "hex")]));
    expect((await damageNow()).sort()).toEqual(["image-missing", "image-record"]);
  });
});
