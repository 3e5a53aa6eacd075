import { createHash } from "node:crypto";
import { crc32 as zlibCrc32 } from "node:zlib";
import { sha256 as nobleSha256 } from "@noble/hashes/sha2.js";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { crc32Hex, crc32Of, fromHex, groupsOf8, shortDigest, toHex } from "@/lib/core/digest";
import { ascii, fill, sha256Hex, stream } from "./stream";

const crc = (bytes: Uint8Array) => crc32Hex(crc32Of(bytes)).toUpperCase();

describe("CRC-32", () => {
  // CRC-32 parameters: IEEE 802.3 / RFC 1952; the check value is that of the public CRC catalogues, the others
  // were computed with a bitwise model and with zlib
  it.each([
    ["", "00000000"], ["a", "E8B7BE43"], ["abc", "352441C2"], ["message digest", "20159D7F"],
    ["abcdefghijklmnopqrstuvwxyz", "4C2750BD"], ["1234567890".repeat(8), "7CA94A72"], ["123456789", "CBF43926"],
    ["The quick brown fox jumps over the lazy dog", "414FA339"], ["IEND", "AE426082"],
  ])("of %j is %s", (text, expected) => {
    expect(crc(ascii(text))).toBe(expected);
  });
  it.each([
    [1, 0x00, "D202EF8D"], [1, 0xff, "FF000000"], [4, 0x00, "2144DF1C"], [4, 0xff, "FFFFFFFF"], [32, 0x00, "190A55AD"],
    [32, 0xff, "FF6CAB0B"], [524_288, 0xff, "504BF849"], [524_288, 0x00, "75660AAC"], [8192, 0xff, "B4293435"],
  ])("of %i bytes of %i is %s", (n, value, expected) => {
    expect(crc(fill(n, value))).toBe(expected);
  });
  it("of bytes 00 to FF is 29058C73", () => {
    expect(crc(Uint8Array.from({ length: 256 }, (_, n) => n))).toBe("29058C73");
  });
  it("is not the CRC of another family for the check text", () => {
    // CRC-32C, BZIP2, MPEG-2, JAMCRC and POSIX cksum of "123456789"
    for (const other of ["E3069283", "FC891918", "0376E6E7", "340BC6D9", "377A6011"]) expect(crc(ascii("123456789"))).not.toBe(other);
  });
  it("is affine: CRC(a xor b) = CRC(a) xor CRC(b) xor CRC(zeros)", () => {
    fc.assert(fc.property(fc.uint8Array({ minLength: 1, maxLength: 300 }), fc.uint8Array({ minLength: 300, maxLength: 300 }), (a, long) => {
      const b = long.subarray(0, a.length);
      const mixed = a.map((byte, i) => byte ^ b[i]);
      expect(crc32Of(mixed)).toBe((crc32Of(a) ^ crc32Of(b) ^ crc32Of(new Uint8Array(a.length))) >>> 0);
    }));
  });
  it("goes on over chunks, agrees with zlib and leaves the known residue", () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 400 }), fc.nat(400), (bytes, cut) => {
      const whole = crc32Of(bytes);
      expect(crc32Of(bytes.subarray(cut), crc32Of(bytes.subarray(0, cut)))).toBe(whole);
      expect(whole).toBe(zlibCrc32(bytes));
      const tail = new Uint8Array(4);
      new DataView(tail.buffer).setUint32(0, whole, true);
      expect(crc32Of(tail, whole)).toBe(0x2144df1c);
    }));
  });
  it("changes with any single bit", () => {
    fc.assert(fc.property(fc.uint8Array({ minLength: 1, maxLength: 64 }), fc.nat(511), (bytes, bit) => {
      const flipped = bytes.slice();
      flipped[(bit >> 3) % bytes.length] ^= 1 << (bit & 7);
      expect(crc32Of(flipped)).not.toBe(crc32Of(bytes));
    }));
  });
});

