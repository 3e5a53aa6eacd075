import { beforeAll, describe, expect, it } from "vitest";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { HIDDEN } from "@/lib/core/other-cases";
import type { Actor } from "@/lib/core/words";
import { benchRows } from "@/lib/queries/bench";
import { caseView } from "@/lib/queries/cases";
import { chipFlatView, chipView } from "@/lib/queries/chip-view";
import { comparedReads } from "@/lib/queries/compare";
import { custodyOfDrive } from "@/lib/queries/custody";
import { decisionView } from "@/lib/queries/decision";
import { driveView } from "@/lib/queries/drives";
import { freshImage, type MadeChip, makeChip, makeUser, store } from "../support/factory";
import { makeLimited } from "../support/limited";

/** One image on chips of three cases; the auditor's list has the first two. */
let [own, near, other]: MadeChip[] = [];
let [limited, whole]: Actor[] = [];

beforeAll(async () => {
  const technician = await makeUser("technician");
  [own, near, other] = [await makeChip(technician), await makeChip(technician), await makeChip(technician)];
  const image = freshImage();
  for (const chip of [near, other, own]) await store(technician, chip.chipId, "before", image);
  const { reads: [wrong] } = await store(technician, own.chipId, "before", freshImage());
  await setReadAside(technician, wrong.id, { reason: `It belongs to ${other.ref}, not to ${near.ref}.` });
  limited = await makeLimited([own.caseId, near.caseId]);
  whole = await makeUser("auditor");
}, 60_000);

const VIEWS: [string, (actor: Actor) => Promise<unknown>][] = [
  ["chip", (a) => chipView(a, own.chipId)],
  ["chip for a script", (a) => chipFlatView(a, own.chipId)],
  ["decision sheet", (a) => decisionView(a, own.chipId)],
  ["compare page", (a) => comparedReads(a, own.chipId, { reads: [1, 2], stage: "before" })],
  ["log", async (a) => (await custodyOfDrive(a, own.driveId)).entries.map(({ sentence }) => sentence)],
  ["case", (a) => caseView(a, own.caseId)],
  ["drive", (a) => driveView(a, own.driveId)],
  ["bench", (a) => benchRows(a)],
];

describe("a finding that names another case", () => {
  for (const [name, look] of VIEWS) {
    it(`${name}: names a case on the list, and none outside it`, async () => {
      const [to, without] = [JSON.stringify(await look(whole)), JSON.stringify(await look(limited))];
      expect(without).not.toContain(other.ref);
      // whoever sees everything reads the number; the drive and case pages carry only the chip's state
      if (["chip", "chip for a script", "decision sheet", "compare page", "log"].includes(name)) {
        expect(to).toContain(other.ref);
        expect(without).toContain(HIDDEN);
        expect(without).toContain(near.ref);
      }
    });
  }

  it("stays word for word in the log's bodies: they are what the hashes and signatures cover", async () => {
    const bodies = async (actor: Actor) => (await custodyOfDrive(actor, own.driveId)).entries.map((entry) => [entry.body, entry.hash]);
    expect(await bodies(limited)).toEqual(await bodies(whole));
  });
});
