import { createHash, randomUUID } from "node:crypto";
import { chmodSync, existsSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { buffer } from "node:stream/consumers";
import CRC32 from "crc-32";
import sharp from "sharp";
import { describe, expect, it, vi } from "vitest";
import { addPhotos, addPhotosForRequest, readyPhotos, requirePhotoPlace } from "@/lib/commands/add-photos";
import { createCase } from "@/lib/commands/create-case";
import { openOriginal, openReduced } from "@/lib/commands/photo-open";
import { recordDrive } from "@/lib/commands/record-drive";
import { scrubNextDrive } from "@/lib/commands/scrub-round";
import { exifHasLocation } from "@/lib/core/photo-kind";
import { type Actor, type PhotoSubject, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { auditImages } from "@/lib/queries/audit-images";
import { findDigest } from "@/lib/queries/find";
import { photoCounts, photosOf, photosOfDrive } from "@/lib/queries/photos";
import { Case, Image, inTransaction, Photo, Read, ShelfBoard } from "@/models";
import { filesArriving } from "@/storage";
import { logOf, type MadeChip, makeChip, makeUser, refusalOf, store } from "../support/factory";
import { makeLimited } from "../support/limited";
import { arrivedPhoto } from "../support/photos";
import { ftyp, pdf, picture, polyglot } from "../support/pictures";
import { asAdmin, imageFile } from "../support/tamper";

vi.setConfig({ testTimeout: 60_000 });

const sha = (bytes: Buffer) => createHash("sha256").update(bytes).digest("hex");
const hex = (bytes: Buffer) => Buffer.from(sha(bytes), "hex");
const add = async (actor: Actor, type: PhotoSubject, id: string, bytes: Buffer, name = "photo.jpg", caption: string | null = null) => (await addPhotos(actor, type, id, [await arrivedPhoto(bytes, name, caption)])).photos[0];
const told = async (chain: string) => (await logOf(chain)).filter((entry) => entry.action === "photo.added");

async function bench(): Promise<{ technician: Actor; chip: MadeChip }> {
  const technician = await makeUser("technician");
  return { technician, chip: await makeChip(technician) };
}

async function shelfBoard(actor: Actor, takenBoardId: string | null = null): Promise<ShelfBoard> {
  const number = ((await ShelfBoard.max<number, ShelfBoard>("number")) ?? 0) + 1;
  return ShelfBoard.create({ id: randomUUID(), number, boardNumber: "BX 40-3179", chips: "[]", takenBoardId, createdBy: actor.id, createdAt: new Date() });
}

describe("a photo is kept as it came and told in the log", () => {
  it("of each kind of thing, in the right chains", async () => {
    const { technician, chip } = await bench();
    const second = await recordDrive(technician, chip.caseId, { partNumber: "PN 2" });
    const shelf = await shelfBoard(technician);
    const before = (await told(WORKSHOP_CHAIN)).length;
    const subjects: [PhotoSubject, string, string][] = [
      ["case", chip.caseId, `case ${chip.ref}`], ["drive", chip.driveId, "Drive A"], ["board", chip.donorBoardId, "the donor board BX 40-3179 rev C"],
      ["chip", chip.chipId, "U12 of the original"], ["shelf-board", shelf.id, `the shelf board ${shelf.number}, BX 40-3179`],
    ];
    for (const [type, id, name] of subjects) {
      const bytes = await picture();
      const view = await add(technician, type, id, bytes, "DSC 1.JPG", ` Of ${name} `);
      expect(view).toMatchObject({ of: { type, id }, kind: "photo", sha256: sha(bytes), sizeBytes: bytes.length, mediaType: "image/jpeg", fileName: "DSC 1.JPG", caption: `Of ${name}`, width: 640, height: 480, hadLocation: false, by: { id: technician.id }, sound: true });
      expect(readFileSync(imageFile(view.sha256)).equals(bytes)).toBe(true);
      expect(await photosOf(technician, type, id)).toEqual([view]);
      const chain = type === "shelf-board" ? WORKSHOP_CHAIN : chip.driveId;
      expect((await told(chain)).at(-1)).toMatchObject({ actor: { id: technician.id }, facts: { photo: view.id, of: { type, id, name }, kind: "photo", sha256: view.sha256, sizeBytes: bytes.length, mediaType: "image/jpeg", caption: `Of ${name}`, by: "workshop" } });
    }
    // the case's photo stands in each of its drives' logs
    expect((await told(second.id)).map((entry) => entry.facts.of)).toEqual([{ type: "case", id: chip.caseId, name: `case ${chip.ref}` }]);
    expect((await told(WORKSHOP_CHAIN)).length - before).toBe(1);
    expect((await photosOfDrive(technician, chip.driveId)).map((group) => [group.of.type, group.photos.length])).toEqual([["drive", 1], ["board", 0], ["board", 1]]);
    expect(await photoCounts(technician, chip.caseId)).toEqual([{ driveId: chip.driveId, photos: 3 }, { driveId: second.id, photos: 0 }]);
  });

  it("of a case without a drive in the workshop's log", async () => {
    const technician = await makeUser("technician");
    const made = await createCase(technician, { customer: { name: "Photo Test", email: "photo@lindmoor.example" }, damage: "Power surge" });
    const view = await add(technician, "case", made.id, await picture());
    expect((await told(WORKSHOP_CHAIN)).at(-1)?.facts).toMatchObject({ photo: view.id, of: { type: "case", id: made.id } });
  });

  it("PNG, WebP and PDF too; a PDF is a document without a reduced copy", async () => {
    const { technician, chip } = await bench();
    expect(await add(technician, "board", chip.originalBoardId, await picture({ format: "png" }), "a.png")).toMatchObject({ kind: "photo", mediaType: "image/png" });
    expect(await add(technician, "board", chip.originalBoardId, await picture({ format: "webp" }), "a.webp")).toMatchObject({ kind: "photo", mediaType: "image/webp" });
    const doc = await add(technician, "board", chip.originalBoardId, pdf(randomUUID()), "invoice.pdf");
    expect(doc).toMatchObject({ kind: "document", mediaType: "application/pdf", width: null, height: null });
    expect((await refusalOf(openReduced(technician, doc.id, 400))).detail).toContain("no reduced copy");
    expect((await openOriginal(technician, doc.id)).fileName).toMatch(/^board-document-[0-9a-f]{8}\.pdf$/);
  });

  it("a donor from the shelf brings the photos that were taken of it there", async () => {
    const { technician, chip } = await bench();
    const shelf = await shelfBoard(technician, chip.donorBoardId);
    const view = await add(technician, "shelf-board", shelf.id, await picture());
    expect((await photosOf(technician, "board", chip.donorBoardId)).map((photo) => photo.id)).toEqual([view.id]);
    expect((await photosOfDrive(technician, chip.driveId)).at(-1)?.photos.map((photo) => photo.id)).toEqual([view.id]);
  });

  it("of a request: by the customer, in the transaction that made the case, a file that came twice once", async () => {
    const technician = await makeUser("technician");
    const made = await createCase(technician, { customer: { name: "Photo Test", email: "photo@lindmoor.example" }, damage: "Power surge" });
    const bytes = await picture({ location: true });
    const ready = await readyPhotos([await arrivedPhoto(bytes, "label.jpg", "The label"), await arrivedPhoto(bytes, "label again.jpg")]);
    const rows = await inTransaction(async (tx) => addPhotosForRequest(tx, (await Case.findByPk(made.id, { transaction: tx }))!, ready));
    expect(rows).toHaveLength(1);
    expect((await photosOf(technician, "case", made.id))[0]).toMatchObject({ by: null, hadLocation: true });
    expect((await told(WORKSHOP_CHAIN)).at(-1)).toMatchObject({ actor: { role: "system" }, facts: { by: "customer", of: { id: made.id } } });
  });
});

describe("the copy that is shown", () => {
  it("has no location and no other metadata; the original keeps them", async () => {
    const { technician, chip } = await bench();
    const bytes = await picture({ location: true, width: 3000, height: 2000 });
    expect(exifHasLocation((await sharp(bytes).metadata()).exif!)).toBe(true);
    const view = await add(technician, "drive", chip.driveId, bytes);
    expect(view).toMatchObject({ hadLocation: true, width: 3000, height: 2000 });
    for (const [edge, width, height] of [[1600, 1600, 1067], [400, 400, 267]] as const) {
      const copy = (await openReduced(technician, view.id, edge)).bytes;
      const found = await sharp(copy).metadata();
      expect(found).toMatchObject({ format: "jpeg", width, height });
      expect([found.exif, found.xmp, found.iptc, found.icc, found.comments]).toEqual([undefined, undefined, undefined, undefined, undefined]);
      for (const word of ["Exif", "GPS", "Bench phone", "http"]) expect(copy.includes(word)).toBe(false);
    }
    const original = await openOriginal(technician, view.id);
    expect((await buffer(original.stream)).equals(bytes)).toBe(true);
  });

  it("stands upright as the camera was held", async () => {
    const { technician, chip } = await bench();
    const view = await add(technician, "drive", chip.driveId, await picture({ width: 600, height: 300, orientation: 6 }));
    expect(view).toMatchObject({ width: 300, height: 600 });
    expect(await sharp((await openReduced(technician, view.id, 1600)).bytes).metadata()).toMatchObject({ width: 300, height: 600, autoOrient: { width: 300, height: 600 } });
  });

  it("is made again when the folder of copies is gone, and when only a part of one is there", async () => {
    const { technician, chip } = await bench();
    const view = await add(technician, "drive", chip.driveId, await picture());
    const copy = (await openReduced(technician, view.id, 400)).bytes;
    rmSync(path.join(env().dataDir, "reduced"), { recursive: true });
    expect((await openReduced(technician, view.id, 400)).bytes.equals(copy)).toBe(true);
    expect(existsSync(path.join(env().dataDir, "reduced", view.sha256.slice(0, 2), `${view.sha256}-1600.jpg`))).toBe(true);
  });

  it("of a polyglot holds nothing of the page behind the photo", async () => {
    const { technician, chip } = await bench();
    const bytes = await polyglot("document.title='ran'");
    const view = await add(technician, "chip", chip.chipId, bytes);
    for (const edge of [1600, 400] as const) expect((await openReduced(technician, view.id, edge)).bytes.includes("script")).toBe(false);
    expect((await buffer((await openOriginal(technician, view.id)).stream)).equals(bytes)).toBe(true);
  });
});

describe("what is refused, with nothing stored", () => {
  const SVG = Buffer.from(`<svg xmlns="http://www.w3.org/2000/svg"><script>document.title="ran"</script></svg>`);
  async function truncated(format: "jpeg" | "png" | "webp"): Promise<Buffer> {
    const whole = await picture({ format });
    return whole.subarray(0, Math.floor(whole.length * 0.6));
  }
  /** a PNG whose header promises 30,000 by 30,000 pixels */
  async function bomb(): Promise<Buffer> {
    const png = Buffer.from(await sharp({ create: { width: 8, height: 8, channels: 3, background: "#000" } }).png().toBuffer());
    png.writeUInt32BE(30_000, 16);
    png.writeUInt32BE(30_000, 20);
    png.writeInt32BE(CRC32.buf(png.subarray(12, 29)), 29);
    return png;
  }
  it.each<[string, () => Promise<Buffer> | Buffer, string, string, string]>([
    ["HEIC", () => ftyp("heic", "mif1", "heic"), "IMG_1.HEIC", "wrong-media-type", "This is a HEIC photo. Set the phone's camera to 'most compatible', or share it as JPEG, then send it again."],
    ["HEIC named .jpg", () => ftyp("mif1", "heic"), "IMG_1.jpg", "wrong-media-type", "HEIC"],
    ["AVIF", () => ftyp("avif", "mif1"), "a.avif", "wrong-media-type", "AVIF"],
    ["GIF", () => sharp({ create: { width: 8, height: 8, channels: 3, background: "#123" } }).gif().toBuffer(), "a.gif", "wrong-media-type", "a GIF"],
    ["TIFF", () => sharp({ create: { width: 8, height: 8, channels: 3, background: "#123" } }).tiff().toBuffer(), "a.tif", "wrong-media-type", "a TIFF"],
    ["SVG named .png", () => SVG, "drawing.png", "wrong-media-type", "markup"],
    ["HTML named .jpg", () => Buffer.from("<!doctype html><script>1</script>"), "page.jpg", "wrong-media-type", "markup"],
    ["ZIP", () => Buffer.from("PK\x03\x04zip"), "a.zip", "wrong-media-type", "an archive"],
    ["empty", () => Buffer.alloc(0), "a.jpg", "wrong-media-type", "0 bytes"],
    ["a chip's image", () => Buffer.alloc(4096, 0xff), "u12.bin", "wrong-media-type", "no photo"],
    ["a JPEG named .png", () => picture(), "a.png", "wrong-media-type", "Its name ends in .png, but it holds a JPEG"],
    ["a JPEG named .html", () => picture(), "a.html", "wrong-media-type", ".html"],
    ["a JPEG cut off", () => truncated("jpeg"), "a.jpg", "does-not-fit", "breaks off"],
    ["a PNG cut off", () => truncated("png"), "a.png", "does-not-fit", "breaks off"],
    ["a WebP cut off", () => truncated("webp"), "a.webp", "does-not-fit", "WebP"],
    ["a JPEG's head alone", () => Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 0]), "a.jpg", "does-not-fit", "broken"],
    ["an SVG behind a PNG's head", () => Buffer.concat([Buffer.from("\x89PNG\r\n\x1a\n", "latin1"), SVG]), "a.png", "does-not-fit", "broken"],
    ["a PDF cut off", () => pdf().subarray(0, 30), "a.pdf", "does-not-fit", "breaks off"],
    ["a bomb", bomb, "bomb.png", "does-not-fit", "900,000,000 pixels"],
    ["a name without end", () => picture(), `${"n".repeat(300)}.jpg`, "does-not-fit", "304 characters"],
  ])("%s", async (_, make, name, code, words) => {
    const { technician, chip } = await bench();
    const bytes = await make();
    const good = await picture();
    const refusal = await refusalOf(addPhotos(technician, "drive", chip.driveId, [await arrivedPhoto(good, "good.jpg"), await arrivedPhoto(bytes, name)]));
    expect(refusal.code).toBe(code);
    expect(refusal.detail).toContain(words);
    expect(refusal.detail.toLowerCase()).toContain("nothing was stored");
    expect(await photosOf(technician, "drive", chip.driveId)).toEqual([]);
    expect(existsSync(imageFile(sha(good)))).toBe(false);
    expect(await told(chip.driveId)).toEqual([]);
    expect(filesArriving()).toBe(0);
  });

  it("a long caption, no file at all, the same file twice in a call, and one that is there already", async () => {
    const { technician, chip } = await bench();
    const bytes = await picture();
    const call = async (...files: ReturnType<typeof arrivedPhoto>[]) => refusalOf(addPhotos(technician, "drive", chip.driveId, await Promise.all(files)));
    expect((await call(arrivedPhoto(bytes, "a.jpg", "c".repeat(301)))).detail).toContain("300 characters");
    expect((await call()).detail).toContain("No photo came along");
    expect((await call(arrivedPhoto(bytes), arrivedPhoto(bytes))).detail).toContain("twice");
    await add(technician, "drive", chip.driveId, bytes, "first.jpg");
    expect(await call(arrivedPhoto(bytes, "again.jpg"))).toEqual({ code: "rule-against", detail: "again.jpg is among the photos of Drive A already, as first.jpg. Nothing was stored." });
    // of another thing the same file may be a photo too
    await add(technician, "board", chip.originalBoardId, bytes);
  });

  it("anything to a closed case", async () => {
    const { technician, chip } = await bench();
    await Case.update({ closedAt: new Date() }, { where: { id: chip.caseId } });
    for (const [type, id] of [["case", chip.caseId], ["drive", chip.driveId], ["chip", chip.chipId]] as const) {
      expect(await refusalOf(requirePhotoPlace(technician, type, id))).toMatchObject({ code: "rule-against" });
      expect((await refusalOf(add(technician, type, id, await picture()))).detail).toContain("Reopen it first");
    }
  });
});

