import { Uint8ArrayReader, Uint8ArrayWriter, ZipWriter } from "@zip.js/zip.js/lib/zip-core-custom.js";
import { describe, expect, it } from "vitest";
import { type Bag, FOLDER, makeBag } from "../support/make-bag";
import { faultsOf, stateOfStep, verifyZip } from "../support/verify-bag";
import { zipBag } from "../support/zip-bag";

const bag = makeBag();

/** An archive by another program: packed, with attributes of its own. */
async function otherZip(files: Bag, options: Record<string, unknown> = {}, last: Record<string, unknown> = {}): Promise<Uint8Array> {
  const writer = new ZipWriter(new Uint8ArrayWriter(), { useWebWorkers: false, ...options });
  const names = [...files.keys()];
  for (const [name, bytes] of files) await writer.add(`${FOLDER}/${name}`, new Uint8ArrayReader(bytes), name === names.at(-1) ? last : {});
  return writer.close();
}

/** The same archive with a name of the same length in place of another, wherever it stands. */
function renamed(zip: Buffer, from: string, to: string): Buffer {
  const other = Buffer.from(zip);
  for (let at = other.indexOf(from); at >= 0; at = other.indexOf(from, at + 1)) other.write(to, at, "latin1");
  return other;
}

describe("an archive", () => {
  it("that the auditor packed anew, smaller, is in order", async () => {
    const report = await verifyZip(await otherZip(bag, { level: 9 }));
    expect(faultsOf(report)).toEqual([]);
    expect(stateOfStep(report, "archive")).toBe("in-order");
  });

  it.each<[string, () => Promise<Uint8Array>, string]>([
    ["with a locked file", () => otherZip(bag, {}, { password: "x", zipCrypto: true }), "locked with a password"],
    ["with a link", () => otherZip(bag, {}, { externalFileAttributes: 0xa1ff0000, versionMadeBy: 0x0314, msDosCompatible: false }), "a link and not a file"],
    ["with a name that leads out", async () => renamed(await zipBag(bag), `${FOLDER}/data/case.json`, `${FOLDER}/../../x.json`), "leads out of the bundle"],
    ["with an absolute name", async () => renamed(await zipBag(bag), `${FOLDER}/data/case.json`, `/${"x".repeat(29)}`), "root of a disk"],
    ["with one name twice", async () => renamed(await zipBag(bag), "before-2.bin", "before-1.bin"), "It is there twice"],
    ["with names that differ in capitals", async () => renamed(await zipBag(bag), "before-2.bin", "Before-1.bin"), "differ only in capitals"],
    ["with something before it", async () => Buffer.concat([Buffer.from("#!/bin/sh\n"), await zipBag(bag)]), "can be read in two ways"],
    ["with something behind it", async () => Buffer.concat([await zipBag(bag), Buffer.from("more")]), ""],
    ["behind another archive", async () => Buffer.concat([await zipBag(makeBag({ drives: 2 })), await zipBag(bag)]), ""],
    ["that was cut short", async () => (await zipBag(bag)).subarray(0, 20_000), "no directory"],
    ["that is empty", async () => Buffer.from("504b0506000000000000000000000000000000000000", "hex"), "no case bundle"],
  ])("%s is not in order", async (_, make, words) => {
    const report = await verifyZip(await make());
    expect(report.verdict).toBe("not-in-order");
    expect(report.steps[0].faults.map((fault) => fault.sentence).join("\n")).toContain(words);
  });

  it("whose file unpacks to more than it says is stopped there", async () => {
    const name = "data/drives/1/original-U12/before-1.bin";
    const zip = Buffer.from(await otherZip(new Map(bag).set(name, Buffer.alloc(5_000_000))));
    // its size in header, descriptor and directory
    const [real, said] = [Buffer.alloc(4), Buffer.alloc(4)];
    real.writeUInt32LE(5_000_000);
    said.writeUInt32LE(64);
    for (let at = zip.indexOf(real); at >= 0; at = zip.indexOf(real, at + 1)) said.copy(zip, at);
    const report = await verifyZip(zip);
    expect(report.steps[0].faults[0]).toMatchObject({ place: name });
    expect(report.verdict).toBe("not-in-order");
  });
});
