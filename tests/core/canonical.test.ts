import { describe, expect, it } from "vitest";
import { CanonicalError, canonicalJson, rfc8785 } from "@/lib/core/canonical";
import { sha256Hex } from "./stream";

describe("RFC 8785", () => {
  it("gives the text of section 3.2.2", () => {
    // the sample's input from memory of RFC 8785 section 3.2.2
    const input: unknown = JSON.parse('{"numbers":[333333333.33333329,1E30,4.50,2e-3,0.000000000000000000000000001],"string":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}');
    const text = rfc8785(input);
    expect(text).toBe('{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}');
    expect(Buffer.byteLength(text)).toBe(118);
    expect(sha256Hex(text)).toBe("2d5e01a318d0f0879ab568c4be289c8b1f64ef8921a53c6277d5e069978baacb");
  });
  it("sorts keys by UTF-16 units as in section 3.2.3", () => {
    const keys = Object.keys(JSON.parse(rfc8785({ "\u20ac": 1, "\r": 2, "\ufb33": 3, "1": 4, "\u{1f600}": 5, "\u0080": 6, "\u00f6": 7 })) as object);
    // an object's whole-number key comes first in JavaScript; the text below pins the real order
    expect(keys).toHaveLength(7);
    expect(rfc8785({ "\u20ac": 1, "\r": 2, "\ufb33": 3, "1": 4, "\u{1f600}": 5, "\u0080": 6, "\u00f6": 7 }))
      .toBe('{"\\r":2,"1":4,"\u0080":6,"ö":7,"€":1,"\u{1f600}":5,"\ufb33":3}');
  });
  // The RFC author's public test data (testdata/input of his json-canonicalization repository), lengths and digests re-made
  // with independent tools: values.json and weird.json.
  it.each([
    [
      "values.json", 120, "0af3685dce30daa753153aadb1956b0f3133642fbe5d4a5e3a4267f94814ba87",
      '{"numbers":[1E30,4.50,333333333.33333329,2e-3,0.000000000000000000000000001],"escaping":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}',
      '{"escaping":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/","literals":[null,true,false],"numbers":[1e+30,4.5,333333333.3333333,0.002,1e-27]}',
    ],
    [
      "weird.json", 176, "92591c387de83f90a4f5a7b853081c9482ee5bf076e8e309366de6f215cfcbfb",
      '{"\\u20ac":"Euro Sign","1":"One","\\u0080":"Control\\u007f","\\ud83d\\ude02":"Smiley","\\u00f6":"Latin Small Letter O With Diaeresis","\\ufb33":"Hebrew Letter Dalet With Dagesh","</script>":"Browser Challenge"}',
      // a surrogate pair sorts before U+FB33, and U+007F is no control to be escaped
      '{"1":"One","</script>":"Browser Challenge","\u0080":"Control\u007f","ö":"Latin Small Letter O With Diaeresis","€":"Euro Sign","\u{1f602}":"Smiley","\ufb33":"Hebrew Letter Dalet With Dagesh"}',
    ],
    [
      // RFC 8785 section 3.2.3, from memory; the values too
      "the sample of section 3.2.3", 180, "5e321556d22018a9656991a9e94f77ec175fa193e52a2429d312f8419ec8b08c",
      '{"\\u20ac":"Euro Sign","\\r":"Carriage Return","\\ufb33":"Hebrew Letter Dalet With Dagesh","1":"One","\\ud83d\\ude00":"Emoji: Grinning Face","\\u0080":"Control","\\u00f6":"Latin Small Letter O With Diaeresis"}',
      '{"\\r":"Carriage Return","1":"One","\u0080":"Control","ö":"Latin Small Letter O With Diaeresis","€":"Euro Sign","\u{1f600}":"Emoji: Grinning Face","\ufb33":"Hebrew Letter Dalet With Dagesh"}',
    ],
  ])("gives the text of %s", (_name, bytes, digest, input, canonical) => {
    const text = rfc8785(JSON.parse(input));
    expect(text).toBe(canonical);
    expect([Buffer.byteLength(text), sha256Hex(text)]).toEqual([bytes, digest]);
  });
  // RFC 8785 appendix B: IEEE 754 bits and their text
  it.each([
    ["4340000000000000", "9007199254740992"], ["444b1ae4d6e2ef50", "1e+21"], ["444b1ae4d6e2ef4e", "999999999999999700000"],
    ["3eb0c6f7a0b5ed8d", "0.000001"], ["3eb0c6f7a0b5ed8c", "9.999999999999997e-7"], ["44b52d02c7e14af6", "1e+23"],
    ["44b52d02c7e14af5", "9.999999999999997e+22"], ["8000000000000000", "0"], ["0000000000000001", "5e-324"], ["43143ff3c1cb0959", "1424953923781206.2"],
  ])("writes %s as %s", (bits, text) => {
    expect(rfc8785(Buffer.from(bits, "hex").readDoubleBE())).toBe(text);
  });
});

describe("evidence refuses what has no single form", () => {
  const self: Record<string, unknown> = {};
  self.self = self;
  it.each([
    ["undefined", { facts: { a: undefined } }, "$.facts.a"],
    ["a hole in a list", { a: [1, , 2] }, "$.a[1]"],
    ["a fraction", { ratio: 0.5 }, "$.ratio"],
    ["NaN", { n: NaN }, "$.n"],
    ["Infinity", [Infinity], "$[0]"],
    ["a number beyond 2^53-1", { n: 2 ** 53 }, "$.n"],
    ["minus zero", { n: -0 }, "$.n"],
    ["a big integer", { n: 1n }, "$.n"],
    ["a function", { f: () => 1 }, "$.f"],
    ["a date", { at: new Date(0) }, "$.at"],
    ["bytes", { b: new Uint8Array(2) }, "$.b"],
    ["a lone surrogate in text", { t: "a\ud800" }, "$.t"],
    ["a lone surrogate in a key", { "\udc00": 1 }, "$.\udc00"],
    ["a symbol", Symbol("s"), "$"],
    ["what contains itself", self, "$.self"],
    ["nothing", undefined, "$"],
  ])("%s", (_name, value, path) => {
    expect(() => canonicalJson(value)).toThrow(CanonicalError);
    try {
      canonicalJson(value);
    } catch (error) {
      expect((error as CanonicalError).path).toBe(path);
    }
  });
  it("keeps text as it came, never normalised", () => {
    expect(canonicalJson({ nfc: "\u00e9", nfd: "e\u0301", pair: "\u{1f600}" })).toBe('{"nfc":"\u00e9","nfd":"e\u0301","pair":"\u{1f600}"}');
    expect(canonicalJson({ n: Number.MAX_SAFE_INTEGER, z: [null, true, 0] })).toBe('{"n":9007199254740991,"z":[null,true,0]}');
  });
});
