import { describe, expect, it } from "vitest";
import { changedFields } from "@/components/drive/changed-fields";
import { chipForm } from "@/components/drive/chip-form";
import { sizeFromText, sizeHint, sizeNote } from "@/components/drive/size-words";

describe("a size as people type it", () => {
  it.each([["524288", 524288], ["524,288", 524288], ["512 KiB", 524288], ["4 Mbit", 524288], ["64kbit", 8192], ["0x80000", 524288], ["16 MiB", 16777216], ["1 byte", 1]])("reads %s", (text, bytes) => {
    expect(sizeFromText(text)).toBe(bytes);
  });
  it.each(["", "big", "4 Mb", "512 KB", "1.5 MiB", "-4", "5,12"])("does not guess at %s", (text) => {
    expect(sizeFromText(text)).toBeNull();
  });
  it("shows the same size in bytes and in bits", () => {
    expect(sizeHint("512 KiB")).toBe("524,288 bytes, 512 KiB, 4 Mbit");
    expect(sizeHint("300")).toBe("300 bytes");
  });
  it("notes a size that is no power of two and refuses none", () => {
    expect(sizeNote("24 KiB")).toContain("Not a power of two");
    expect(sizeNote("32 KiB")).toBeNull();
  });
});

const chip = { designator: "u3", bus: "spi", sizeBytes: "512 KiB", sizeSource: "marking", supplyMillivolts: "3300", package: "", marking: "", holds: "", needsTransfer: true, pairedWith: "" };

describe("the form of a chip", () => {
  it("takes a size with its unit and an empty pair as none", () => {
    expect(chipForm.parse(chip)).toMatchObject({ designator: "U3", sizeBytes: 524288, supplyMillivolts: 3300, package: null, pairedWith: null });
  });
  it("does not take an unanswered supply for an answer", () => {
    expect(chipForm.safeParse({ ...chip, supplyMillivolts: "" }).success).toBe(false);
    expect(chipForm.parse({ ...chip, supplyMillivolts: "unknown" }).supplyMillivolts).toBe("unknown");
  });
  it("does not take an empty size for zero or one byte", () => {
    expect(chipForm.safeParse({ ...chip, sizeBytes: "" }).success).toBe(false);
    expect(chipForm.safeParse({ ...chip, sizeBytes: "4 Mb" }).success).toBe(false);
  });
});

describe("a correction", () => {
  it("names only the fields that change, and an emptied one as null", () => {
    expect(changedFields({ a: "1", b: "2", c: null as string | null }, { a: "1", b: "3", c: null })).toEqual({ b: "3" });
    expect(changedFields({ a: "1" as string | null }, { a: null })).toEqual({ a: null });
  });
});
