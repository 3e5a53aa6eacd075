import { execFile } from "node:child_process";
import { randomBytes, randomUUID } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { buffer } from "node:stream/consumers";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { addPhotos } from "@/lib/commands/add-photos";
import { answerDeletion } from "@/lib/commands/answer-deletion";
import { askDeletion } from "@/lib/commands/ask-deletion";
import { type BundlePlan, startBundle } from "@/lib/commands/bundle-plan";
import { closeCase } from "@/lib/commands/close-case";
import { eraseImages } from "@/lib/commands/erase-images";
import { writeBundle } from "@/lib/commands/make-bundle";
import { erasuresWaiting } from "@/lib/queries/erasure";
import { shareHash } from "@/lib/queries/open-share";
import { requestPage } from "@/lib/queries/requests";
import type { Actor } from "@/lib/core/words";
import { caseList } from "@/lib/queries/cases";
import { checkStore } from "@/scripts/check/store";
import { Mail, Request } from "@/models";
import { logged, refusal } from "../support/bench-steps";
import { emptyHouse } from "../support/empty-house";
import { freshImage, type MadeChip, makeChip, makeUser, sha256, store } from "../support/factory";
import { arrivedPhoto } from "../support/photos";
import { picture } from "../support/pictures";
import { answers } from "../support/request";
import { faultsOf, runCheckScript, verifyZip } from "../support/verify-bag";

