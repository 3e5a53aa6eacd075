import { describe, expect, it } from "vitest";
import { PhotoQueue, type PhotoTools } from "@/components/photo/photo-queue";
import { fileSize, titleOf } from "@/components/photo/photo-words";
import { Refusal } from "@/lib/http/send";

const JPEG = Uint8Array.from([0xff, 0xd8, 0xff, 0xe0, 0, 16]);
const file = (name: string, bytes: Uint8Array = JPEG) => new File([new Uint8Array(bytes)], name);
const refusal = (status: number) => new Refusal({ status, title: "", detail: `answer ${status}` });

/** Calls end when the test says so. */
function desk() {
  let keys = 0;
  const calls: { name: string; caption: string; key: string; end(error?: Error): void; stopped: boolean }[] = [];
  const tools: PhotoTools = {
    newKey: () => `key ${(keys += 1)}`,
    send: (sent, caption, key) => {
      let [resolve, reject]: [() => void, (error: Error) => void] = [() => undefined, () => undefined];
      const promise = new Promise<void>((...ends) => ([resolve, reject] = ends));
      const call = { name: sent.name, caption, key, stopped: false, end: (error?: Error) => (error ? reject(error) : resolve()) };
      calls.push(call);
      return { done: promise, stop: () => { call.stopped = true; reject(refusal(0)); } };
    },
  };
  const queue = new PhotoQueue(tools);
  const steps = () => queue.uploads().map((one) => one.step);
  return { queue, calls, steps, settle: () => new Promise((done) => setTimeout(done, 0)) };
}

describe("photos on their way", () => {
  it("go two at a time, each with its caption, and one refusal holds up nothing", async () => {
    const { queue, calls, steps, settle } = desk();
    let stored = 0;
    queue.tell(() => (stored += 1));
    await queue.add(["a.jpg", "b.jpg", "c.jpg"].map((name) => file(name)), "Label");
    expect(calls.map(({ name, caption }) => [name, caption])).toEqual([["a.jpg", "Label"], ["b.jpg", "Label"]]);
    calls[0].end(refusal(422));
    await settle();
    expect(steps()).toEqual(["refused", "sending", "sending"]);
    calls[1].end();
    calls[2].end();
    await settle();
    expect(steps()).toEqual(["refused", "stored", "stored"]);
    expect(stored).toBe(2);
  });

  it("of a wrong kind or too large are never sent", async () => {
    const { queue, calls, steps } = desk();
    const heic = new TextEncoder().encode("\0\0\0\x18ftypheic\0\0\0\0mif1heic");
    await queue.add([file("a.heic", heic), new File([JPEG, new Uint8Array(20 * 1024 * 1024)], "large.jpg"), file("note.txt", new TextEncoder().encode("hello"))], "");
    expect(calls).toEqual([]);
    expect(steps()).toEqual(["refused", "refused", "refused"]);
    expect(queue.uploads().map((one) => one.problem)).toEqual([expect.stringContaining("This is a HEIC photo."), expect.stringContaining("20 MiB"), expect.stringContaining("no photo")]);
    expect(queue.uploads().some((one) => one.again)).toBe(false);
  });

  it("are offered once more where that could help, with the same key only after a broken connection", async () => {
    const { queue, calls, settle } = desk();
    await queue.add([file("a.jpg"), file("b.jpg")], "");
    calls[0].end(refusal(0));
    calls[1].end(refusal(507));
    await settle();
    const [a, b] = queue.uploads();
    expect([a.again, b.again]).toEqual([true, true]);
    queue.again(a.key);
    queue.again(b.key);
    expect(calls.map((call) => call.key)).toEqual([calls[0].key, calls[1].key, calls[0].key, calls[3].key]);
    expect(calls[3].key).not.toBe(calls[1].key);
  });

  it("can be stopped and taken off", async () => {
    const { queue, calls, steps, settle } = desk();
    await queue.add([file("a.jpg")], "");
    queue.stop(queue.uploads()[0].key);
    await settle();
    expect([calls[0].stopped, steps()]).toEqual([true, ["stopped"]]);
    queue.remove(queue.uploads()[0].key);
    expect(queue.uploads()).toEqual([]);
  });
});

it("names photos and sizes for people", () => {
  expect(titleOf({ caption: null, fileName: " ", kind: "document" })).toBe("Document without a name");
  expect(titleOf({ caption: "Label", fileName: "a.jpg", kind: "photo" })).toBe("Label");
  expect([fileSize(12), fileSize(2048), fileSize(812 * 1024), fileSize(3.44 * 1024 * 1024)]).toEqual(["12 bytes", "2.0 KiB", "812 KiB", "3.4 MiB"]);
});
