import { Refusal } from "@/lib/http/send";
import type { ReadView } from "@/lib/views";
import { digestFile, type FileDigest, type Running } from "./digest-file";
import { sendFile, type StoredReads, type UploadFields } from "./send-file";

/** Where and as what a file is sent; fixed when it was dropped, so that later changes of the form don't touch it. */
export interface UploadTarget {
  chipId: string;
  /** "Original U3" */
  words: string;
  expectedBytes: number;
  /** of a text: the size of the image that is made from it; null when the file is the image */
  imageBytes: number | null;
  fields: UploadFields;
}

export type UploadStep =
  | "waiting" // for its turn to be hashed
  | "hashing"
  | "asking" // its size is not the chip's
  | "queued"
  | "sending"
  | "stored"
  | "refused"
  | "stopped";

export interface Upload {
  key: string;
  /** the Idempotency-Key: the same after a broken connection, a new one after an answer that refused */
  sendKey: string;
  file: File;
  target: UploadTarget;
  step: UploadStep;
  hashed: number;
  sent: number;
  digest: FileDigest | null;
  read: ReadView | null;
  problem: string | null;
}

export interface QueueTools {
  digest(file: File, onProgress: (done: number) => void): Running<FileDigest>;
  send(chipId: string, file: File, fields: UploadFields, key: string, onProgress: (sent: number) => void): Running<StoredReads>;
  newKey(): string;
}

const AT_ONCE = 2;

/** Bytes of the image that a file becomes: a text is longer than its image. */
export function imageBytesOf(file: File, target: Pick<UploadTarget, "imageBytes">): number {
  return target.imageBytes ?? file.size;
}

/** Hashes files one after the other, sends two at a time, one call a file. Knows nothing of React. */
export class UploadQueue {
  private list: readonly Upload[] = [];
  private running = new Map<string, { stop(): void }>();
  private listeners = new Set<() => void>();

  private onStored: (upload: Upload) => void = () => undefined;

  constructor(private readonly tools: QueueTools) {}

  /** Who hears of each stored file; the latest one counts. */
  tell(onStored: (upload: Upload) => void): void {
    this.onStored = onStored;
  }

  subscribe = (listener: () => void) => {
    this.listeners.add(listener);
    return () => void this.listeners.delete(listener);
  };
  uploads = () => this.list;

  add(files: readonly File[], target: UploadTarget): void {
    const fresh = files.map((file): Upload => ({ key: this.tools.newKey(), sendKey: this.tools.newKey(), file, target, step: "waiting", hashed: 0, sent: 0, digest: null, read: null, problem: null }));
    this.set([...this.list, ...fresh]);
    this.work();
  }

  /** "Send anyway" after the question about its size, or once more after a refusal. */
  send(key: string): void {
    this.change(key, { step: "queued", problem: null, sent: 0 });
    this.work();
  }

  stop(key: string): void {
    this.running.get(key)?.stop();
    this.running.delete(key);
    this.change(key, { step: "stopped", problem: null });
    this.work();
  }

  remove(key: string): void {
    this.running.get(key)?.stop();
    this.running.delete(key);
    this.set(this.list.filter((u) => u.key !== key));
    this.work();
  }

  private set(list: readonly Upload[]): void {
    this.list = list;
    for (const listener of this.listeners) listener();
  }

  private change(key: string, changes: Partial<Upload>): void {
    this.set(this.list.map((u) => (u.key === key ? { ...u, ...changes } : u)));
  }

  private get(key: string): Upload | undefined {
    return this.list.find((u) => u.key === key);
  }

  private work(): void {
    const next = this.list.some((u) => u.step === "hashing") ? undefined : this.list.find((u) => u.step === "waiting");
    if (next) void this.hash(next);
    const free = AT_ONCE - this.list.filter((u) => u.step === "sending").length;
    for (const upload of this.list.filter((u) => u.step === "queued").slice(0, Math.max(0, free))) void this.transmit(upload);
  }

  private async hash({ key, file, target }: Upload): Promise<void> {
    this.change(key, { step: "hashing" });
    const job = this.tools.digest(file, (hashed) => this.change(key, { hashed }));
    this.running.set(key, job);
    try {
      const digest = await job.result;
      if (this.get(key)?.step !== "hashing") return;
      this.change(key, { digest, hashed: file.size, step: imageBytesOf(file, target) === target.expectedBytes ? "queued" : "asking" });
    } catch (error) {
      if (this.get(key)?.step === "hashing") this.change(key, { step: "refused", problem: (error as Error).message });
    } finally {
      if (this.running.get(key) === job) this.running.delete(key);
      this.work();
    }
  }

  private async transmit({ key, sendKey, file, target, digest }: Upload): Promise<void> {
    this.change(key, { step: "sending" });
    const fields = { ...target.fields, sha256: digest?.sha256 ?? "" };
    const job = this.tools.send(target.chipId, file, fields, sendKey, (sent) => this.change(key, { sent }));
    this.running.set(key, job);
    try {
      const stored = await job.result;
      this.change(key, { step: "stored", sent: file.size, read: stored.reads[0] ?? null });
      const upload = this.get(key);
      if (upload) this.onStored(upload);
    } catch (error) {
      const answered = error instanceof Refusal && error.status >= 400 && error.status < 500;
      if (this.get(key)?.step === "sending") {
        this.change(key, { step: "refused", sendKey: answered ? this.tools.newKey() : sendKey, problem: error instanceof Refusal ? error.detail : String(error) });
      }
    } finally {
      if (this.running.get(key) === job) this.running.delete(key);
      this.work();
    }
  }
}

export const BROWSER_TOOLS: QueueTools = {
  digest: digestFile,
  send: sendFile,
  // randomUUID exists on https and localhost only
  newKey: () => crypto.randomUUID?.() ?? Array.from(crypto.getRandomValues(new Uint8Array(16)), (b) => b.toString(16).padStart(2, "0")).join(""),
};
