import { fill, goldenImage, stream } from "../stream";
import { dummyZero, gainBits, joined, loseBits, reversedByte } from "./bits";

/**
 * The golden fault set: made again from its recipes. Digests, counts and places are READ-FAULTS B.4 and B.5, computed
 * there with independent tools.
 */
export interface GoldenFault {
  name: string;
  make: (good: Uint8Array) => Uint8Array;
  crc32: string;
  sha256: string;
  /** code against the good image, whichever comes first */
  code: string;
  /** differing bytes, bits 0 to 1, bits 1 to 0 where the table has them */
  bytes?: number;
  up?: number;
  down?: number;
  first?: number;
  last?: number;
  shiftBits?: number;
}

const edited = (edit: (bytes: Uint8Array) => void) => (good: Uint8Array) => {
  const bytes = good.slice();
  edit(bytes);
  return bytes;
};
const AT = 8 * 0x400;

export const GOOD_DIGEST = { crc32: "ae74bfe0", sha256: "504bc4f59fc5e628be38f6b417026ad388a98421624bae62f7d00438acd4b88f" };

export const GOLDEN_FAULTS: GoldenFault[] = [
  { name: "lose1", make: (g) => loseBits(g, AT, 1), crc32: "f2b9d27f", sha256: "2c7b4d7502c27957824293696198af3e1ace68e3add88e6c1908eb88d50c5498", code: "bit-slip", bytes: 2987, up: 6068, down: 6067, first: 0x400, last: 0x176f, shiftBits: 1 },
  { name: "lose3", make: (g) => loseBits(g, AT, 3), crc32: "7fa92a79", sha256: "a436b2be321953e009424827621852f63666db4fc75fe0e69e157f0d37d20760", code: "bit-slip", bytes: 2995, up: 6008, down: 6006, shiftBits: 3 },
  { name: "gain1", make: (g) => gainBits(g, AT, 1), crc32: "9d933f94", sha256: "f82a10e69404af69f17bd57e937cdd3d2bffb85624a3c1c3d4cdbc9dc2635197", code: "bit-slip", bytes: 2992, up: 6068, down: 6068, shiftBits: -1 },
  { name: "loseByte", make: (g) => loseBits(g, AT, 8), crc32: "9f03033c", sha256: "059be4f9953c51d3b3d4574d33c446116bf23d6d3b518d21069e40084883c08a", code: "byte-slip", bytes: 2989, up: 5976, down: 5973, shiftBits: 8 },
  { name: "dummy0", make: dummyZero, crc32: "abcbe41a", sha256: "b0a9e38740d584c7f8b59dd162f63bb2935769e38a98752f53a2984ae2a05206", code: "bit-slip", bytes: 4011, shiftBits: -1 },
  { name: "rot512", make: (g) => joined(g.subarray(512), g.subarray(0, 512)), crc32: "1ed3a143", sha256: "2516eff6aee13a20bd1cf49abcd4de12b97074f4285c45f912108d246839965c", code: "rotated", bytes: 5050, up: 10_184, down: 10_184 },
  { name: "swap16", make: (g) => g.map((_, i) => g[i ^ 1]), crc32: "c5bf4caa", sha256: "cd7cbbfcc8c6ef99e8db59de4c1cc9ecd23cd1c6af8084551c0a40635011d5ee", code: "byte-swapped", bytes: 4010, up: 8081, down: 8081 },
  { name: "swap32", make: (g) => g.map((_, i) => g[i ^ 3]), crc32: "36c0df1b", sha256: "17635a2099a79aea930c1ee16fe46695df9e36be660666f89a31df6f66350bfa", code: "byte-swapped", bytes: 4008, up: 7855, down: 7855 },
  { name: "inverted", make: (g) => g.map((byte) => ~byte), crc32: "c2a91241", sha256: "83b19eaf5a575de70d1e18a017bd06e2472c0d000a4b8cad4a5d48c489b8ae63", code: "inverted", bytes: 8192, up: 16_089, down: 49_447 },
  { name: "bitrev", make: (g) => g.map(reversedByte), crc32: "8fda7756", sha256: "b7ad3ac807fbeb913c05e1b4161ff5defae8d0d6764867adff697526c4a4b9cb", code: "bit-reversed", bytes: 3755, up: 8009, down: 8009 },
  { name: "A12low", make: (g) => joined(g.subarray(0, 4096), g.subarray(0, 4096)), crc32: "bd50c1c3", sha256: "ff42f5ed505460f74ee55584d45309fb52d0847e3349f256dcf3dfbc5a1773dc", code: "address-line", bytes: 2985 },
  { name: "A8low", make: (g) => g.map((_, i) => g[i & ~0x100]), crc32: "e2b8e171", sha256: "6ded2537c4c27a7178d50bd9c19e0fcc7eaa09c8b35df6100e8fcfc69d075902", code: "address-line", bytes: 2183, first: 0x100, last: 0x17ff },
  { name: "A8high", make: (g) => g.map((_, i) => g[i | 0x100]), crc32: "afca9bc6", sha256: "80632feed0df093a8c4c0e98a3c56c12b23024e60da2ec79d894149f426b7663", code: "address-line" },
  { name: "wrap16k", make: (g) => joined(g, g), crc32: "9ab6eaa1", sha256: "2484d9061046d6cd7192df7c7087f2abf8f5615b8e134244e8b0e6429cd403de", code: "repeats-within" },
  { name: "trunc4k", make: (g) => g.slice(0, 4096), crc32: "82f005d0", sha256: "08141ce30a26603494c5b9efc4f1bdb9ddc6c05177dea28322569ea71fa7557f", code: "too-short" },
  { name: "pad512", make: (g) => joined(g, fill(512, 0xff)), crc32: "2dfeb790", sha256: "d21ce4968ba977557823f6445436f28a7d959dbb0c8ba40e10ff4a7f46868813", code: "padded" },
  { name: "hdr64", make: (g) => joined(fill(64, 0), g), crc32: "335558cf", sha256: "7f34863f70b0cb1e22d90e437e46e778601ea5b6dff93d3e561d2e20abc5a6fe", code: "extra-bytes" },
  { name: "echo", make: (g) => joined([3, 0, 0, 0], g.subarray(0, 8188)), crc32: "e220e224", sha256: "93ab8cf92a25883be076b4c4ed67a8b3cce447f5a402827a3b11e850f2897da0", code: "command-echo", bytes: 4011, shiftBits: -32 },
  { name: "burstFF", make: edited((b) => b.fill(0xff, 0x300, 0x340)), crc32: "7fd248db", sha256: "fdae57240492a4a2c92e2fd06c48a4a127677481517255823d485345330abcd2", code: "lost-contact", bytes: 63, up: 270, down: 0 },
  { name: "burst00", make: edited((b) => b.fill(0x00, 0x300, 0x340)), crc32: "5a8d28ee", sha256: "9e9258c609e42fb82b3aaa930efa346e7211183015d63c57c842419a812dc236", code: "lost-contact", bytes: 64, up: 0, down: 242 },
  { name: "flip", make: edited((b) => { b[0x123] ^= 0x10; }), crc32: "0211aad0", sha256: "6b279a15e9b79c75feaa577c4cafcf767d6e5f5b3a0172d1adb3e8c6dac25ca9", code: "random-flips", bytes: 1, up: 0, down: 1, first: 0x123, last: 0x123 },
  { name: "idrep", make: (g) => g.map((_, i) => [0x20, 0x40, 0x13][i % 3]), crc32: "670ebd2a", sha256: "75365e002ed8f2eeb3379dec9f6be7055031e0e7ae4e2cef44f235a694d121da", code: "short-period" },
];

