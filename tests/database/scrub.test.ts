import { chmodSync, linkSync, lstatSync, mkdirSync, readFileSync, renameSync, rmSync, symlinkSync, truncateSync, writeFileSync } from "node:fs";
import path from "node:path";
import { Op } from "sequelize";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { makeComposite } from "@/lib/commands/make-composite";
import { scrubImage } from "@/lib/commands/scrub-image";
import { scrubNextDrive, scrubNow, type ScrubOptions } from "@/lib/commands/scrub-round";
import { scrubState } from "@/lib/queries/scrub-state";
import { Image, Mail } from "@/models";
import { lookAtImage } from "@/storage";
import { flipped, logged } from "../support/bench-steps";
import { approve, type Bench, firmware, freshImage, logOf, makeChip, makeReady, makeUser, sha256, stateOf, store } from "../support/factory";
import { manyReads } from "../support/many-images";
import { asAdmin, imageFile } from "../support/tamper";

const DAYS = 7;
const FULL: ScrubOptions = { days: DAYS, bytesPerSecond: null, secondLookMs: 0 };

/** What a test did to the store is undone. */
const undo: (() => void)[] = [];
afterEach(() => undo.splice(0).reverse().forEach((put) => put()));

const hex = (image: Uint8Array) => Buffer.from(sha256(image), "hex");
const ago = (days: number) => `UTC_TIMESTAMP(6) - INTERVAL ${Math.round(days * 86400)} SECOND`;

/** Lets time pass for these images: both times are moved back, where the app itself could not. */
async function age(images: Uint8Array[], days: number): Promise<void> {
  await asAdmin((db) => db.query(`UPDATE images SET stored_at = ${ago(days)}, checked_at = NULL WHERE sha256 IN (?)`, [images.map(hex)]));
}
const rowOf = async (image: Uint8Array) => (await Image.findByPk(hex(image)))!;
const checked = (driveId: string) => logged(driveId, "images.checked");

/** Everything that is due, as the loop would do it. */
async function scrubAll(options: Partial<ScrubOptions> = {}): Promise<void> {
  while ((await scrubNextDrive({ ...FULL, ...options })) !== null);
}

// whatever other tests stored is fresh: nothing but this test's own images is due
beforeEach(() => asAdmin((db) => db.query("UPDATE images SET stored_at = UTC_TIMESTAMP(6), checked_at = NULL")));

interface Own extends Bench {
  /** the donor's content, of this bench alone */
  own: Buffer;
}
async function makeOwnBench(): Promise<Own> {
  const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  const [chip, image, own] = [await makeChip(technician), freshImage(), freshImage()];
  await makeReady(technician, chip, image, own);
  return { technician, lead, chip, image, own };
}
async function makeApprovedOwn(): Promise<Own> {
  const bench = await makeOwnBench();
  await approve(bench.lead, bench.chip, bench.image);
  return bench;
}

interface Damaged {
  put(file: string, image: Buffer): void;
  state: "damaged" | "missing";
}
const rewrite = (file: string, bytes: Uint8Array) => {
  chmodSync(file, 0o640);
  writeFileSync(file, bytes);
};
const WAYS: Record<string, Damaged> = {
  "a byte shorter": { put: (file, image) => (chmodSync(file, 0o640), truncateSync(file, image.length - 1)), state: "damaged" },
  "cut to nothing": { put: (file) => (chmodSync(file, 0o640), truncateSync(file, 0)), state: "damaged" },
  "a byte longer": { put: (file, image) => rewrite(file, Buffer.concat([image, Buffer.from([0xff])])), state: "damaged" },
  "another valid image": { put: (file, image) => rewrite(file, firmware("another", image.length)), state: "damaged" },
  removed: { put: (file) => rmSync(file), state: "missing" },
  "a folder": { put: (file) => (rmSync(file), mkdirSync(file)), state: "damaged" },
  "a link to the same bytes": { put: (file, image) => (rmSync(file), writeFileSync(`${file}-elsewhere`, image), symlinkSync(`${file}-elsewhere`, file)), state: "damaged" },
  "a link to nowhere": { put: (file) => (rmSync(file), symlinkSync("/nowhere/at/all", file)), state: "damaged" },
  "changed in its first byte": { put: (file, image) => rewrite(file, flipped(image, 0)), state: "damaged" },
  "changed in its last byte": { put: (file, image) => rewrite(file, flipped(image, image.length - 1)), state: "damaged" },
};

