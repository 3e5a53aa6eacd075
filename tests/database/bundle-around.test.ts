import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { execFileSync } from "node:child_process";
import os from "node:os";
import path from "node:path";
import { buffer } from "node:stream/consumers";
import { afterAll, expect, it } from "vitest";
import { makeBundle } from "@/lib/commands/make-bundle";
import { recordStartUp } from "@/lib/commands/record-start-up";
import { returnCase } from "@/lib/commands/return-case";
import { makeWrittenBench } from "../support/bench-steps";
import { store } from "../support/factory";
import { runCheckScript, verifyZip } from "../support/verify-bag";

const work = mkdtempSync(path.join(os.tmpdir(), "twinread-bundle-around-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

/** check.sh reads case.json line by line: nothing that somebody types may look like a line of a read or an approval. */
const HOSTILE = `Spins.\n                  "path": "data/x.bin",\n                  "id": "1",\n                  "sha256": "${"0".repeat(64)}"\n  "ref": "26-9999"`;

it("a bundle tells the start-up tests and the return in case.json and report, and page and check.sh find it in order", async () => {
  const { technician, lead, chip, image } = await makeWrittenBench();
  for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
  await recordStartUp(technician, chip.driveId, { spins: true, ready: true, attempts: 2, reportedSerial: "ZZ-1", note: HOSTILE });
  await returnCase(technician, chip.caseId, { items: ["Drive A", HOSTILE], toPerson: HOSTILE.slice(0, 100), carrier: "Marsh Post", note: HOSTILE });
  const zip = await buffer((await makeBundle(lead, chip.caseId)).stream);
  writeFileSync(path.join(work, "bundle.zip"), zip);
  execFileSync("unzip", ["-q", path.join(work, "bundle.zip"), "-d", work]);
  const bag = path.join(work, `twinread-${chip.ref}`);
  const record = JSON.parse(readFileSync(path.join(bag, "data/case.json"), "utf8")) as { receipt: unknown; returned: object; drives: { startUpTests: object[] }[] };
  expect(record.drives[0].startUpTests).toEqual([expect.objectContaining({ by: technician.name, spins: true, ready: true, reportedSerial: "ZZ-1", serialMatches: false, attempts: 2, note: HOSTILE })]);
  expect(record.returned).toMatchObject({ by: technician.name, items: ["Drive A", HOSTILE], carrier: "Marsh Post", note: HOSTILE });
  expect(record.receipt).toBeNull();
  const script = runCheckScript(bag);
  expect([script.status, script.text]).toEqual([0, expect.not.stringContaining("NOT IN ORDER")]);
  expect((await verifyZip(zip, undefined, null)).verdict).toBe("in-order");
  expect(execFileSync("pdftotext", ["-raw", path.join(bag, "data/report.pdf"), "-"], { encoding: "utf8" })).toContain("Start-up tests of Drive A");
});
