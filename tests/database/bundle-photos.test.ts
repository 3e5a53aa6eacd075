import { execFile } from "node:child_process";
import { createHash } from "node:crypto";
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { buffer } from "node:stream/consumers";
import { promisify } from "node:util";
import sharp from "sharp";
import { afterAll, expect, it, vi } from "vitest";
import { addPhotos } from "@/lib/commands/add-photos";
import { makeBundle } from "@/lib/commands/make-bundle";
import { reportSound } from "@/lib/commands/report-image";
import type { Actor, PhotoSubject } from "@/lib/core/words";
import { env } from "@/lib/env";
import { freshImage, makeChip, makeReady, makeUser } from "../support/factory";
import { arrivedPhoto } from "../support/photos";
import { pdf, picture } from "../support/pictures";
import { damageImage } from "../support/tamper";
import { runCheckScript, verifyZip } from "../support/verify-bag";

vi.setConfig({ testTimeout: 120_000 });
const run = promisify(execFile);
const work = mkdtempSync(path.join(os.tmpdir(), "twinread-bundle-photos-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));
const sha = (bytes: Buffer) => createHash("sha256").update(bytes).digest("hex");

async function unpacked(actor: Actor, caseId: string, ref: string) {
  const zip = await buffer((await makeBundle(actor, caseId)).stream);
  const folder = mkdtempSync(path.join(work, "bag-"));
  writeFileSync(path.join(folder, "bundle.zip"), zip);
  await run("unzip", ["-q", path.join(folder, "bundle.zip"), "-d", folder]);
  const bag = path.join(folder, `twinread-${ref}`);
  const manifest = new Map(readFileSync(path.join(bag, "manifest-sha256.txt"), "utf8").trim().split("\n").map((line) => [line.slice(66), line.slice(0, 64)]));
  return { zip, bag, manifest, record: JSON.parse(readFileSync(path.join(bag, "data/case.json"), "utf8")) as { photos: object[]; drives: { photos: { file: string | null; sha256: string }[] }[] } };
}

/** Names that a path, a line or a script could trip over. */
const NAMES = ["../../../etc/cron.d/x.jpg", "a\"\n      \"id\": \"1\",\n      \"path\": \"data/x\".jpg", "-rf.jpg", "$(reboot).jpg", "板 \u202Egpj.jpg"];

it("holds each photo as it came under a name of ours, and page and check.sh find all in order", async () => {
  const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  const chip = await makeChip(technician);
  await makeReady(technician, chip, freshImage());
  const subjects: [PhotoSubject, string, string][] = [
    ["case", chip.caseId, "data/photos/case-1.jpg"], ["drive", chip.driveId, "data/drives/1/photos/drive-1.jpg"], ["board", chip.originalBoardId, "data/drives/1/photos/original-1.jpg"],
    ["board", chip.donorBoardId, "data/drives/1/photos/donor-1-1.jpg"], ["chip", chip.chipId, "data/drives/1/photos/original.U12-1.jpg"],
  ];
  const expected = new Map<string, string>();
  for (const [i, [type, id, file]] of subjects.entries()) {
    const bytes = await picture({ location: true });
    await addPhotos(technician, type, id, [await arrivedPhoto(bytes, NAMES[i], "Burnt\n  \"sha256\": \"0\"")]);
    expected.set(file, sha(bytes));
  }
  const paper = pdf(chip.ref);
  await addPhotos(technician, "case", chip.caseId, [await arrivedPhoto(paper, "papers.pdf")]);
  expected.set("data/photos/case-2.pdf", sha(paper));

  const first = await unpacked(lead, chip.caseId, chip.ref);
  for (const [file, digest] of expected) {
    expect(first.manifest.get(file)).toBe(digest);
    expect(sha(readFileSync(path.join(first.bag, file)))).toBe(digest);
  }
  expect(readdirSync(path.join(first.bag, "data/drives/1/photos")).sort()).toEqual(["donor-1-1.jpg", "drive-1.jpg", "original-1.jpg", "original.U12-1.jpg"]);
  expect(first.record.photos).toEqual([expect.objectContaining({ file: "data/photos/case-1.jpg", originalFileName: NAMES[0], caption: "Burnt\n  \"sha256\": \"0\"", saysWhereItWasTaken: true }), expect.objectContaining({ file: "data/photos/case-2.pdf", kind: "document" })]);
  expect(runCheckScript(first.bag).status).toBe(0);
  expect((await verifyZip(first.zip, undefined, null)).verdict).toBe("in-order");
  expect((await run("sha256sum", ["-c", "--quiet", "manifest-sha256.txt"], { cwd: first.bag })).stdout).toBe("");

  // a second export has the same photos under the same names, without the copies that the first one left
  rmSync(path.join(env().dataDir, "reduced"), { recursive: true, force: true });
  const second = await unpacked(lead, chip.caseId, chip.ref);
  for (const [file, digest] of expected) expect(second.manifest.get(file)).toBe(digest);

  // changed in the bundle, both say so
  writeFileSync(path.join(second.bag, "data/drives/1/photos/original-1.jpg"), "other");
  expect(runCheckScript(second.bag).status).toBe(1);

  const report = path.join(first.bag, "data/report.pdf");
  const text = (await run("pdftotext", ["-layout", report, "-"])).stdout;
  for (const words of ["Photos and documents of Drive A", "Photos and documents of the case", "data/drives/1/photos/original.U12-1.jpg", expected.get("data/photos/case-1.jpg")!]) expect(text).toContain(words);
  const pictures = mkdtempSync(path.join(work, "pictures-"));
  await run("pdfimages", ["-all", report, path.join(pictures, "p")]);
  const files = readdirSync(pictures).filter((name) => name.endsWith(".jpg"));
  expect(files).toHaveLength(5);
  for (const name of files) {
    const found = await sharp(path.join(pictures, name)).metadata();
    expect([found.width, found.exif, found.xmp]).toEqual([400, undefined, undefined]);
  }
});

it("leaves out a photo that is on record as damaged, says so, and leaves with all the rest", async () => {
  const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  const chip = await makeChip(technician);
  const [good, bad] = [await picture(), await picture()];
  for (const bytes of [good, bad]) await addPhotos(technician, "drive", chip.driveId, [await arrivedPhoto(bytes)]);
  const undo = damageImage(sha(bad));
  // found on the way out, written down and refused; from then on it is known
  await expect(makeBundle(lead, chip.caseId)).rejects.toThrow(/damaged/);
  const { bag, record, zip } = await unpacked(lead, chip.caseId, chip.ref);
  undo();
  // so that no other test finds it on record
  await reportSound(sha(bad), "test");
  expect(record.drives[0].photos.map(({ file, sha256 }) => [file, sha256])).toEqual([["data/drives/1/photos/drive-1.jpg", sha(good)], [null, sha(bad)]]);
  expect(runCheckScript(bag).status).toBe(0);
  expect((await verifyZip(zip, undefined, null)).verdict).toBe("in-order");
  expect((await run("pdftotext", [path.join(bag, "data/report.pdf"), "-"])).stdout).toContain("not in the bundle");
});
