import { describe, expect, it, vi } from "vitest";
import type { FileDigest } from "@/components/chip/digest-file";
import type { StoredReads } from "@/components/chip/send-file";
import { type QueueTools, UploadQueue } from "@/components/chip/upload-queue";
import { Refusal } from "@/lib/http/send";

const DIGEST: FileDigest = { sha256: "a".repeat(64), crc32: "00000000" };
const STORED: StoredReads = { reads: [], chip: { state: "needs-reads", label: "", sentence: "" } };
const file = (name: string, bytes = 4) => new File([new Uint8Array(bytes)], name);
const target = { chipId: "c1", words: "Original U3", expectedBytes: 4, imageBytes: null, fields: { stage: "before" } };

/** Sends stay open until they are settled by hand. */
function bench() {
  const open: { name: string; key: string; chipId: string; fields: Record<string, string>; resolve(): void; refuse(status: number): void }[] = [];
  const stop = vi.fn();
  let keys = 0;
  const tools: QueueTools = {
    newKey: () => `key-${(keys += 1)}`,
    digest: () => ({ result: Promise.resolve(DIGEST), stop }),
    send: (chipId, sent, fields, key) => ({
      stop,
      result: new Promise((resolve, reject) => {
        open.push({ name: sent.name, key, chipId, fields, resolve: () => resolve(STORED), refuse: (status) => reject(new Refusal({ status, title: "", detail: "Not the same digest." })) });
      }),
    }),
  };
  const stored = vi.fn();
  const queue = new UploadQueue(tools);
  queue.tell(stored);
  return { queue, open, stored, stop };
}
const settle = () => new Promise((resolve) => setTimeout(resolve, 5));
const steps = (queue: UploadQueue) => queue.uploads().map((u) => u.step);

describe("the upload queue", () => {
  it("never has more than two files on their way, one call each", async () => {
    const { queue, open } = bench();
    queue.add([file("1"), file("2"), file("3")], target);
    await settle();
    expect(open.map((o) => o.name)).toEqual(["1", "2"]);
    open[0].resolve();
    await settle();
    expect(open.map((o) => o.name)).toEqual(["1", "2", "3"]);
  });

  it("does not send a file of another size than the chip's before it is told to", async () => {
    const { queue, open } = bench();
    queue.add([file("short", 2)], target);
    await settle();
    expect([steps(queue), open]).toEqual([["asking"], []]);
    queue.send(queue.uploads()[0].key);
    await settle();
    expect(open).toHaveLength(1);
  });

  it("asks about the size of the image that a text becomes, not about the text's own length", async () => {
    const { queue, open } = bench();
    queue.add([file("right.hex", 60)], { ...target, imageBytes: 4 });
    queue.add([file("other.hex", 4)], { ...target, imageBytes: 2 });
    await settle();
    expect([steps(queue), open.map((o) => o.name)]).toEqual([["sending", "asking"], ["right.hex"]]);
  });

  it("sends the digest that this browser computed, and what the form said when the file was dropped", async () => {
    const { queue, open } = bench();
    queue.add([file("1")], target);
    await settle();
    expect(open[0].fields).toEqual({ stage: "before", sha256: DIGEST.sha256 });
  });

  it("keeps a refusal at its line and goes on with the others", async () => {
    const { queue, open, stored } = bench();
    queue.add([file("1"), file("2")], target);
    await settle();
    open[0].refuse(422);
    open[1].resolve();
    await settle();
    expect(steps(queue)).toEqual(["refused", "stored"]);
    expect(queue.uploads()[0].problem).toBe("Not the same digest.");
    expect(stored).toHaveBeenCalledTimes(1);
  });

  it("repeats a broken upload under the same key, so that it can't be stored twice", async () => {
    const { queue, open } = bench();
    queue.add([file("1")], target);
    await settle();
    open[0].refuse(0);
    await settle();
    queue.send(queue.uploads()[0].key);
    await settle();
    expect(open[1].key).toBe(open[0].key);
  });

  it("takes a new key after a refusal, or the old answer would come back for ever", async () => {
    const { queue, open } = bench();
    queue.add([file("1")], target);
    await settle();
    open[0].refuse(422);
    await settle();
    queue.send(queue.uploads()[0].key);
    await settle();
    expect(open[1].key).not.toBe(open[0].key);
  });

  it("stops a file on its way and does not call that an error", async () => {
    const { queue, open, stop } = bench();
    queue.add([file("1")], target);
    await settle();
    queue.stop(queue.uploads()[0].key);
    open[0].refuse(0);
    await settle();
    expect([steps(queue), stop.mock.calls.length, queue.uploads()[0].problem]).toEqual([["stopped"], 1, null]);
  });
});
