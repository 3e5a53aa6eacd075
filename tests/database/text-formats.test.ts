import { randomUUID } from "node:crypto";
import { buffer } from "node:stream/consumers";
import { describe, expect, it } from "vitest";
import { openHandedOut } from "@/lib/commands/hand-out-image";
import { fromImage, toImage } from "@/lib/core/text-format";
import { chipView } from "@/lib/queries/chip-view";
import { checkImage } from "@/storage";
import { makeChip, makeUser, sha256, store, firmware } from "../support/factory";

describe.each(["intel-hex", "s-record"] as const)("a read that comes as %s", (format) => {
  it("is expanded with the base, size and fill that were given, and its text is kept as it came", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician, { sizeBytes: 4096 });
    const image = firmware(`text-${randomUUID()}`, 4096);
    const text = fromImage(format, image, { base: 0x1000 });
    const { reads: [read] } = await store(technician, chip.chipId, "before", text, 1, { format, base: 0x1000, size: 4096, fill: 0xff }, "read.txt");
    expect(read.sha256).toBe(sha256(image));
    expect(read.sizeBytes).toBe(4096);
    expect(read.source).toEqual({ sha256: sha256(text), base: 0x1000, fill: 0xff });
    expect(await checkImage(sha256(text), text.length)).toBe("sound");
  });

  it("is refused with its line number when a checksum is wrong, and nothing is stored", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician, { sizeBytes: 4096 });
    const lines = Buffer.from(fromImage(format, firmware(`bad-${randomUUID()}`, 4096))).toString("ascii").split("\n");
    const at = lines.findIndex((line, i) => i > 2 && line.length > 20);
    lines[at] = lines[at].replace(/.(\r?)$/, (last, cr: string) => (last.startsWith("0") ? "1" : "0") + cr);
    await expect(store(technician, chip.chipId, "before", Buffer.from(lines.join("\n")), 1, { format, base: 0, size: 4096, fill: 0xff }))
      .rejects.toThrow(new RegExp(`Line ${at + 1} `));
    expect((await chipView(technician, chip.chipId)).reads).toEqual([]);
  });

  it("is refused without base, size or fill, and a raw read with one", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician, { sizeBytes: 64 });
    await expect(store(technician, chip.chipId, "before", fromImage(format, firmware("x", 64)), 1, { format, base: 0, size: 64 })).rejects.toThrow(/fill/);
    await expect(store(technician, chip.chipId, "before", firmware("x", 64), 1, { base: 0 })).rejects.toThrow(/raw image has no base/);
  });

  it("can leave the house as text that gives the same image again", async () => {
    const lead = await makeUser("lead");
    const chip = await makeChip(lead, { sizeBytes: 4096 });
    const image = firmware(`out-${randomUUID()}`, 4096);
    const { reads: [read] } = await store(lead, chip.chipId, "before", image);
    const out = await openHandedOut(lead, read.id, { reason: "For a tool that takes text only.", format });
    const text = await buffer(out.stream);
    expect(sha256(text)).toBe(out.fileSha256);
    expect(Buffer.from(toImage(format, text, { base: 0, size: 4096, fill: 0 }).bytes)).toEqual(image);
  });
});