describe("SHA-256 of server and browser", () => {
  // FIPS 180-4 examples, NIST's additional examples and NIST CAVP (CAVS 11.0) short messages
  const published: [string, Uint8Array, string][] = [
    ["nothing", ascii(""), "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855"],
    ["abc", ascii("abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad"],
    ["two blocks", ascii("abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq"), "248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1"],
    ["a million a", fill(1_000_000, 0x61), "cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0"],
    ["bd", fromHex("bd"), "68325720aabd7c82f30f554b313d0570c95accbb7dc4b5aae11204c08ffe732b"],
    ["c98c8e55", fromHex("c98c8e55"), "7abc22c0ae5af26ce93dbb94433a0e0b2e119d014f8e7f65bd56c61ccccd9504"],
    ["55 zeros", fill(55, 0), "02779466cdec163811d078815c633f21901413081449002f24aa3e80f0b88ef7"],
    ["56 zeros", fill(56, 0), "d4817aa5497628e7c77e6b606107042bbba3130888c5f47a375e6179be789fbb"],
    ["57 zeros", fill(57, 0), "65a16cb7861335d5ace3c60718b5052e44660726da4cd13bb745381b235a1785"],
    ["64 zeros", fill(64, 0), "f5a5fd42d16a20302798ef6ed309979b43003d2320d9f0e8ea9831a92759fb4b"],
    ["CAVP Len 8", fromHex("d3"), "28969cdfa74a12c82f3bad960b0b000aca2ac329deea5c2328ebc6f2ba9802c1"],
    ["CAVP Len 16", fromHex("11af"), "5ca7133fa735326081558ac312c620eeca9970d1e70a4b95533d956f072d1f98"],
    ["CAVP Len 24", fromHex("b4190e"), "dff2e73091f6c05e528896c4c831b9448653dc2ff043528f6769437bc7b975c2"],
    ["CAVP Len 32", fromHex("74ba2521"), "b16aa56be3880d18cd41e68384cf1ec8c17680c45a02b1575dc1518923ae8b0e"],
    ["CAVP Len 440", fromHex("3ebfb06db8c38d5ba037f1363e118550aad94606e26835a01af05078533cc25f2f39573c04b632f62f68c294ab31f2a3e2a1a0d8c2be51"), "6595a2ef537a69ba8583dfbf7f5bec0ab1f93ce4c8ee1916eff44a93af5749c4"],
    ["CAVP Len 448", fromHex("2d52447d1244d2ebc28650e7b05654bad35b3a68eedc7f8515306b496d75f3e73385dd1b002625024b81a02f2fd6dffb6e6d561cb7d0bd7a"), "cfb88d6faf2de3a69d36195acec2e255e2af2b7d933997f348e09f6ce5758360"],
    ["CAVP Len 504", fromHex("e2f76e97606a872e317439f1a03fcd92e632e5bd4e7cbc4e97f1afc19a16fde92d77cbe546416b51640cddb92af996534dfd81edb17c4424cf1ac4d75aceeb"), "18041bd4665083001fba8c5411d2d748e8abbfdcdfd9218cb02b68a78e7d4c23"],
    ["CAVP Len 512", fromHex("5a86b737eaea8ee976a0a24da63e7ed7eefad18a101c1211e2b3650c5187c2a8a650547208251f6d4237e661c7bf4c77f335390394c37fa1a9f9be836ac28509"), "42e61e174fbb3897d6dd6cef3dd2802fe67b331953b06114a65c772859dfc1aa"],
    ["CAVP Len 1304", fromHex("451101250ec6f26652249d59dc974b7361d571a8101cdfd36aba3b5854d3ae086b5fdd4597721b66e3c0dc5d8c606d9657d0e323283a5217d1f53f2f284f57b85c8a61ac8924711f895c5ed90ef17745ed2d728abd22a5f7a13479a462d71b56c19a74a40b655c58edfe0a188ad2cf46cbf30524f65d423c837dd1ff2bf462ac4198007345bb44dbb7b1c861298cdf61982a833afc728fae1eda2f87aa2c9480858bec"), "3c593aa539fdcdae516cdf2f15000f6634185c88f505b39775fb9ab137a10aa2"],
    ["896 bits", ascii("abcdefghbcdefghicdefghijdefghijkefghijklfghijklmghijklmnhijklmnoijklmnopjklmnopqklmnopqrlmnopqrsmnopqrstnopqrstu"), "cf5b16a778af8380036ce59e7b0492370b249b11e8f07a51afac45037afee9d1"],
    ["1000 zeros", fill(1000, 0), "541b3e9daa09b20bf85fa273e5cbd3e80185aa4ec298e765db87742b70138a53"],
    ["1000 x 41", fill(1000, 0x41), "c2e686823489ced2017f6059b8b239318b6364f6dcd835d0a519105a1eadd6e4"],
    ["1005 x 55", fill(1005, 0x55), "f4d62ddec0f3dd90ea1380fa16a5ff8dc4c54b21740650f24afc4120903552b0"],
    ["a million zeros", fill(1_000_000, 0), "d29751f2649b32ff572b5e0a9f541ea660a50f94ff0beedfb0b692b924cc8025"],
  ];
  it.each(published)("%s", (_name, message, digest) => {
    expect(createHash("sha256").update(message).digest("hex")).toBe(digest);
    expect(toHex(nobleSha256(message))).toBe(digest);
  });
  it.each([1, 63, 64, 65])("is the same in chunks of %i bytes", (step) => {
    const bytes = stream("bench-seed-1", 4096);
    const [server, browser] = [createHash("sha256"), nobleSha256.create()];
    for (let i = 0; i < bytes.length; i += step) {
      server.update(bytes.subarray(i, i + step));
      browser.update(bytes.subarray(i, i + step));
    }
    // computed with independent tools
    expect(server.digest("hex")).toBe("a9b183897043bbbfbd33e0edae3a08961c70933276a9bd2ae2246a2cce134d39");
    expect(toHex(browser.digest())).toBe("a9b183897043bbbfbd33e0edae3a08961c70933276a9bd2ae2246a2cce134d39");
  });
});

describe("the test stream", () => {
  // computed with independent tools; pins that every machine makes the same images
  it.each([
    [16, "F6BF603A", "886489a1e3a90668e1ee81134b58466a2acaac4422631f0f22685e7c125bf75b"],
    [256, "6646488E", "f6ed0e7ce8f815bbdb7096f72e15c91e4c4d22cfa697c6aa0bb4d8516b1b2f47"],
    [524_288, "FC866261", "f30ec207b1e1b12d1765191c8e3048af73a70effbf64b888d0c05f1a60110c44"],
  ])("of %i bytes", (n, crcExpected, digest) => {
    const bytes = stream("bench-seed-1", n);
    expect(crc(bytes)).toBe(crcExpected);
    expect(sha256Hex(bytes)).toBe(digest);
  });
});

describe("digests as text", () => {
  it("goes from bytes to hex and back, in any case", () => {
    fc.assert(fc.property(fc.uint8Array(), (bytes) => {
      expect(fromHex(toHex(bytes))).toEqual(bytes);
      expect(fromHex(toHex(bytes).toUpperCase())).toEqual(bytes);
    }));
  });
  it.each(["abc", "zz", "0x12", " 1", "1 "])("refuses %j as hex", (text) => {
    expect(() => fromHex(text)).toThrow(RangeError);
  });
  it("shortens and groups without losing which digest it is", () => {
    const digest = "de33514647bea65afa31d87b2908d5f034a726926f03d2717015e5eb50913446";
    expect(shortDigest(digest)).toBe("de335146…50913446");
    expect(groupsOf8(digest)).toHaveLength(8);
    expect(groupsOf8(digest).join("")).toBe(digest);
  });
});
