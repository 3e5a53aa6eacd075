import { describe, expect, it } from "vitest";
import { addressesIn, formatByLook, heldBecause, lookAt as lookBy } from "@/components/chip/file-look";
import { fieldsToSend, FIELD_NAMES, type UploadFormValues } from "@/components/chip/upload-form";
import { uploadForm } from "@/components/chip/upload-rules";
import { fromImage } from "@/lib/core/text-format";

/** in the browser a worker does this */
const lookAt = (file: File) => lookBy(file, async (text, format) => addressesIn(format, new Uint8Array(await text.arrayBuffer())));
const image = Uint8Array.from({ length: 300 }, (_, i) => (i * 7) & 0xff);
const fileOf = (bytes: Uint8Array, name: string) => new File([new Uint8Array(bytes)], name);
const form = { stage: "before", seating: "1", reader: "R2", method: "", toolVersion: "", adapter: "", clockKilohertz: "", controllerHeld: "", note: "", supplyMillivolts: "3300" };

describe("what a dropped file looks like", () => {
  it("knows both texts by their first characters, whatever the name, and gives their addresses", async () => {
    const hex = await lookAt(fileOf(fromImage("intel-hex", image, { base: 0x1000 }), "image.bin"));
    expect(hex).toMatchObject({ looks: "intel-hex", addresses: { first: 0x1000, last: 0x1000 + 299 }, problem: null });
    const record = await lookAt(fileOf(fromImage("s-record", image), "image.srec"));
    expect(record).toMatchObject({ looks: "s-record", addresses: { first: 0, last: 299 } });
    expect(record.because).toContain("its name ends in .srec and");
  });

  it("takes binary under a text's name for what it is", () => {
    expect(formatByLook("image.hex", "\u0000\u0001")).toEqual({ looks: "raw", because: "its name ends in .hex, but its first bytes are no such text" });
  });

  it("gives the line of a text that is damaged", async () => {
    const text = new TextDecoder().decode(fromImage("intel-hex", image)).replace(/..$/m, "00");
    expect((await lookAt(fileOf(new TextEncoder().encode(text), "image.hex"))).problem).toMatch(/^Line 1 has the checksum 00/);
  });
});

describe("a file waits", () => {
  it("while its look isn't what the form says, and never goes as a text without a person", async () => {
    const hex = await lookAt(fileOf(fromImage("intel-hex", image), "image.hex"));
    expect(heldBecause(hex, "raw", null)).toContain("Looks like Intel HEX text: its name ends in .hex");
    expect(heldBecause(hex, "intel-hex", null)).toBe("Gives addresses 0x0000 to 0x012B. Say base, size and fill, then send.");
  });

  it("while base and size don't hold all its addresses", async () => {
    const hex = await lookAt(fileOf(fromImage("intel-hex", image, { base: 0x100 }), "image.hex"));
    expect(heldBecause(hex, "intel-hex", { base: 0, size: 300 })).toContain("0x0100 to 0x022B, and the image would run from 0x0000 to 0x012B");
    expect(heldBecause(hex, "intel-hex", { base: 0x100, size: 300 })).toBeNull();
  });

  it("no longer, when it is raw and the form says so", async () => {
    expect(heldBecause(await lookAt(fileOf(image, "image.bin")), "raw", null)).toBeNull();
  });
});

describe("base, size and fill", () => {
  it("are asked for with a text, and refused outside what an image can be", () => {
    const missing = uploadForm.safeParse({ ...form, format: "intel-hex", base: "", size: "0", fill: "" });
    expect(missing.error?.issues.map((i) => i.path.join()).sort()).toEqual(["base", "fill", "size"]);
    expect(uploadForm.safeParse({ ...form, format: "s-record", base: "0x8000", size: "0x80000", fill: "0xFF" }).data).toMatchObject({ base: 0x8000, size: 524_288, fill: 255 });
  });

  it("never go with a raw image", () => {
    const values = { ...Object.fromEntries(FIELD_NAMES.map((name) => [name, "7"])), format: "raw" } as UploadFormValues;
    expect(fieldsToSend(values)).toMatchObject({ base: "", size: "", fill: "", seating: "7" });
    expect(fieldsToSend({ ...values, format: "s-record" })).toMatchObject({ base: "7", size: "7", fill: "7" });
  });
});
