import { type ChildProcess, execFile, spawn } from "node:child_process";
import { createServer, type AddressInfo } from "node:net";
import path from "node:path";

const ROOT = path.resolve(import.meta.dirname, "../../..");

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.on("error", reject);
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address() as AddressInfo;
      server.close(() => resolve(port));
    });
  });
}

/** Another run of the app on the same database and data folder, which a test may end as a power cut would. */
export class SecondServer {
  private child: ChildProcess | null = null;
  private said = "";
  base = "";

  /** Starts it unless it runs. */
  async start(): Promise<void> {
    if (this.child) return;
    const port = await freePort();
    this.base = `http://127.0.0.1:${port}`;
    this.said = "";
    // a group of its own: what the app starts goes with it
    const child = spawn(process.execPath, ["node_modules/next/dist/bin/next", "start", "-H", "127.0.0.1", "-p", String(port)], {
      cwd: ROOT, detached: true, stdio: ["ignore", "pipe", "pipe"], env: { ...process.env, PORT: String(port), DATABASE_ADMIN_URL: "", NODE_ENV: "production" },
    });
    this.child = child;
    for (const stream of [child.stdout, child.stderr]) stream!.on("data", (text: Buffer) => (this.said += text.toString("utf8")));
    const until = Date.now() + 30_000;
    while (Date.now() < until && child.exitCode === null && child.signalCode === null) {
      const ok = await fetch(`${this.base}/api/health`).then((answer) => answer.ok, () => false);
      if (ok) return;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    throw new Error(`The second server did not start:\n${this.said}`);
  }

  /** kill -9, of all its processes. */
  kill(): Promise<void> {
    const child = this.child;
    this.child = null;
    if (!child?.pid || child.exitCode !== null || child.signalCode !== null) return Promise.resolve();
    return new Promise((resolve) => {
      child.once("exit", () => resolve());
      process.kill(-child.pid!, "SIGKILL");
    });
  }
}

export interface StoreCheck {
  code: number;
  clean: boolean;
  damage: { place: string; seq: number | null; problem: string; sentence: string; sha256: string | null; reads: string[] }[];
  notChecked: string[];
  /** the page for people */
  page: string;
}

const script = (args: string[]): Promise<{ code: number; out: string }> => new Promise((resolve) => {
  execFile(process.execPath, ["--conditions=react-server", "--import", "tsx", "scripts/check-store.ts", ...args], { cwd: ROOT, maxBuffer: 64 * 1024 * 1024 }, (error, out) => {
    resolve({ code: error ? Number(error.code ?? -1) : 0, out });
  });
});

/** `npm run check:store`, as JSON and as the page for people. */
export async function checkStore({ withPage = false } = {}): Promise<StoreCheck> {
  const { code, out } = await script(["--json"]);
  return { code, ...(JSON.parse(out) as Omit<StoreCheck, "code" | "page">), page: withPage ? (await script([])).out : "" };
}
