import type { Progress } from "@/lib/core/verify/verify-bundle";
import type { CheckAnswer, CheckRequest } from "./verify.worker";

export type Checked = Exclude<CheckAnswer, { kind: "ready" } | { kind: "progress" }>;

const NO_WORKER = "This browser could not start the check. Reload the page and choose the file again, or take check.sh inside the bundle.";

/** One worker, loaded with the page: once it is there the check needs no network at all. Stopping ends it and starts another. */
export class Checker {
  private worker: Worker | null = null;
  private ready: Promise<Worker> | null = null;
  private running: ((checked: Checked | null) => void) | null = null;

  constructor(private readonly onReady: (ready: boolean) => void, private readonly onProgress: (progress: Progress) => void) {}

  /** Loads the worker; called when the page shows. */
  load(): Promise<Worker> {
    return (this.ready ??= new Promise((resolve) => {
      const worker = new Worker(new URL("./verify.worker.ts", import.meta.url), { type: "module" });
      this.worker = worker;
      worker.addEventListener("message", (event: MessageEvent<CheckAnswer>) => {
        const said = event.data;
        if (said.kind === "ready") {
          this.onReady(true);
          resolve(worker);
        } else if (said.kind === "progress") this.onProgress(said.progress);
        else this.end(said);
      });
      worker.addEventListener("error", () => {
        this.end({ kind: "refused", sentence: NO_WORKER });
        this.close();
      });
    }));
  }

  /** Null when it was stopped. */
  check(request: CheckRequest): Promise<Checked | null> {
    this.end(null);
    return new Promise((resolve) => {
      this.running = resolve;
      void this.load().then((worker) => worker.postMessage(request));
    });
  }

  stop(): void {
    this.close();
    this.end(null);
    void this.load();
  }

  close(): void {
    this.worker?.terminate();
    this.worker = null;
    this.ready = null;
    this.onReady(false);
  }

  private end(checked: Checked | null): void {
    const running = this.running;
    this.running = null;
    running?.(checked);
  }
}
