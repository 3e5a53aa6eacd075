import { SNIFF_BYTES, sniffPhoto } from "@/lib/core/photo-kind";
import { MAX_PHOTO_BYTES } from "@/lib/limits";
import { type Problem, Refusal } from "@/lib/http/send";

export type PhotoStep = "waiting" | "sending" | "stored" | "refused" | "stopped";

export interface PhotoUpload {
  key: string;
  /** the Idempotency-Key: the same after a broken connection, a new one after an answer that refused */
  sendKey: string;
  file: File;
  caption: string;
  step: PhotoStep;
  sent: number;
  problem: string | null;
  /** sending the same file once more could end otherwise */
  again: boolean;
}

export interface Sending {
  done: Promise<void>;
  stop(): void;
}
export interface PhotoTools {
  send(file: File, caption: string, key: string, onProgress: (sent: number) => void): Sending;
  newKey(): string;
}

const AT_ONCE = 2;
const TOO_LARGE = "Larger than 20 MiB. Take the photo with a lower resolution, or send a smaller copy.";

/** Sends photos two at a time, one call a file, so that one refusal never holds up the others. Knows nothing of React. */
export class PhotoQueue {
  private list: readonly PhotoUpload[] = [];
  private running = new Map<string, Sending>();
  private listeners = new Set<() => void>();
  private onStored: () => void = () => undefined;

  constructor(private readonly tools: PhotoTools) {}

  tell(onStored: () => void): void {
    this.onStored = onStored;
  }
  subscribe = (listener: () => void) => {
    this.listeners.add(listener);
    return () => void this.listeners.delete(listener);
  };
  uploads = () => this.list;

  /** Looks at each file's first bytes before anything is sent: a phone learns at once that a HEIC is not taken. */
  async add(files: readonly File[], caption: string): Promise<void> {
    for (const file of files) {
      const key = this.tools.newKey();
      const refusal = file.size > MAX_PHOTO_BYTES ? TOO_LARGE : await refusalOf(file);
      this.set([...this.list, { key, sendKey: this.tools.newKey(), file, caption, step: refusal ? "refused" : "waiting", sent: 0, problem: refusal, again: false }]);
    }
    this.work();
  }

  again(key: string): void {
    this.change(key, { step: "waiting", problem: null, sent: 0 });
    this.work();
  }

  stop(key: string): void {
    this.running.get(key)?.stop();
    this.running.delete(key);
    this.change(key, { step: "stopped", problem: null, again: true });
    this.work();
  }

  remove(key: string): void {
    this.running.get(key)?.stop();
    this.running.delete(key);
    this.set(this.list.filter((one) => one.key !== key));
    this.work();
  }

  private set(list: readonly PhotoUpload[]): void {
    this.list = list;
    for (const listener of this.listeners) listener();
  }

  private change(key: string, changes: Partial<PhotoUpload>): void {
    this.set(this.list.map((one) => (one.key === key ? { ...one, ...changes } : one)));
  }

  private work(): void {
    const free = AT_ONCE - this.list.filter((one) => one.step === "sending").length;
    for (const one of this.list.filter(({ step }) => step === "waiting").slice(0, Math.max(0, free))) void this.transmit(one);
  }

  private async transmit({ key, sendKey, file, caption }: PhotoUpload): Promise<void> {
    this.change(key, { step: "sending" });
    const job = this.tools.send(file, caption, sendKey, (sent) => this.change(key, { sent }));
    this.running.set(key, job);
    try {
      await job.done;
      this.change(key, { step: "stored", sent: file.size });
      this.onStored();
    } catch (error) {
      const still = this.list.find((one) => one.key === key)?.step === "sending";
      const problem = error instanceof Refusal ? error.detail : "The photo could not be sent. Send it again.";
      const status = error instanceof Refusal ? error.status : 0;
      // a file of the wrong kind stays of the wrong kind; everything else may pass
      const final = status === 413 || status === 415 || status === 422 || status === 403;
      if (still) this.change(key, { step: "refused", problem, again: !final, sendKey: status >= 400 ? this.tools.newKey() : sendKey });
    } finally {
      if (this.running.get(key) === job) this.running.delete(key);
      this.work();
    }
  }
}

async function refusalOf(file: File): Promise<string | null> {
  try {
    const sniffed = sniffPhoto(new Uint8Array(await file.slice(0, SNIFF_BYTES).arrayBuffer()));
    return "refused" in sniffed ? sniffed.refused : null;
  } catch {
    return "The browser can't read this file. Choose it again.";
  }
}

const BROKEN: Problem = { status: 0, title: "The connection broke", detail: "The connection broke off before the answer came. Send the photo again; if it was stored after all, it is not stored twice." };

/** One file, one call. XMLHttpRequest, because fetch tells nothing of how far an upload has come. */
export const browserTools = (path: string): PhotoTools => ({
  // randomUUID exists on https and localhost only
  newKey: () => crypto.randomUUID?.() ?? Array.from(crypto.getRandomValues(new Uint8Array(16)), (b) => b.toString(16).padStart(2, "0")).join(""),
  send: (file, caption, key, onProgress) => {
    const request = new XMLHttpRequest();
    const done = new Promise<void>((resolve, reject) => {
      const body = new FormData();
      body.append("caption", caption);
      body.append("file", file, file.name);
      request.open("POST", path);
      request.setRequestHeader("idempotency-key", key);
      request.responseType = "json";
      request.upload.addEventListener("progress", (event) => onProgress(Math.min(event.loaded, file.size)));
      request.addEventListener("load", () => {
        if (request.status === 201 || request.status === 200) return resolve();
        const answer = request.response as Partial<Problem> | null;
        reject(new Refusal({ status: request.status, title: answer?.title ?? "Something went wrong", detail: answer?.detail ?? "The server gave no reason. Send the photo again; if it stays, tell whoever runs Twinread." }));
      });
      request.addEventListener("error", () => reject(new Refusal(BROKEN)));
      request.addEventListener("abort", () => reject(new Refusal(BROKEN)));
      request.send(body);
    });
    return { done, stop: () => request.abort() };
  },
});
