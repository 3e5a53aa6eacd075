import { describe, expect, it } from "vitest";
import { driveFromRequest, recordDriveAddress } from "@/lib/core/drive-from-request";
import { fitText, inGroups, PAPERS, shorten } from "@/lib/core/paper";
import { differsText } from "@/lib/core/receipt-words";

const box = { width: 27, height: 7, largest: 10, smallest: 4 };

describe("long values on paper", () => {
  it("keep the largest size while they fit, then shrink, and lose only their middle", () => {
    expect(fitText("S1", box)).toEqual({ points: 10, text: "S1" });
    for (let length = 1; length <= 400; length += 1) {
      const text = `A${"x".repeat(Math.max(0, length - 2))}Z`.slice(0, length);
      const fitted = fitText(text, box);
      expect(fitted.points).toBeLessThanOrEqual(10);
      expect(fitted.points).toBeGreaterThanOrEqual(4);
      const across = Math.floor(box.width / (fitted.points * (25.4 / 72) * 0.64));
      expect(Math.ceil(fitted.text.length / across) * fitted.points * (25.4 / 72) * 1.2).toBeLessThanOrEqual(box.height + 1e-6);
      if (fitted.text !== text) expect([fitted.points, fitted.text[0], fitted.text.at(-1), fitted.text.includes("…")]).toEqual([4, "A", "Z", true]);
    }
  });

  it("stay on one line down to 6.5 points, and break at spaces before they break a word", () => {
    expect(fitText("PN 4471-0093-B", { ...box, height: 20 })).toEqual({ points: 8.5, text: "PN 4471-0093-B" });
    expect(fitText(`${"a".repeat(12)} ${"b".repeat(12)} c`, { ...box, height: 8 }).points).toBe(8.5);
  });

  it("let the longest part number that a form takes onto a label whole", () => {
    const longest = "P".repeat(120);
    expect(fitText(longest, { width: 28, height: 7.6, largest: 10, smallest: 4 }).text).toBe(longest);
  });

  it("say where prose goes on, and count a line break as a line", () => {
    expect(shorten("short", 10)).toEqual({ text: "short", shortened: false });
    expect(shorten("a".repeat(11), 10)).toEqual({ text: `${"a".repeat(10)} …`, shortened: true });
    expect(shorten("a\nb\nc", 100)).toEqual({ text: "a\nb …", shortened: true });
  });

  it("group a digest without losing a digit", () => {
    const digest = "0123456789abcdef".repeat(4);
    expect(inGroups(digest)).toEqual(["01234567", "89abcdef", "01234567", "89abcdef", "01234567", "89abcdef", "01234567", "89abcdef"]);
  });

  it("are of the sizes of ISO 216", () => {
    expect([PAPERS.a4, PAPERS.a5, PAPERS.a6].map(({ width, height }) => [width, height])).toEqual([[210, 297], [148, 210], [105, 148]]);
  });
});

describe("what a request says of the drive", () => {
  it("goes into the form of the drive, and answers of any other shape do no harm", () => {
    const asked = driveFromRequest({ partNumber: " PN 4471-0093-B ", serial: "", model: null, boardNumber: "BX 40-3179", boardRevision: "rev C", made: "03/2019", name: "Edda Finch" });
    expect(asked).toEqual({ partNumber: "PN 4471-0093-B", made: "03/2019", boardNumber: "BX 40-3179", revision: "rev C" });
    for (const odd of [null, undefined, 7, "text", [], { partNumber: 5 }, { partNumber: { a: 1 } }]) expect(driveFromRequest(odd)).toEqual({});
    expect(recordDriveAddress("c1", { ...asked, serial: "A&B=1" })).toBe("/cases/c1?record=drive&partNumber=PN+4471-0093-B&serial=A%26B%3D1");
  });

  it("is compared line by line: only what is not so is told", () => {
    expect(differsText([{ what: "Part number", asSent: "yes", text: "left over" }])).toBeNull();
    expect(differsText([{ what: "Serial number", asSent: "no", text: "9K\nQ3" }, { what: "Enclosure", asSent: "none" }], "A second drive lay in it")).toBe("Serial number is not so: 9K Q3; Enclosure is not there; A second drive lay in it");
  });
});
