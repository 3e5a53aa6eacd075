import { ed25519 } from "@noble/curves/ed25519.js";
import { describe, expect, it } from "vitest";
import { fromHex, toHex } from "@/lib/core/digest";
import { layOut } from "@/lib/core/verify/bag";
import { checkCount, checkDeclaration, checkManifest, checkTagManifest } from "@/lib/core/verify/lists";
import type { ReadFile } from "@/lib/core/verify/read-files";
import { StepNotes } from "@/lib/core/verify/report";
import { fingerprintOf } from "@/lib/core/verify/seal";
import { keyTools, plainTools } from "@/lib/core/verify/tools";
import { hex, testKey } from "../support/make-bag";

/** RFC 8032, section 7.1: secret, public, message, signature */
const VECTORS = [
  ["9d61b19deffd5a60ba844af492ec2cc44449c5697b326919703bac031cae7f60", "d75a980182b10ab7d54bfed3c964073a0ee172f3daa62325af021a68f707511a", "", "e5564300c360ac729086e2cc806e828a84877f1eb8e5d974d873e065224901555fb8821590a33bacc61e39701cf9b46bd25bf5f0595bbe24655141438e7a100b"],
  ["4ccd089b28ff96da9db6c346ec114e0f5b8a319f35aba624da8cf6ed4fb8a6fb", "3d4017c3e843895a92b70aa74d1b7ebc9c982ccf2ec4968cc0cd55f12af4660c", "72", "92a009a9f0d4cab8720e820b5f642540a2b27b5416503f8fb3762223ebdb69da085ac1e43e15996e458f3613d0f11d8c387b2eaeb4302aeeb00d291612bb0c00"],
  ["c5aa8df43f9f837bedb7442f31dcb7b166d38535076f094b85ce3a2e0b4458f7", "fc51cd8e6218a1a38da47ed00230f0580816ed13ba3303ac5deb911548908025", "af82", "6291d657deec24024827e69c3abe01a30ce548a284743a445e3680d7db5ac3ac18ff9b538d16f290ae67f760984dc6594a7c15e9716ed28dc027beceea1ec40a"],
  ["833fe62409237b9d62ec77587520911e9a759cec1d19755b7da901b96dca3d42", "ec172b93ad5e563bf4932c70e1245034c35467ef2efd4d64ebf819683467e2bf", "ddaf35a193617abacc417349ae20413112e6fa4e89a97ea20a9eeee64b55d39a2192992a274fc1a836ba3c23a3feebbd454d4423643ce80e2a9ac94fa54ca49f", "dc2a4459e7369633a52b1bf277839a00201009a3efbf3ecb69bea2186c26b58909351fc9ac90b3ecfdfbc7c66431e0303dca179c138ac17ad9bef1177331a704"],
] as const;
/** the order of the base point, RFC 8032 section 5.1 */
const L = 2n ** 252n + 27742317777372353535851937790883648493n;
const verify = (key: Uint8Array, message: Uint8Array, signature: Uint8Array) => plainTools.verifyEd25519(key, message, signature);
const flip = (bytes: Uint8Array, at: number) => {
  const other = Uint8Array.from(bytes);
  other[at >> 3] ^= 1 << (at & 7);
  return other;
};

describe("Ed25519 of the page, RFC 8032 section 7.1", () => {
  it.each(VECTORS)("holds for %s and for nothing near it", (secret, open, message, signature) => {
    const [key, text, signed] = [fromHex(open), fromHex(message), fromHex(signature)];
    expect(toHex(ed25519.getPublicKey(fromHex(secret)))).toBe(open);
    expect(verify(key, text, signed)).toBe(true);
    for (let bit = 0; bit < 512; bit += 37) expect(verify(key, text, flip(signed, bit))).toBe(false);
    for (let bit = 0; bit < 256; bit += 19) expect(verify(flip(key, bit), text, signed)).toBe(false);
    for (let bit = 0; bit < text.length * 8; bit += 13) expect(verify(key, flip(text, bit), signed)).toBe(false);
    expect(verify(key, Uint8Array.from([...text, 0]), signed)).toBe(false);
  });

  it("refuses the same signature with S + L, which a lenient check takes (section 8.4)", () => {
    const [, open, message, signature] = VECTORS[1];
    const signed = fromHex(signature);
    const s = [...signed.subarray(32)].reduceRight((sum, byte) => sum * 256n + BigInt(byte), 0n) + L;
    const other = Uint8Array.from(signed);
    for (let i = 0; i < 32; i += 1) other[32 + i] = Number((s >> BigInt(8 * i)) & 255n);
    expect(verify(fromHex(open), fromHex(message), other)).toBe(false);
  });

  it("refuses other lengths and keys that are no point", () => {
    const [, open, message, signature] = VECTORS[1];
    for (const length of [0, 32, 63, 65]) expect(verify(fromHex(open), fromHex(message), new Uint8Array(length))).toBe(false);
    for (const key of [new Uint8Array(32).fill(0xff), new Uint8Array(31), new Uint8Array()]) expect(verify(key, fromHex(message), fromHex(signature))).toBe(false);
    // the identity as key and R, with S = 0, fits every message in a lenient check
    const identity = Uint8Array.from({ length: 32 }, (_, i) => (i === 0 ? 1 : 0));
    expect(verify(identity, fromHex(message), Uint8Array.from([...identity, ...new Uint8Array(32)]))).toBe(false);
  });

  it("names a key by its SPKI as openssl does, and takes no other text for a key", () => {
    const { pem, id } = testKey("log a");
    const tools = keyTools(plainTools);
    expect(tools.keyId(pem)).toBe(id);
    for (const text of ["", "PEM", pem.replace("MCow", "MCox"), pem.replace("PUBLIC", "PRIVATE"), `${pem}${pem}`, pem.replaceAll("\n", "")]) expect(tools.keyId(text)).toBeNull();
    expect(fingerprintOf(` ${id.toUpperCase().replace(/(..)/g, "$1:")} `)).toBe(id);
    expect(fingerprintOf(id.slice(1))).toBeNull();
  });
});

