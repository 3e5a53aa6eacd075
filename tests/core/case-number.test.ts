import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { caseRef, checkCharacter, checkCharacterDiffers, parseCaseRef, readCaseRef, withCheck } from "@/lib/core/case-number";

describe("check character", () => {
  // ISO/IEC 7064 MOD 37,36; the first is a published example of the Global Release Identifier, the last two are our own
  it.each([
    ["A12425GABC1234002", "M"], ["9", "J"], ["TBR", "1"], ["RABD", "A"], ["X0H", "X"], ["EFWW032G2TI", "U"], ["2026000123", "H"], ["D2026000123", "V"],
  ])("of %s is %s", (text, expected) => expect(checkCharacter(text)).toBe(expected));
  it("finds every single mistyped digit", () => {
    fc.assert(fc.property(fc.nat(9999), fc.nat(5), fc.integer({ min: 1, max: 9 }), (n, at, by) => {
      const ref = caseRef(2026, n);
      const digits = [...ref];
      const place = at < 2 ? at : at + 1;
      digits[place] = String((Number(digits[place]) + by) % 10);
      expect(parseCaseRef(`${digits.join("")}.${checkCharacter(ref)}`)).toBeNull();
    }));
  });
});

describe("case numbers", () => {
  it("has two digits of the year and four or more of the count", () => {
    expect([caseRef(2026, 42), caseRef(2026, 12_345), caseRef(2100, 1)]).toEqual(["26-0042", "26-12345", "00-0001"]);
    expect(withCheck("26-0183")).toBe("26-0183.4");
  });
  it("accepts both forms in any case and with blanks around", () => {
    expect(parseCaseRef(" 26-0183 ")).toBe("26-0183");
    expect(parseCaseRef("26-0183.4")).toBe("26-0183");
    for (let n = 1; n < 60; n += 1) expect(parseCaseRef(withCheck(caseRef(2026, n)).toLowerCase())).toBe(caseRef(2026, n));
  });
  it("tells a wrong check character from something else", () => {
    expect(readCaseRef("26-0183.5")).toEqual({ kind: "check-character-differs", ref: "26-0183", found: "5", expected: "4" });
    expect(checkCharacterDiffers("26-0183.5")).toBe(true);
    expect(checkCharacterDiffers("26-0183")).toBe(false);
    expect(checkCharacterDiffers("PN 4471")).toBe(false);
  });
  it.each(["", "26-183", "2026-0183", "26-0183.", "26-0183.44", "26-00183", "26_0183", "26-0183.4\n26-0184"])("takes %j for no case number", (text) => {
    expect(parseCaseRef(text)).toBeNull();
  });
});