/** Damages the stored image and remembers how to put it right. */
function harm(image: Buffer, put: Damaged["put"]): void {
  const file = imageFile(sha256(image));
  const safe = `${file}-safe`;
  linkSync(file, safe);
  // whatever writes to the file must not write to its second name
  rmSync(file);
  writeFileSync(file, image, { mode: 0o640 });
  undo.push(() => {
    rmSync(file, { recursive: true, force: true });
    renameSync(safe, file);
  });
  put(file, image);
}

describe("the scrub of stored images", () => {
  it("reads a drive's images again when one is due, oldest first, and says so in one entry of its log", async () => {
    const bench = await makeOwnBench();
    const second = freshImage();
    await store(bench.technician, bench.chip.chipId, "before", second, 3);
    await age([second], 8);
    await age([bench.own], 7);
    const order: (string | null)[] = [];
    await scrubAll({ at: (step) => void (step === "image" && order.push(scrubNow().sha256)) });
    expect(order).toEqual([second, bench.own, bench.image].map(sha256));
    expect((await rowOf(bench.image)).checkedAt).not.toBeNull();
    const entries = await checked(bench.chip.driveId);
    expect(entries).toEqual([{ images: 3, bytes: 3 * 8192, damaged: 0, missing: 0, oldestBefore: expect.stringMatching(/^\d{4}-\d\d-\d\dT[\d:.]+Z$/) as string }]);
    expect(Date.now() - Date.parse(entries[0].oldestBefore as string)).toBeGreaterThan(7.9 * 86_400_000);
    expect(scrubNow()).toEqual({ driveId: null, sha256: null });
    await scrubAll();
    expect(await checked(bench.chip.driveId)).toHaveLength(1);
  });

  it("reads an image of two drives once and closes both rounds", async () => {
    const [one, other] = [await makeOwnBench(), await makeOwnBench()];
    await store(other.technician, other.chip.chipId, "before", one.image, 3);
    await age([one.image, one.own, other.image, other.own], 8);
    let read = 0;
    await scrubAll({ at: (step) => void (step === "image" && (read += 1)) });
    expect(read).toBe(4);
    for (const { chip } of [one, other]) expect(await checked(chip.driveId)).toHaveLength(1);
  });

  it("covers the text an image came from and the report of a composite's votes", async () => {
    const bench = await makeOwnBench();
    const others = [flipped(bench.image, 10), flipped(bench.image, 2000)];
    for (const image of others) await store(bench.technician, bench.chip.chipId, "before", image, 3);
    await makeComposite(bench.lead, bench.chip.chipId, { reads: [1, 4, 5], reason: "No three agree." });
    const text = Buffer.from(":020000040000FA\n:0400000001020304F2\n:00000001FF\n");
    await store(bench.technician, bench.chip.chipId, "before", text, 3, { format: "intel-hex", base: 0, size: 8192, fill: 0xff }, "read.hex");
    const report = (await logged(bench.chip.driveId, "composite.made"))[0].reportSha256 as string;
    await age([bench.image], 8);
    await asAdmin((db) => db.query(`UPDATE images SET checked_at = NULL WHERE sha256 IN (?)`, [[hex(text), Buffer.from(report, "hex")]]));
    rewrite(imageFile(report), Buffer.alloc(10));
    await scrubAll();
    expect((await rowOf(text)).checkedAt).not.toBeNull();
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([{ sha256: report, state: "damaged", where: "scrub" }]);
    expect((await checked(bench.chip.driveId))[0]).toMatchObject({ damaged: 1, missing: 0 });
  });

  for (const [way, { put, state }] of Object.entries(WAYS)) {
    it(`finds a stored image that is ${way}, at the second look, and the approval falls`, async () => {
      const bench = await makeApprovedOwn();
      harm(bench.image, put);
      await age([bench.image], 8);
      await scrubAll();
      expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([{ sha256: sha256(bench.image), state, where: "scrub" }]);
      expect(await logged(bench.chip.driveId, "approval.revoked")).toHaveLength(1);
      expect(await stateOf(bench.technician, bench.chip.chipId)).not.toBe("approved");
      expect(await checked(bench.chip.driveId)).toEqual([expect.objectContaining({ damaged: state === "damaged" ? 1 : 0, missing: state === "missing" ? 1 : 0 })]);
      expect(await Mail.count({ where: { recipient: bench.lead.email, subject: { [Op.like]: "A stored image is%" } } })).toBe(1);
      const { faulty } = await scrubState(bench.lead);
      expect(faulty.find((one) => one.sha256 === sha256(bench.image))).toMatchObject({ state, uses: [1, 2, 3].map((n) => expect.objectContaining({ caseRef: bench.chip.ref, name: `Case ${bench.chip.ref}, Drive A, Orig U12, Read ${n}` }) as object) });
    });
  }

  it("finds two images that were swapped", async () => {
    const [one, other] = [await makeOwnBench(), await makeOwnBench()];
    harm(one.image, (file) => rewrite(file, other.image));
    harm(other.image, (file) => rewrite(file, one.image));
    await age([one.image, other.image], 8);
    await scrubAll();
    for (const { chip } of [one, other]) expect(await logged(chip.driveId, "image.found-damaged")).toHaveLength(1);
  });

  it("finds each of the 512 bits of 64 bytes flipped, in mails that do not drown anybody", async () => {
    const technician = await makeUser("technician");
    const lead = await makeUser("lead");
    const chip = await makeChip(technician, { sizeBytes: 64 });
    const images = Array.from({ length: 512 }, (_, bit) => firmware(`bit-${bit}-${Math.random()}`, 64));
    await store(technician, chip.chipId, "before", images[0]);
    const read = (await logOf(chip.driveId)).find((entry) => entry.action === "read.stored")!;
    await manyReads((read.facts.read as { id: string }).id, images.slice(1));
    images.forEach((image, bit) => {
      const wrong = Buffer.from(image);
      wrong[bit >> 3] ^= 1 << (bit & 7);
      rewrite(imageFile(sha256(image)), wrong);
    });
    await age(images, 8);
    await scrubAll();
    const found = await logged(chip.driveId, "image.found-damaged");
    expect(new Set(found.map((one) => one.sha256))).toEqual(new Set(images.map(sha256)));
    expect(await checked(chip.driveId)).toEqual([expect.objectContaining({ images: 512, bytes: 512 * 64, damaged: 512, missing: 0 })]);
    expect(await Mail.count({ where: { recipient: lead.email, subject: { [Op.like]: "%stored image%" } } })).toBe(2);
  }, 180_000);

  it("says of a fault that is gone at the second look that it was there, and brings nothing down", async () => {
    const bench = await makeApprovedOwn();
    const file = imageFile(sha256(bench.image));
    renameSync(file, `${file}-away`);
    const looked = scrubImage({ sha256: sha256(bench.image), sizeBytes: bench.image.length, state: "sound" }, { passed: async () => {}, secondLookMs: 300 });
    await new Promise((done) => setTimeout(done, 100));
    renameSync(`${file}-away`, file);
    await looked;
    expect(await logged(bench.chip.driveId, "image.second-look")).toEqual([{ sha256: sha256(bench.image), where: "scrub" }]);
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([]);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
    expect((await rowOf(bench.image)).checkedAt).not.toBeNull();
  });

  it("sees at once that a damaged image is whole again", async () => {
    const bench = await makeApprovedOwn();
    harm(bench.image, WAYS["a byte longer"].put);
    await age([bench.image], 8);
    await scrubAll();
    undo.pop()?.();
    await age([bench.image, bench.own], 8);
    await scrubAll();
    expect(await logged(bench.chip.driveId, "image.found-sound")).toEqual([{ sha256: sha256(bench.image), where: "scrub" }]);
    await approve(bench.lead, bench.chip, bench.image);
    expect(await checked(bench.chip.driveId)).toHaveLength(2);
  });

  it("says nothing of an image that is still damaged, but its round goes on", async () => {
    const bench = await makeOwnBench();
    harm(bench.image, WAYS.removed.put);
    for (let i = 1; i <= 3; i += 1) {
      await age([bench.image, bench.own], 8);
      await scrubAll();
      expect(await checked(bench.chip.driveId)).toHaveLength(i);
    }
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toHaveLength(1);
    expect(await Mail.count({ where: { recipient: bench.lead.email } })).toBe(1);
  });

  it("killed before any step goes on where it stopped: each image once, one entry, one alarm", async () => {
    for (const [step, which] of [["image", 1], ["image", 3], ["checked", 1], ["checked", 2], ["checked", 4], ["close", 1], ["closed", 1]] as const) {
      const bench = await makeOwnBench();
      const more = [freshImage(), freshImage(), freshImage()];
      for (const image of more) await store(bench.technician, bench.chip.chipId, "before", image, 3);
      harm(more[0], WAYS["cut to nothing"].put);
      await age([bench.image, bench.own, ...more], 8);
      let seen = 0;
      const end = scrubAll({
        at: (now) => {
          if (now === step && (seen += 1) === which) throw new Error("killed");
        },
      });
      await expect(end).rejects.toThrow("killed");
      let again = 0;
      await scrubAll({ at: (now) => void (now === "checked" && (again += 1)) });
      const first = step === "image" ? which - 1 : step === "checked" ? which : 5;
      expect([step, which, first + again]).toEqual([step, which, 5]);
      expect(await checked(bench.chip.driveId)).toEqual([expect.objectContaining({ images: 5, damaged: 1 })]);
      expect(await logged(bench.chip.driveId, "image.found-damaged")).toHaveLength(1);
      expect(await Mail.count({ where: { recipient: bench.lead.email } })).toBe(1);
    }
  });

  it("makes one entry when two servers work side by side", async () => {
    const bench = await makeOwnBench();
    await age([bench.image], 8);
    await Promise.all([scrubAll(), scrubAll(), scrubAll()]);
    expect(await checked(bench.chip.driveId)).toHaveLength(1);
  });

  it("raises no alarm when the right bytes came between its two looks", async () => {
    const bench = await makeApprovedOwn();
    harm(bench.image, WAYS["cut to nothing"].put);
    const looked = scrubImage({ sha256: sha256(bench.image), sizeBytes: bench.image.length, state: "sound" }, { passed: async () => {}, secondLookMs: 500 });
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
    await looked;
    expect((await rowOf(bench.image)).state).toBe("sound");
    expect(readFileSync(imageFile(sha256(bench.image))).equals(bench.image)).toBe(true);
  });

  it("stops with one sentence when the disk of the images is away, and accuses none of them", async () => {
    const bench = await makeApprovedOwn();
    await age([bench.image], 8);
    const folder = path.join(process.env.TWINREAD_DATA ?? "", "images", "sha256");
    renameSync(folder, `${folder}-away`);
    undo.push(() => renameSync(`${folder}-away`, folder));
    await expect(scrubAll()).rejects.toThrow("The folder of the stored images is missing or empty");
    mkdirSync(folder);
    await expect(scrubAll()).rejects.toThrow("The folder of the stored images is missing or empty");
    rmSync(folder, { recursive: true });
    undo.pop()?.();
    expect(await logged(bench.chip.driveId, "image.found-damaged")).toEqual([]);
    await scrubAll();
    expect(await checked(bench.chip.driveId)).toEqual([expect.objectContaining({ damaged: 0, missing: 0 })]);
  });

  it("reads no faster than it is told", async () => {
    const bench = await makeOwnBench();
    await age([bench.image], 8);
    const began = performance.now();
    await scrubAll({ bytesPerSecond: 16 * 1024 });
    expect(performance.now() - began).toBeGreaterThan(400);
  });

  it("tells a file that can't be read from one that was changed, and both from a trouble of the machine", async () => {
    const bench = await makeOwnBench();
    const digest = sha256(bench.image);
    harm(bench.image, WAYS["changed in its first byte"].put);
    expect(await lookAtImage(digest, bench.image.length)).toMatchObject({ state: "damaged", why: expect.stringMatching(/^has the SHA-256 [0-9a-f]{64} now/) as string });
    expect(lstatSync(imageFile(digest)).isFile()).toBe(true);
    const full = () => Promise.reject(Object.assign(new Error("EMFILE: too many open files"), { code: "EMFILE" }));
    await expect(lookAtImage(digest, bench.image.length, full)).rejects.toThrow("EMFILE");
    const faulty = () => Promise.reject(Object.assign(new Error("EIO: i/o error, read"), { code: "EIO" }));
    expect(await lookAtImage(digest, bench.image.length, faulty)).toMatchObject({ state: "damaged", why: "could not be read (EIO)" });
  });

  it("shows how the store is, and a limited auditor the own cases only", async () => {
    const [bench, other] = [await makeOwnBench(), await makeOwnBench()];
    const auditor = await makeUser("auditor");
    harm(bench.image, WAYS.removed.put);
    await age([bench.image], 9);
    const before = await scrubState(auditor);
    expect(before).toMatchObject({ state: "behind", days: 7, mebibytesPerSecond: 20 });
    expect(Date.parse(before.oldestAt!)).toBeLessThan(Date.now() - 8.9 * 86_400_000);
    await scrubAll();
    const after = await scrubState(auditor);
    expect(after.state).toBe("keeping-up");
    expect(after.states.missing).toBeGreaterThanOrEqual(1);
    expect(after.last).not.toBeNull();
    const limited = await scrubState({ ...auditor, cases: [other.chip.caseId] });
    expect(limited).toMatchObject({ images: 2, states: { sound: 2, damaged: 0, missing: 0 }, faulty: [] });
    expect((await scrubState({ ...auditor, cases: [] })).images).toBe(0);
    expect((await scrubState({ ...auditor, cases: [bench.chip.caseId] })).faulty).toHaveLength(1);
    await expect(scrubState(bench.technician)).rejects.toThrow();
  });
});