const bytes = (content: string | Uint8Array) => (typeof content === "string" ? new TextEncoder().encode(content) : content);
const file = (content: string | Uint8Array): ReadFile => ({ bytes: bytes(content), sizeBytes: bytes(content).length, sha256: hex(bytes(content)) });
const all256 = Uint8Array.from({ length: 256 }, (_, i) => i);

/** CHECK-VALUES A.5: the golden bag, made there with sha256sum */
const GOLDEN: [string, string | Uint8Array][] = [
  ["bagit.txt", "BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n"],
  ["bag-info.txt", "Bagging-Date: 2026-01-05\nExternal-Identifier: C-1\nPayload-Oxum: 515.3\n"],
  ["manifest-sha256.txt", "40aff2e9d2d8922e47afd4648e6967497158785fbd1da870e7110266bf944880  data/read-1.bin\n40aff2e9d2d8922e47afd4648e6967497158785fbd1da870e7110266bf944880  data/read-2.bin\ndc51b8c96c2d745df3bd5590d990230a482fd247123599548e0632fdbf97fc22  data/summary.txt\n"],
  ["tagmanifest-sha256.txt", "d14535b2db4efae4e527e5aa76079c4486a352b2a546687de73bee97c698e8ff  bag-info.txt\n1712ecfb074bf29c4188ad3421032509159a09739fd604f8fe57038b4ddefcc9  bagit.txt\n7368d0af87d3668fe331b8b39103ca55eb8e29c19c6970e87a60625676807e93  manifest-sha256.txt\n"],
  ["data/read-1.bin", all256], ["data/read-2.bin", all256], ["data/summary.txt", "ok\n"],
];
type Files = Map<string, ReadFile>;
const golden = (change: (files: Files) => void = () => {}): Files => {
  const files = new Map(GOLDEN.map(([name, content]) => [name, file(content)]));
  change(files);
  return files;
};
const edited = (name: string, change: (text: string) => string) => golden((files) => files.set(name, file(change(new TextDecoder().decode(files.get(name)!.bytes!)))));
const found = (files: Files) => [checkDeclaration, checkCount, checkManifest, checkTagManifest].flatMap((step) => step(files).faults.map((fault) => `${fault.place}: ${fault.sentence}`))
  // a bundle has two pages more than any bag
  .filter((line) => !/does not name (README\.txt|check\.sh)/.test(line));