vi.setConfig({ testTimeout: 180_000 });
const run = promisify(execFile);
const work = mkdtempSync(path.join(os.tmpdir(), "twinread-erasure-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

interface Judged {
  page: string;
  faults: string[];
  script: number | null;
  text: string;
  bag: string;
}

/** What the page and check.sh say of a bundle with these contents. */
async function judged(actor: Actor, { ref }: Pick<MadeChip, "ref">, plan: BundlePlan): Promise<Judged> {
  const zip = await buffer((await writeBundle(actor, plan)).stream);
  const folder = mkdtempSync(path.join(work, "bag-"));
  writeFileSync(path.join(folder, "bundle.zip"), zip);
  await run("unzip", ["-q", path.join(folder, "bundle.zip"), "-d", folder]);
  const bag = path.join(folder, `twinread-${ref}`);
  const [report, script] = [await verifyZip(zip), runCheckScript(bag)];
  return { page: report.verdict, faults: faultsOf(report), script: script.status, text: script.text, bag };
}
const without = (plan: BundlePlan, digest: string): BundlePlan => ({ ...plan, images: plan.images.filter((one) => one.sha256 !== digest), photos: plan.photos.filter((one) => one.sha256 !== digest) });

/** A request whose customer holds the token. */
async function askedBy(chip: MadeChip): Promise<{ token: string; requestId: string }> {
  const [token, now] = [randomBytes(32).toString("base64url"), new Date()];
  const { id } = await Request.create({ id: randomUUID(), caseId: chip.caseId, tokenHash: shareHash(token), answers: JSON.stringify({ ...answers(), keepDays: 90 }), addressDigest: randomBytes(32), requestedAt: now, expiresAt: new Date("9999-12-31T00:00:00Z") });
  return { token, requestId: id };
}

let technician: Actor;
let lead: Actor;
let chip: MadeChip;
let token: string;
let requestId: string;
let photo: Buffer;
const [image, other] = [freshImage(), freshImage()];
beforeAll(async () => {
  await emptyHouse();
  [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  chip = await makeChip(technician);
  ({ token, requestId } = await askedBy(chip));
  await store(technician, chip.chipId, "before", image);
  await store(technician, chip.chipId, "before", other, 2);
  photo = await picture({});
  await addPhotos(technician, "chip", chip.chipId, [await arrivedPhoto(photo)]);
}, 120_000);
const typed = () => ({ caseRef: chip.ref, reason: "The customer asked." });

describe("a bundle", () => {
  it("is refused by page and check.sh when an image is left out that the log does not call erased", async () => {
    const plan = await startBundle(lead, chip.caseId);
    expect(await judged(lead, chip, plan)).toMatchObject({ faults: [], script: 0 });
    for (const digest of [sha256(image), sha256(photo)]) {
      const { faults, script, text } = await judged(lead, chip, without(await startBundle(lead, chip.caseId), digest));
      expect(faults.length).toBeGreaterThan(0);
      expect([script, text]).toEqual([1, expect.stringContaining("that the bundle does not hold")]);
    }
  });
});

describe("a customer’s wish for deletion", () => {
  it("stands with the leads and admins until it is answered, and nothing goes by it", async () => {
    await askDeletion(token, "All of it, please.");
    expect(await erasuresWaiting(lead)).toMatchObject({ due: 0, wishes: [{ caseRef: chip.ref }] });
    expect(await erasuresWaiting(technician)).toBeNull();
    expect(await refusal(eraseImages(lead, chip.caseId, typed()))).toMatchObject({ status: 409, detail: expect.stringContaining("is open") });
  });

  it("is answered once, by a lead, and the customer hears why", async () => {
    const answer = "Your drive is still being read.";
    expect(await refusal(answerDeletion(technician, requestId, { answer }))).toMatchObject({ status: 403 });
    await answerDeletion(lead, requestId, { answer });
    expect(await refusal(answerDeletion(lead, requestId, { answer }))).toMatchObject({ status: 409, detail: expect.stringContaining("was answered on") });
    expect(await logged(chip.driveId, "request.deletion-answered")).toMatchObject([{ caseRef: chip.ref, answer }]);
    expect((await Mail.findAll()).find((mail) => mail.kind === "deletion-answer")?.textMasked).toContain(answer);
    expect((await requestPage(token))?.deletion).toMatchObject({ answered: { answer } });
    expect((await erasuresWaiting(lead))?.wishes).toEqual([]);
    expect((await checkStore()).damage.map((one) => one.problem)).toEqual([]);
  });

  it("lets an admin erase a closed case before its day", async () => {
    await closeCase(lead, chip.caseId, { kind: "without-transfer", reason: "It went back by hand." });
    expect((await caseList(lead, { q: "", sort: "", order: "asc", page: 1, pageSize: 25, state: "erasure-due" })).total).toBe(0);
    expect(await eraseImages(await makeUser("admin"), chip.caseId, typed())).toMatchObject({ cause: "asked-for", images: 2, photos: 1, kept: 0 });
    expect((await requestPage(token))?.erasedAt).not.toBeNull();
    expect((await checkStore()).damage.map((one) => one.problem)).toEqual([]);
  });
});

describe("the bundle of an erased case", () => {
  it("leaves the images out, says so, and page and check.sh find it in order", async () => {
    const plan = await startBundle(lead, chip.caseId);
    expect([plan.images, plan.photos]).toEqual([[], []]);
    const { faults, script, text, bag } = await judged(lead, chip, plan);
    expect(faults).toEqual([]);
    expect([script, text]).toEqual([0, expect.stringContaining("of its images and photos 3 were erased, as its log says")]);
    const record = JSON.parse(readFileSync(path.join(bag, "data/case.json"), "utf8")) as { imagesErasedAt: string; drives: { photos: object[]; boards: { chips: { reads: object[] }[] }[] }[] };
    expect(record.imagesErasedAt).toMatch(/^20/);
    expect(record.drives[0].boards[0].chips[0].reads).toMatchObject([{ sha256: sha256(image), erased: { cause: "asked-for" } }, { sha256: sha256(other), erased: { cause: "asked-for" } }]);
    expect(record.drives[0].photos).toMatchObject([{ file: null, erased: { cause: "asked-for" } }]);
    expect(readFileSync(path.join(bag, "README.txt"), "utf8")).toContain("3 files of this case were erased before this bundle was made");
    const report = (await run("pdftotext", ["-layout", path.join(bag, "data/report.pdf"), "-"])).stdout.replace(/\s+/g, " ");
    expect(report).toContain("at the customer’s wish. The image is not in this bundle");
  });

  it("is refused when one is left out that was stored again since", async () => {
    await store(technician, (await makeChip(technician)).chipId, "before", image);
    const plan = await startBundle(lead, chip.caseId);
    expect(plan.images.map((one) => one.sha256)).toEqual([sha256(image)]);
    expect(await judged(lead, chip, plan)).toMatchObject({ faults: [], script: 0 });
    const { faults, script } = await judged(lead, chip, without(await startBundle(lead, chip.caseId), sha256(image)));
    expect(faults.length).toBeGreaterThan(0);
    expect(script).toBe(1);
  });
});
