import { spawn } from "node:child_process";
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import os from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { lockHolder, takeLock } from "@/scripts/start/lock.mjs";
import { checkPort } from "@/scripts/start/ports.mjs";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "twinread-lock-"));
});
afterEach(() => rmSync(folder, { recursive: true }));

const file = () => path.join(folder, "checkout.lock");
const sentence = ({ pid }: { pid: number }) => `in use by ${pid}`;
const holding = `import { takeLock } from ${JSON.stringify(path.resolve("scripts/start/lock.mjs"))};
  try { takeLock(process.argv[1], () => "refused"); console.log("taken"); setInterval(() => {}, 1000); } catch (error) { console.log(error.message); }`;

function hold(): Promise<{ said: string; pid: number; kill: () => Promise<void> }> {
  const child = spawn(process.execPath, ["--input-type=module", "-e", holding, file()]);
  return new Promise((done) => child.stdout.once("data", (said: Buffer) => done({
    said: String(said).trim(), pid: child.pid!, kill: () => new Promise((ended) => child.once("exit", () => ended()) && child.kill("SIGKILL")),
  })));
}

describe("the lock", () => {
  it("refuses a second copy and names the first", async () => {
    const first = await hold();
    expect(first.said).toBe("taken");
    expect(() => takeLock(file(), sentence)).toThrow(`in use by ${first.pid}`);
    await first.kill();
  });

  it("is taken over from a process that was killed", async () => {
    const first = await hold();
    await first.kill();
    expect(lockHolder(file())).toBeNull();
    const release = takeLock(file(), sentence);
    expect(lockHolder(file())).toMatchObject({ pid: process.pid });
    release();
    expect(readdirSync(folder)).toEqual([]);
  });

  it("is not fooled by another process that got the old one's number", () => {
    writeFileSync(file(), JSON.stringify({ pid: process.pid, ticks: "1" }));
    expect(lockHolder(file())).toBeNull();
  });

  it("goes to one of many that ask at the same moment", async () => {
    writeFileSync(file(), JSON.stringify({ pid: 2 ** 22 + 1, ticks: "1" }));
    const all = await Promise.all(Array.from({ length: 6 }, hold));
    expect(all.filter(({ said }) => said === "taken")).toHaveLength(1);
    await Promise.all(all.filter(({ said }) => said === "taken").map(({ kill }) => kill()));
  });
});

describe("a taken port", () => {
  it("is refused with the variable to set", async () => {
    const server = createServer();
    await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
    const address = server.address();
    const port = typeof address === "object" && address ? address.port : 0;
    await expect(checkPort("127.0.0.1", port, "DB_PORT", "the database")).rejects.toThrow(`Port ${port} on 127.0.0.1, wanted for the database, is taken by another program. Set DB_PORT`);
    await new Promise((done) => server.close(done));
    await expect(checkPort("127.0.0.1", port, "DB_PORT", "the database")).resolves.toBeUndefined();
  });
});