describe("a bag, RFC 8493", () => {
  it("passes as the golden one, whose tag manifest has the published digest", () => {
    expect(found(golden())).toEqual([]);
    expect(golden().get("tagmanifest-sha256.txt")!.sha256).toBe("23abfcffa5bb168dab9a197c7aa94da6bb188c1fd6d40dfb4335a43b5978f65e");
  });

  const first = (text: string) => text.split("\n")[0];
  it.each<[string, Files, string]>([
    ["no bagit.txt", golden((f) => f.delete("bagit.txt")), "bagit.txt: It is missing"],
    ["bagit.txt in the wrong order", edited("bagit.txt", (t) => t.trimEnd().split("\n").reverse().join("\n").concat("\n")), "not the two lines"],
    ["a line too many in bagit.txt", edited("bagit.txt", (t) => `${t}More: 1\n`), "not the two lines"],
    ["a byte order mark", edited("bagit.txt", (t) => `\ufeff${t}`), "byte order mark"],
    ["an unknown version", edited("bagit.txt", (t) => t.replace("1.0", "1.1")), "not the two lines"],
    ["a listed file missing", golden((f) => f.delete("data/read-2.bin")), "data/read-2.bin: manifest-sha256.txt names it, and it is missing"],
    ["a payload file unlisted", golden((f) => f.set("data/Thumbs.db", file("x"))), "data/Thumbs.db: It is there"],
    ["a wrong check sum", golden((f) => f.set("data/summary.txt", file("OK\n"))), "data/summary.txt: Its SHA-256 is not"],
    ["a path listed twice", edited("manifest-sha256.txt", (t) => `${t}${first(t)}\n`), "a second time"],
    ["a path listed again with a dot", edited("manifest-sha256.txt", (t) => `${t}${first(t).replace("data/", "./data/")}\n`), "a dot in place of a folder"],
    ["a path that leads out", edited("manifest-sha256.txt", (t) => `${t}${first(t).replace("data/read-1.bin", "data/../../x")}\n`), "leads out of the bundle"],
    ["an absolute path", edited("manifest-sha256.txt", (t) => `${t}${first(t).replace("data/read-1.bin", "/etc/hostname")}\n`), "root of a disk"],
    ["a drive letter", edited("manifest-sha256.txt", (t) => `${t}${first(t).replace("data/read-1.bin", "C:/x")}\n`), "root of a disk"],
    ["a backslash", edited("manifest-sha256.txt", (t) => `${t}${first(t).replace("data/read-1.bin", "data\\x")}\n`), "backslash"],
    ["a percent sign in a path", edited("manifest-sha256.txt", (t) => t.replace("read-1", "read%2D1")), "no name in a bundle has"],
    ["Payload-Oxum with other bytes", edited("bag-info.txt", (t) => t.replace("515.3", "516.3")), "not as many, or not as large"],
    ["Payload-Oxum with another count", edited("bag-info.txt", (t) => t.replace("515.3", "515.4")), "not as many, or not as large"],
    ["Payload-Oxum twice", edited("bag-info.txt", (t) => `${t}Payload-Oxum: 515.3\n`), "Payload-Oxum 2 times"],
    ["no Payload-Oxum", edited("bag-info.txt", (t) => t.replace(/Payload.*\n/, "")), "does not give Payload-Oxum"],
    ["a tag manifest that lists payload", edited("tagmanifest-sha256.txt", (t) => `${t}${hex("ok\n")}  data/summary.txt\n`), "a file of the case"],
    ["a tag manifest that lists itself", edited("tagmanifest-sha256.txt", (t) => `${t}${hex("x")}  tagmanifest-sha256.txt\n`), "its own list"],
    ["a manifest that lists a tag file", edited("manifest-sha256.txt", (t) => `${t}${hex(GOLDEN[0][1])}  bagit.txt\n`), "no file of the case"],
    ["a second, wrong manifest of another kind", golden((f) => f.set("manifest-sha512.txt", file(`${"0".repeat(128)}  data/summary.txt\n`))), "a list of a kind"],
    ["no manifest at all", golden((f) => f.delete("manifest-sha256.txt")), "manifest-sha256.txt: It is missing"],
    ["a last line without its end", edited("manifest-sha256.txt", (t) => t.trimEnd()), "does not end with a whole line"],
    ["one space in place of two", edited("manifest-sha256.txt", (t) => t.replace("  ", " ")), "not a digest, two spaces and a path"],
  ])("with %s is not in order", (_, files, words) => {
    expect(found(files).join("\n")).toContain(words);
  });

  const entry = (path: string, kind: "file" | "folder" | "link" | "other" = "file", encrypted = false) => ({ path, kind, encrypted, sizeBytes: 0, open: async function* open() { yield new Uint8Array(); } });
  it.each<[string, ReturnType<typeof entry>[], string]>([
    ["a name that leads out", [entry("bag/../evil")], "leads out"],
    ["an absolute name", [entry("/etc/evil")], "root of a disk"],
    ["a backslash", [entry("bag\\evil")], "backslash"],
    ["a file beside the folder", [entry("evil")], "outside the bundle's folder"],
    ["a second folder", [entry("other/evil")], "outside the bundle's folder"],
    ["the same name twice", [entry("bag/a"), entry("bag/a")], "It is there twice"],
    ["names that differ in capitals only", [entry("bag/a"), entry("bag/A")], "differ only in capitals"],
    ["a trailing dot", [entry("bag/a.")], "ends in a dot"],
    ["a trailing space", [entry("bag/a ")], "no name in a bundle has"],
    ["a name in two Unicode forms", [entry("bag/\u00e9"), entry("bag/e\u0301")], "no name in a bundle has"],
    ["a link", [entry("bag/a", "link")], "a link and not a file"],
    ["a device", [entry("bag/a", "other")], "neither file nor folder"],
    ["a locked entry", [entry("bag/a", "file", true)], "locked with a password"],
    ["fetch.txt", [entry("bag/fetch.txt")], "not self-contained"],
    ["an empty part", [entry("bag//a")], "empty part"],
    ["a name without end", [entry(`bag/${"a".repeat(600)}`)], "longer than any"],
  ])("in an archive with %s is refused there, and that entry is never opened", (_, entries, words) => {
    const notes = new StepNotes("archive", "The archive");
    const { files } = layOut([entry("bag/bagit.txt"), entry("bag/manifest-sha256.txt"), ...entries], notes);
    expect(notes.faults.map((fault) => fault.sentence).join("\n")).toContain(words);
    expect(files.size).toBeLessThanOrEqual(4);
  });
});
