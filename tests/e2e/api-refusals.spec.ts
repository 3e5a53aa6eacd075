import { randomBytes } from "node:crypto";
import { request as httpRequest } from "node:http";
import { type FileToSend, makePair, type Pair, randomImage, sha256Of, upload, uploadForm } from "./support/bench";
import { type Answer, appUrl, call, expectProblem, tokenOf } from "./support/station";
import { expectNothingStored } from "./support/store";
import { test } from "./support/test";

const SIZE = 4096;
const MIB = 1024 * 1024;

let mira: string;
let pair: Pair;
test.beforeAll(async () => {
  mira = await tokenOf("mira");
  pair = await makePair(mira, { customer: "Refused uploads", sizeBytes: SIZE });
});

const file = (size = SIZE): FileToSend => ({ bytes: randomImage(size) });
const send = (form: FormData) => call("POST", `/api/chips/${pair.chipId}/reads`, { token: mira, body: form });
const raw = (type: string, body: Buffer) => call("POST", `/api/chips/${pair.chipId}/reads`, { token: mira, body: new Uint8Array(body), headers: { "content-type": type } });

/** A form with one more field under a name that it may have already. */
function formWith(name: string, value: string): FormData {
  const form = uploadForm({}, [file()]);
  form.append(name, value);
  return form;
}

const BOUNDARY = "bench-8f2c";
/** One whole multipart body, and what a program in trouble makes of it. */
function multipart(end = `\r\n--${BOUNDARY}--\r\n`): Buffer {
  const field = (name: string, value: string) => `--${BOUNDARY}\r\ncontent-disposition: form-data; name="${name}"\r\n\r\n${value}\r\n`;
  const head = `${field("stage", "before")}${field("seating", "1")}${field("reader", "R2")}--${BOUNDARY}\r\ncontent-disposition: form-data; name="file"; filename="a.bin"\r\n\r\n`;
  return Buffer.concat([Buffer.from(head), randomBytes(SIZE), Buffer.from(end)]);
}
const MULTIPART = `multipart/form-data; boundary=${BOUNDARY}`;

interface Refused {
  what: string;
  send(): Promise<Answer>;
  status: number;
  detail: RegExp;
}