describe("hostile names", () => {
  it.each(["../../etc/passwd.jpg", "a\0b.jpg", "<script>alert(1)</script>.jpg", "CON.jpg", "\u202Egpj.x.jpg", "a\r\nSet-Cookie: x.jpg", "\"; filename=evil.html;.jpg", "💾 板.jpg", ""])("%j is kept word for word and names no file", async (name) => {
    const { technician, chip } = await bench();
    const view = await add(technician, "drive", chip.driveId, await picture(), name);
    expect((await photosOf(technician, "drive", chip.driveId))[0].fileName).toBe(name);
    for (const fileName of [(await openOriginal(technician, view.id)).fileName, (await openReduced(technician, view.id, 400)).fileName]) expect(fileName).toMatch(/^drive-photo-[0-9a-f]{8}\.jpg$/);
  });
});

describe("who may", () => {
  it("technicians and leads add, auditors and admins look", async () => {
    const { technician, chip } = await bench();
    const view = await add(technician, "drive", chip.driveId, await picture());
    for (const role of ["lead", "technician"] as const) await add(await makeUser(role), "drive", chip.driveId, await picture());
    for (const role of ["auditor", "admin"] as const) {
      const actor = await makeUser(role);
      expect(await refusalOf(add(actor, "drive", chip.driveId, await picture()))).toMatchObject({ code: "forbidden" });
      expect((await openReduced(actor, view.id, 400)).bytes.length).toBeGreaterThan(100);
      (await openOriginal(actor, view.id)).stream.destroy();
    }
  });

  it("for an auditor with a case list the photos of other cases never were", async () => {
    const { technician, chip } = await bench();
    const { chip: other } = await bench();
    const limited = await makeLimited([chip.caseId]);
    const mine = await add(technician, "chip", chip.chipId, await picture());
    const theirs = await Promise.all((["case", "drive", "board", "chip"] as const).map(async (type) => [type, await add(technician, type, { case: other.caseId, drive: other.driveId, board: other.donorBoardId, chip: other.chipId }[type], await picture())] as const));
    const [shelf, taken] = [await shelfBoard(technician), await shelfBoard(technician, chip.donorBoardId)];
    const [stock, stocked] = [await add(technician, "shelf-board", shelf.id, await picture()), await add(technician, "shelf-board", taken.id, await picture())];
    const never = await refusalOf(openOriginal(limited, randomUUID()));
    for (const photo of [...theirs.map(([, view]) => view), stock]) {
      expect(await refusalOf(openOriginal(limited, photo.id))).toEqual(never);
      expect(await refusalOf(openReduced(limited, photo.id, 400))).toEqual(never);
    }
    for (const [type, view] of theirs) expect(await refusalOf(photosOf(limited, type, view.of.id))).toEqual(await refusalOf(photosOf(limited, type, randomUUID())));
    for (const photo of [mine, stocked]) expect((await openReduced(limited, photo.id, 400)).bytes.length).toBeGreaterThan(100);
    const seen = await auditImages(limited, { q: "", what: "", sort: "stored", order: "desc", page: 1, pageSize: 200 } as never);
    const digests = seen.items.map((row) => row.sha256);
    expect(digests).toEqual(expect.arrayContaining([mine.sha256, stocked.sha256]));
    for (const photo of [...theirs.map(([, view]) => view), stock]) expect(digests).not.toContain(photo.sha256);
  });
});