export const APPROVED = stream("bench-seed-1", 256);
export const OLD = stream("bench-seed-2", 256);

/** A tool that writes pages of `tool` bytes to a chip whose pages hold `chip`: each page wraps within itself. */
export function wrapPages(image: Uint8Array, before: Uint8Array, tool: number, chip: number): Uint8Array {
  const out = before.slice();
  for (let at = 0; at < image.length; at += 1) {
    const page = at - (at % tool);
    out[page + ((at - page) % chip)] = image[at];
  }
  return out;
}

/** READ-FAULTS B.5: what is read back, and what it should be called. Digests computed there. */
export const GOLDEN_READ_BACKS = [
  { name: "V3 without an erase", bytes: APPROVED.map((byte, i) => byte & OLD[i]), crc32: "49bd5957", sha256: "21881483350e5b54c238baf1713b9e9027f42b869d700afe5c3a945e4f53f461", code: "not-erased" },
  { name: "V5 over old content", bytes: wrapPages(APPROVED, OLD, 64, 32), crc32: "c8a3b367", sha256: "65c7497b2f6c02a4901479d5e7c5d7271f0b407a91c302a31b9e858c7dee3ef3", code: "page-wrap" },
  { name: "V5 over FF", bytes: wrapPages(APPROVED, fill(256, 0xff), 64, 32), crc32: "bce3c959", sha256: "562d54536fe7be4320f65c2a4d05595b47ae6cd85c55a847c012f43a565bf0dc", code: "page-wrap" },
  { name: "V6 upper half kept", bytes: joined(APPROVED.subarray(0, 128), OLD.subarray(128)), crc32: "8775231e", sha256: "a6dd83369b792597c38a4f5be1565e5a6f4b0fd5eb78355bf2a500116ca5245a", code: "partly-protected" },
];

export const GOOD_IMAGE = goldenImage();
