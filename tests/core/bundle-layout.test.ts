import { describe, expect, it } from "vitest";
import { bagInfoTxt, bagitTxt, bagName, boardLabel, chipFolder, compositePaths, custodyPath, imagePath, manifestLine, readmeTxt, safeName, signatureLine } from "@/lib/core/bundle-layout";
import { donorFit } from "@/lib/core/donor-fit";
import { ascii, sha256Hex } from "./stream";

describe("the texts of a bag", () => {
  it("gives the golden bag's tag manifest", () => {
    // RFC 8493; the digests were computed with sha256sum on a bag made by hand
    const all = sha256Hex(Uint8Array.from({ length: 256 }, (_, n) => n));
    const manifest = manifestLine(all, "data/read-1.bin") + manifestLine(all, "data/read-2.bin") + manifestLine(sha256Hex("ok\n"), "data/summary.txt");
    const info = bagInfoTxt({ date: "2026-01-05", ref: "C-1", octets: 515, files: 3 });
    const tags = manifestLine(sha256Hex(info), "bag-info.txt") + manifestLine(sha256Hex(bagitTxt()), "bagit.txt") + manifestLine(sha256Hex(manifest), "manifest-sha256.txt");
    expect(sha256Hex(bagitTxt())).toBe("1712ecfb074bf29c4188ad3421032509159a09739fd604f8fe57038b4ddefcc9");
    expect(sha256Hex(info)).toBe("d14535b2db4efae4e527e5aa76079c4486a352b2a546687de73bee97c698e8ff");
    expect(sha256Hex(manifest)).toBe("7368d0af87d3668fe331b8b39103ca55eb8e29c19c6970e87a60625676807e93");
    expect(sha256Hex(tags)).toBe("23abfcffa5bb168dab9a197c7aa94da6bb188c1fd6d40dfb4335a43b5978f65e");
  });
  it("names files by what they are", () => {
    expect(bagName("26-0042")).toBe("twinread-26-0042");
    expect(imagePath({ drive: 1, board: "original", designator: "U3", stage: "before", number: 1 })).toBe("data/drives/1/original-U3/before-1.bin");
    expect(chipFolder({ drive: 2, board: boardLabel("donor", 3), designator: "U3" })).toBe("data/drives/2/donor-3-U3");
    expect(boardLabel("original", 1)).toBe("original");
    expect(custodyPath(2)).toBe("data/drives/2/custody");
    expect(signatureLine("ab", "AA==")).toBe("ab AA==\n");
  });
  it.each(["../../etc", "U3/..", "a\\b", "U 3", "U\n3", ".", "", "Ü3", "U_3", "C:"])("lets the designator %j out of no folder", (designator) => {
    const path = imagePath({ drive: 1, board: "donor", designator, stage: "after", number: 2 });
    expect(path).toMatch(/^data\/drives\/1\/donor-[A-Za-z0-9_-]+\/after-2\.bin$/);
    expect(() => manifestLine("0".repeat(64), path)).not.toThrow();
  });
  it("never gives two designators one folder", () => {
    const names = ["U3", "U 3", "U/3", "U_3", "U_2f_3", "U-3", "U.3"].map(safeName);
    expect(new Set(names).size).toBe(names.length);
  });
  it.each(["/etc/passwd", "data/../x", "data//x", "./data/x", "data/x\n", "data/a b", "data\\x", ""])("refuses %j in a manifest", (path) => {
    expect(() => manifestLine("0".repeat(64), path)).toThrow(RangeError);
  });
  it("refuses a digest that isn't one", () => {
    for (const digest of ["", "0".repeat(63), "A".repeat(64)]) expect(() => manifestLine(digest, "data/x")).toThrow(RangeError);
  });
  it("says on one page how to check it, and that one person did both where that is so", () => {
    const given = { ref: "26-0042", workshop: "Alder Lane Drive Bench", madeAt: "2026-03-12T14:00:00Z", drives: 1, images: 7, twoPersonRule: true, composites: [], seal: 12 };
    const text = readmeTxt(given);
    expect(text.split("\n").length).toBeLessThan(76);
    expect(Math.max(...text.split("\n").map((one) => one.length))).toBeLessThanOrEqual(90);
    expect(text).toContain("7 chip images of 1 drive,");
    expect(text).not.toContain("COMPOSITE");
    const composites = compositePaths(["data/drives/1/original-U3/before-6.bin", "data/drives/1/original-U3/before-6-votes.json", "data/drives/1/original-U3/before-5.bin"]);
    expect(composites).toEqual(["data/drives/1/original-U3/before-6.bin"]);
    expect(readmeTxt({ ...given, composites })).toMatch(/One image here was never read as a whole:\n {2}data\/drives\/1\/original-U3\/before-6\.bin\nIt was put together/);
    expect(readmeTxt({ ...given, twoPersonRule: false })).toContain("switched off");
    expect(ascii(text).length).toBe(text.length);
  });
});

describe("a donor board", () => {
  const original = { boardNumber: "BX 40-3179", revision: "C", controllerMarking: "K7 110", motorDriverMarking: "M2" };
  it("fits by its number, without regard to case and blanks", () => {
    expect(donorFit(original, { ...original, boardNumber: "bx40-3179" })).toEqual({ verdict: "fits", differences: [] });
    expect(donorFit(original, { boardNumber: "BX 40-3179", revision: null })).toEqual({ verdict: "fits", differences: [] });
  });
  it.each([["revision", { revision: "D" }], ["controller", { controllerMarking: "K8" }], ["motor driver", { motorDriverMarking: "M3" }]])("with another %s is a caution", (name, over) => {
    const fit = donorFit(original, { ...original, ...over });
    expect(fit.verdict).toBe("caution");
    expect(fit.differences).toHaveLength(1);
    expect(fit.differences[0]).toContain(name);
  });
  it("of another number says so first, and the rest too", () => {
    const fit = donorFit(original, { ...original, boardNumber: "BX 40-3180", revision: "D" });
    expect(fit.verdict).toBe("other-number");
    expect(fit.differences).toEqual(["Board number BX 40-3180; the original has BX 40-3179.", "Another revision: D; the original has C."]);
  });
});
