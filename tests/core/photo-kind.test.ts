import { describe, expect, it } from "vitest";
import { endingAgainst, endingOf, exifHasLocation, sniffPhoto } from "@/lib/core/photo-kind";

const bytes = (text: string) => Uint8Array.from(text, (c) => c.charCodeAt(0));
const sniff = (text: string) => sniffPhoto(bytes(text));
const refusal = (text: string) => (sniff(text) as { refused: string }).refused;
const isoHead = (major: string, ...more: string[]) => `\0\0\0${String.fromCharCode(16 + 4 * more.length)}ftyp${major}\0\0\0\0${more.join("")}`;

describe("what a photo is, by its first bytes", () => {
  // W3C PNG 3rd ed. 5.2; ITU-T T.81 B.1.1.3; RFC 9649 2; ISO 32000-2 7.5.2
  it.each([
    ["\xff\xd8\xff\xe0\0\x10JFIF", "image/jpeg"], ["\xff\xd8\xff\xe1", "image/jpeg"], ["\x89PNG\r\n\x1a\n\0\0\0\rIHDR", "image/png"],
    ["RIFF\x24\0\0\0WEBPVP8 ", "image/webp"], ["%PDF-1.7\n", "application/pdf"], ["%PDF-2.0\n", "application/pdf"],
  ])("knows %j", (head, type) => {
    expect(sniff(head)).toEqual({ type });
  });

  it.each([
    [isoHead("heic", "mif1", "heic"), "This is a HEIC photo. Set the phone's camera to 'most compatible', or share it as JPEG, then send it again."],
    [isoHead("mif1", "heic"), "HEIC"], [isoHead("heix"), "HEIC"], [isoHead("msf1", "hevc"), "HEIC"],
    [isoHead("avif", "mif1"), "AVIF"], [isoHead("mif1", "avif"), "AVIF"], [isoHead("isom", "mp42"), "a video"], [isoHead("qt  "), "a video"],
    ["GIF89a", "a GIF"], ["II*\0", "a TIFF"], ["MM\0*", "a TIFF"], ["BM1234", "a BMP"], ["PK\x03\x04", "an archive"], ["\x1f\x8b\x08", "an archive"], ["MZ\x90\0", "a program"],
    ["<svg xmlns='http://www.w3.org/2000/svg'>", "markup"], ["<?xml version='1.0'?><svg/>", "markup"], ["  <!DOCTYPE html>", "markup"], ["\xef\xbb\xbf<html>", "markup"], ["<script>", "markup"],
    ["RIFF\x24\0\0\0WAVEfmt ", "no photo"], ["hello", "no photo"], ["\xff\xd8", "no photo"], ["%PDF-", "no photo"], [" %PDF-1.4", "no photo"], ["", "empty"],
  ])("refuses %j and says what it is", (head, words) => {
    expect(refusal(head)).toContain(words);
  });

  it("reads brands only as far as the box goes", () => {
    const short = `\0\0\0\x14ftypisom\0\0\0\0iso2heic`;
    expect(refusal(short)).toContain("a video");
    expect(refusal(`\xff\xff\xff\xffftypmif1\0\0\0\0heic`)).toContain("HEIC");
    expect(refusal("\0\0\0\0ftyp")).toContain("a video");
  });
});

describe("the name's ending", () => {
  it.each([["a.jpg", "jpg"], ["a.JPEG", "jpeg"], ["photo", ""], ["board rev.C", ""], ["a.tar.gz", "gz"], [".png", "png"], ["a.1234", ""], ["x.\u202Egpj", ""]])("%j ends in %j", (name, ending) => {
    expect(endingOf(name)).toBe(ending);
  });

  it("has to agree with the content where there is one", () => {
    for (const name of ["a.jpg", "A.JPE", "b.jfif", "no ending"]) expect(endingAgainst(name, "image/jpeg")).toBeNull();
    expect(endingAgainst("a.png", "image/jpeg")).toBe("Its name ends in .png, but it holds a JPEG. Check that it is the right file, or let its name end in .jpg, then send it again.");
    for (const name of ["a.html", "a.svg", "a.jpg.exe", "a.heic"]) expect(endingAgainst(name, "image/png")).not.toBeNull();
  });
});

describe("the place where it was taken (EXIF 2.32, 4.6.3)", () => {
  const tiff = (little: boolean, tag: number, gpsEntries: number) => {
    const view = new DataView(new ArrayBuffer(64));
    view.setUint16(0, little ? 0x4949 : 0x4d4d);
    view.setUint16(2, 42, little);
    view.setUint32(4, 8, little);
    view.setUint16(8, 1, little);
    view.setUint16(10, tag, little);
    view.setUint16(12, 4, little);
    view.setUint32(14, 1, little);
    view.setUint32(18, 40, little);
    view.setUint16(40, gpsEntries, little);
    return new Uint8Array(view.buffer);
  };
  it("is found in both byte orders, with and without the header", () => {
    for (const little of [true, false]) {
      expect(exifHasLocation(tiff(little, 0x8825, 4))).toBe(true);
      expect(exifHasLocation(Uint8Array.from([...bytes("Exif\0\0"), ...tiff(little, 0x8825, 4)]))).toBe(true);
      expect(exifHasLocation(tiff(little, 0x8825, 0))).toBe(false);
      expect(exifHasLocation(tiff(little, 0x8769, 4))).toBe(false);
    }
  });
  it("never reads past the end of broken bytes", () => {
    const whole = tiff(true, 0x8825, 4);
    for (let length = 0; length < whole.length; length += 1) expect(() => exifHasLocation(whole.subarray(0, length))).not.toThrow();
    expect(exifHasLocation(Uint8Array.from([...bytes("II*\0"), 0xff, 0xff, 0xff, 0xff]))).toBe(false);
  });
});
