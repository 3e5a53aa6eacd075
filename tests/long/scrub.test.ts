import { spawnSync } from "node:child_process";
import { createCipheriv, createHash } from "node:crypto";
import { writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { type ScrubOptions, scrubNextDrive } from "@/lib/commands/scrub-round";
import { MIB } from "@/lib/limits";
import { Image, Mail } from "@/models";
import { logged } from "../support/bench-steps";
import { logOf, makeChip, makeUser, sha256, store } from "../support/factory";
import { manyReads } from "../support/many-images";
import { asAdmin, damageImage, imageFile } from "../support/tamper";

// `npm run bench:scrub`: how fast stored images are read again, and that 10,000 good ones raise no alarm. The report goes
// to docs/bench-scrub.md.
const ROUNDS = 5;
const GOOD = 10_000;
const LARGE = 8;

const report: Record<string, string> = {};
const sorted = (list: number[]) => [...list].sort((a, b) => a - b);
const median = (list: number[]) => sorted(list)[Math.floor(list.length / 2)];
const dense = (seed: string, size: number) => createCipheriv("aes-256-ctr", createHash("sha256").update(seed).digest(), Buffer.alloc(16)).update(Buffer.alloc(size));

async function scrubAll(options: Partial<ScrubOptions> = {}): Promise<number> {
  let read = 0;
  for (let n = await scrubNextDrive({ days: 7, bytesPerSecond: null, ...options }); n !== null; n = await scrubNextDrive({ days: 7, bytesPerSecond: null, ...options })) read += n;
  return read;
}
const makeDue = () => asAdmin((db) => db.query("UPDATE images SET stored_at = UTC_TIMESTAMP(6) - INTERVAL 8 DAY, checked_at = NULL"));

async function driveWith(images: Buffer[]): Promise<string> {
  const technician = await makeUser("technician");
  const chip = await makeChip(technician, { sizeBytes: images[0].length });
  await store(technician, chip.chipId, "before", images[0]);
  const read = (await logOf(chip.driveId)).find((entry) => entry.action === "read.stored")!;
  await manyReads((read.facts.read as { id: string }).id, images.slice(1));
  return chip.driveId;
}

describe("the scrub, measured", () => {
  it("reads large images about as fast as sha256sum", async () => {
    const images = Array.from({ length: LARGE }, (_, n) => dense(`large ${n}`, 64 * MIB));
    const files = images.map((image) => imageFile(sha256(image)));
    await driveWith(images);
    const [took, yard]: [number[], number[]] = [[], []];
    for (let round = 0; round <= ROUNDS; round += 1) {
      await makeDue();
      const began = performance.now();
      expect(await scrubAll()).toBe(LARGE);
      const middle = performance.now();
      expect(spawnSync("sha256sum", files).status).toBe(0);
      // the first round warms up
      if (round > 0) [took, yard].forEach((list, i) => list.push(i === 0 ? middle - began : performance.now() - middle));
    }
    const ratios = sorted(took.map((ms, i) => ms / yard[i]));
    const speed = (ms: number) => (LARGE * 64) / (ms / 1000);
    report.speed = `| reading ${LARGE} images of 64 MiB, unthrottled | ${speed(median(took)).toFixed(0)} MiB/s | at least 300 | ${speed(median(took)) >= 300 ? "kept" : "**not kept**"} |
| \`sha256sum\` of the same files in the same run | ${speed(median(yard)).toFixed(0)} MiB/s | | |
| the scrub's time as a ratio to it | ${median(ratios).toFixed(2)} (${ratios[0].toFixed(2)} to ${ratios.at(-1)!.toFixed(2)}) | at most 1.3 | ${median(ratios) <= 1.3 ? "kept" : "**not kept**"} |`;
    await makeDue();
    const began = performance.now();
    await scrubAll({ bytesPerSecond: 200 * MIB });
    const held = speed(performance.now() - began);
    report.held = `| the same, held to 200 MiB/s | ${held.toFixed(0)} MiB/s | at most 200 | ${held <= 200 ? "kept" : "**not kept**"} |`;
    await asAdmin((db) => db.query("UPDATE images SET checked_at = UTC_TIMESTAMP(6)"));
    expect(held).toBeLessThanOrEqual(205);
  });

  it("raises no alarm over 10,000 good images, and finds the one bad bit among them", async () => {
    const images = Array.from({ length: GOOD }, (_, n) => dense(`good ${n}`, 64 + (n % 4096)));
    const drive = await driveWith(images);
    await asAdmin((db) => db.query("UPDATE images SET stored_at = UTC_TIMESTAMP(6) - INTERVAL 8 DAY, checked_at = NULL WHERE size_bytes < 8192"));
    const began = performance.now();
    const read = await scrubAll();
    const seconds = (performance.now() - began) / 1000;
    expect(read).toBe(GOOD);
    const alarms = (await Image.count({ where: { state: ["damaged", "missing"] } })) + (await logged(drive, "image.second-look")).length;
    expect([alarms, await Mail.count()]).toEqual([0, 0]);
    expect(await logged(drive, "images.checked")).toEqual([expect.objectContaining({ images: GOOD, damaged: 0, missing: 0 })]);
    damageImage(sha256(images[GOOD / 2]), 17);
    await asAdmin((db) => db.query("UPDATE images SET stored_at = UTC_TIMESTAMP(6) - INTERVAL 8 DAY, checked_at = NULL WHERE size_bytes < 8192"));
    await scrubAll();
    expect(await logged(drive, "image.found-damaged")).toEqual([{ sha256: sha256(images[GOOD / 2]), state: "damaged", where: "scrub" }]);
    report.good = `| false alarms over ${GOOD.toLocaleString("en")} good images of 64 to 4,159 bytes | ${alarms} | 0 | ${alarms === 0 ? "kept" : "**not kept**"} |
| the one bit then flipped in one of them | found | found | kept |
| small images a second, each with its row | ${(GOOD / seconds).toFixed(0)} | | |`;
  });
});

afterAll(() => {
  const hours = (1024 * 1024) / 20 / 3600;
  writeFileSync(path.join(import.meta.dirname, "../../docs/bench-scrub.md"), `# Reading stored images again

Made by \`npm run bench:scrub\` on ${os.cpus().length} processors, Node ${process.versions.node}, on the real database, files in the page cache, ${ROUNDS} rounds after one
to warm up, each right before its yardstick. Median (least to most). Where other programs run beside it only the ratio tells.

| what | figure | aim | |
|---|---|---|---|
${report.speed}
${report.held}
${report.good}

At the default of 20 MiB a second one TiB of images takes ${hours.toFixed(1)} hours; within the default of 7 days ${((7 * 24) / hours).toFixed(1)} TiB are read once.
What is still in the system's memory is read from there, not from the disk: an image that was opened in the hours before is verified
as the system would give it out. That every bit of a small image counts, every kind of damage, and a kill at every step are part of \`npm test\`
(\`tests/database/scrub.test.ts\`).
`);
});