describe("stored photos are read again, and are never chips", () => {
  it("a damaged one is found by the scrub, told in the log of its drive, and comes back when it is sent again", async () => {
    const { technician, chip } = await bench();
    const bytes = await picture();
    const stock = await picture();
    const [view, lone] = [await add(technician, "chip", chip.chipId, bytes), await add(technician, "shelf-board", (await shelfBoard(technician)).id, stock)];
    const changed = Buffer.from(bytes);
    changed[100] ^= 1;
    for (const [photo, content] of [[view, changed], [lone, Buffer.from("gone")]] as const) {
      chmodSync(imageFile(photo.sha256), 0o600);
      writeFileSync(imageFile(photo.sha256), content);
    }
    await asAdmin((db) => db.query("UPDATE images SET stored_at = UTC_TIMESTAMP(6), checked_at = UTC_TIMESTAMP(6)"));
    await asAdmin((db) => db.query("UPDATE images SET stored_at = UTC_TIMESTAMP(6) - INTERVAL 30 DAY, checked_at = NULL WHERE sha256 IN (?)", [[view, lone].map((photo) => Buffer.from(photo.sha256, "hex"))]));
    while ((await scrubNextDrive({ days: 7, bytesPerSecond: null, secondLookMs: 0 })) !== null);
    for (const photo of [view, lone]) expect((await Image.findByPk(Buffer.from(photo.sha256, "hex")))?.state).toBe("damaged");
    expect((await logOf(chip.driveId)).filter((entry) => entry.action === "image.found-damaged").map((entry) => entry.facts.sha256)).toEqual([view.sha256]);
    expect((await photosOf(technician, "chip", chip.chipId))[0].sound).toBe(false);
    expect((await refusalOf(openOriginal(technician, view.id))).detail).toContain("damaged");
    // the copy for the screen is still there
    expect((await openReduced(technician, view.id, 400)).bytes.length).toBeGreaterThan(100);
    await add(technician, "board", chip.originalBoardId, bytes);
    expect((await photosOf(technician, "chip", chip.chipId))[0].sound).toBe(true);
    expect((await openOriginal(technician, view.id)).sizeBytes).toBe(bytes.length);
    await add(technician, "board", chip.originalBoardId, stock);
    expect((await Image.findByPk(hex(stock)))?.state).toBe("sound");
  });

  it("finding a photo's digest shows no read, and a read with a photo's bytes is judged like any other", async () => {
    const { technician, chip } = await bench();
    const bytes = await picture({ width: 64, height: 64 });
    const view = await add(technician, "drive", chip.driveId, bytes);
    expect((await findDigest(technician, view.sha256)).hits).toEqual([]);
    const { reads } = await store(technician, chip.chipId, "before", bytes);
    const other = await makeChip(technician);
    expect(reads[0].findings.map((finding) => finding.code)).not.toContain("other-chip");
    const fresh = await store(technician, other.chipId, "before", await picture({ width: 64, height: 64 }));
    expect(fresh.reads[0].findings.map((finding) => finding.code).filter((code) => code.startsWith("other-"))).toEqual([]);
    const facts = (await Image.findByPk(hex(bytes)))!;
    expect(facts.facts.distinctValues).toBeGreaterThan(100);
    expect(await Read.count({ where: { sha256: hex(bytes) } })).toBe(1);
  });

  it("photos are never changed or deleted by the app's own database user", async () => {
    const { technician, chip } = await bench();
    const view = await add(technician, "drive", chip.driveId, await picture());
    await expect(Photo.destroy({ where: { id: view.id } })).rejects.toThrow(/denied/);
    await expect(Photo.update({ fileName: "other.jpg" }, { where: { id: view.id } })).rejects.toThrow(/denied/);
  });
});