const OTHER = sha256Of(Buffer.from("other bytes"));
const REFUSED: Refused[] = [
  { what: "a declared digest that differs from the bytes", send: () => upload(mira, pair.chipId, { sha256: OTHER }, [file()]), status: 422, detail: /changed on its way: its SHA-256 here is [0-9a-f]{64}, declared was [0-9a-f]{64}\. Nothing was stored; send it again\.$/ },
  { what: "two files of which the second changed on its way", send: () => {
    const [a, b] = [file(), file()];
    const form = uploadForm({ sha256: sha256Of(a.bytes) }, [a, b]);
    form.append("sha256", OTHER);
    return send(form);
  }, status: 422, detail: /^read2\.bin changed on its way/ },
  { what: "a digest for one of two files only", send: () => upload(mira, pair.chipId, { sha256: OTHER }, [file(), file()]), status: 422, detail: /^Give sha256 for every file or for none: 2 files came with 1\.$/ },
  { what: "a digest that is none", send: () => upload(mira, pair.chipId, { sha256: "abc" }, [file()]), status: 422, detail: /A SHA-256 has 64 hex digits\.$/ },
  { what: "a file of zero bytes", send: () => upload(mira, pair.chipId, {}, [file(0)]), status: 422, detail: /^read1\.bin is empty: 0 bytes\. Read the chip again/ },
  { what: "a file of zero bytes beside a good one", send: () => upload(mira, pair.chipId, {}, [file(), file(0)]), status: 422, detail: /^read2\.bin is empty/ },
  { what: "one byte more than 64 MiB", send: () => upload(mira, pair.chipId, {}, [{ bytes: new Uint8Array(64 * MIB + 1) }]), status: 413, detail: /^A file is larger than 64 MiB/ },
  { what: "17 files", send: () => upload(mira, pair.chipId, {}, Array.from({ length: 17 }, () => file(16))), status: 400, detail: /^At most 16 files a call\. Nothing was stored/ },
  { what: "no file at all", send: () => upload(mira, pair.chipId, {}, []), status: 400, detail: /^No file came with the request\./ },
  { what: "a file in a part of another name", send: () => {
    const form = uploadForm({}, []);
    form.append("image", new Blob([randomImage(16)]), "a.bin");
    return send(form);
  }, status: 400, detail: /^Files go into parts named file/ },
  { what: "a single field that came twice", send: () => send(formWith("seating", "2")), status: 422, detail: /^The field seating came 2 times\. Send it once\.$/ },
  { what: "a field that nobody knows", send: () => send(formWith("voltage", "3.3")), status: 422, detail: /voltage/ },
  { what: "a field name that would make a list of four thousand million", send: () => send(formWith("note[4294967290]", "x")), status: 400, detail: /too many or too long parts/ },
  { what: "a hundred fields", send: () => {
    const form = uploadForm({}, [file()]);
    for (let n = 0; n < 100; n += 1) form.append(`field${n}`, "x");
    return send(form);
  }, status: 400, detail: /too many or too long parts/ },
  { what: "a field longer than any note", send: () => send(formWith("note", "x".repeat(20_000))), status: 400, detail: /too many or too long parts/ },
  { what: "no stage", send: () => upload(mira, pair.chipId, { stage: "" }, [file()]), status: 422, detail: /^stage: Say which content it is/ },
  { what: "seating 0", send: () => upload(mira, pair.chipId, { seating: "0" }, [file()]), status: 422, detail: /^seating: Seatings count from 1\.$/ },
  { what: "a donor's content on the original's chip", send: () => upload(mira, pair.chipId, { stage: "donor" }, [file()]), status: 422, detail: /donor/ },
  { what: "a read-back before any transfer", send: () => upload(mira, pair.donorChipId, { stage: "after" }, [file()]), status: 409, detail: /transfer/ },
  { what: "JSON in place of multipart", send: () => call("POST", `/api/chips/${pair.chipId}/reads`, { token: mira, json: { stage: "before" } }), status: 415, detail: /multipart\/form-data/ },
  { what: "multipart without a boundary", send: () => raw("multipart/form-data", multipart()), status: 400, detail: /boundary is missing/ },
  { what: "multipart with another boundary than declared", send: () => raw("multipart/form-data; boundary=another", multipart()), status: 400, detail: /broke off or is not well-formed/ },
  { what: "multipart without its final boundary", send: () => raw(MULTIPART, multipart("")), status: 400, detail: /broke off or is not well-formed/ },
  { what: "multipart that ends within the headers of a part", send: () => raw(MULTIPART, multipart().subarray(0, 300)), status: 400, detail: /broke off or is not well-formed/ },
  { what: "a body of nothing", send: () => raw(MULTIPART, Buffer.alloc(0)), status: 400, detail: /\.$/ },
  { what: "noise in place of multipart", send: () => raw(MULTIPART, randomBytes(100_000)), status: 400, detail: /\.$/ },
  { what: "a compressed body", send: () => call("POST", `/api/chips/${pair.chipId}/reads`, { token: mira, body: new Uint8Array(multipart()), headers: { "content-type": MULTIPART, "content-encoding": "gzip" } }), status: 415, detail: /without Content-Encoding/ },
  { what: "a chip that does not exist", send: () => upload(mira, "0badc0de-0000-4000-8000-00000badc0de", {}, [file()]), status: 404, detail: /^There is no chip under this address/ },
  { what: "a malformed id", send: () => upload(mira, "U7", {}, [file()]), status: 404, detail: /^There is nothing under this address/ },
];

for (const refused of REFUSED) {
  test(`stores nothing of ${refused.what}`, async () => {
    await expectNothingStored(mira, pair, async () => expectProblem(await refused.send(), refused.status, refused.detail));
  });
}

/** Sends the head and `bytes` of a body said to be longer, then goes away. */
function cutAfter(body: Buffer, bytes: number): Promise<void> {
  return new Promise((resolve) => {
    const request = httpRequest(`${appUrl()}/api/chips/${pair.chipId}/reads`, {
      method: "POST", headers: { authorization: `Bearer ${mira}`, "content-type": MULTIPART, "content-length": String(body.length) },
    });
    request.on("error", () => resolve());
    request.write(body.subarray(0, bytes), () => setTimeout(() => request.destroy(new Error("cable pulled")), 150));
  });
}

test("stores nothing of an upload whose connection is cut", async () => {
  const body = multipart();
  for (const bytes of [0, 60, 400, SIZE, body.length - 3]) {
    await expectNothingStored(mira, pair, async () => {
      await cutAfter(body, bytes);
      await new Promise((resolve) => setTimeout(resolve, 100));
    });
  }
});

test("a body that is refused before it is read still gets its answer, however small or large", async () => {
  for (const size of [1, 100_000, 20 * MIB]) {
    const answer = await call("POST", `/api/chips/${pair.chipId}/reads`, { token: "x".repeat(43), body: uploadForm({}, [{ bytes: new Uint8Array(size) }]) });
    expectProblem(answer, 401, /bench token/);
  }
});
