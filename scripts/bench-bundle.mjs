import { spawn, spawnSync } from "node:child_process";
import { randomBytes } from "node:crypto";
import { mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { localUrl } from "./start/app.mjs";
import { runningMark } from "./start/child.mjs";
import { openHouse } from "./start/house.mjs";
import { ensureBuilt } from "./start/install.mjs";
import { once } from "./start/once.mjs";
import { giveUp, Refusal, root, say } from "./start/say.mjs";
import { appVariables, loadSettings, tsArgs } from "./start/settings.mjs";

// `npm run bench:bundle`: a case with 40 reads of 8 MiB as a bundle: time as a ratio to `zip -0` of the same files in the
// same run, and the memory of the app's process while it streams. A data folder and ports of its own; the report goes to
// docs/bench-bundle.md.
const MIB = 1024 * 1024;
const READS = 40;
const PER_CHIP = 2;
const ROUNDS = 7;
const folder = path.join(root, ".data/bench-bundle");
const settings = await loadSettings({ ...process.env, TWINREAD_DATA: path.join(folder, "data"), DEMO: "1", PORT: process.env.E2E_PORT ?? "3220", DB_PORT: process.env.TEST_DB_PORT ?? "33456", MAIL_PORT: String(Number(process.env.TEST_DB_PORT ?? "33456") + 1), DATABASE_URL: "", DATABASE_ADMIN_URL: "" });
const house = openHouse(settings, () => {});
const base = localUrl(settings);

const median = (list) => [...list].sort((a, b) => a - b)[Math.floor(list.length / 2)];
const range = (list) => `${Math.min(...list).toFixed(2)} to ${Math.max(...list).toFixed(2)}`;
async function timed(work) {
  const from = performance.now();
  await work();
  return performance.now() - from;
}
const run = (command, args, options = {}) => new Promise((resolve, reject) => {
  const child = spawn(command, args, { stdio: ["ignore", "pipe", "inherit"], ...options });
  let out = "";
  child.stdout.on("data", (text) => (out += text));
  child.once("exit", (code) => (code === 0 ? resolve(out) : reject(new Error(`${command} ended with ${code}`))));
});

async function call(token, address, body) {
  const answer = await fetch(base + address, { method: "POST", headers: { authorization: `Bearer ${token}`, "content-type": "application/json" }, body: JSON.stringify(body) });
  if (!answer.ok) throw new Error(`${address}: ${answer.status} ${await answer.text()}`);
  return answer.json();
}

/** All images differ: nothing of the store is read for two of them at once. */
async function caseOf(token) {
  const made = await call(token, "/api/cases", { customer: { name: "Bench", email: "bench@alderlane.example" }, damage: "Measured" });
  const drive = await call(token, `/api/cases/${made.id}/drives`, { partNumber: "PN 0000-0001-A" });
  const board = await call(token, `/api/drives/${drive.id}/boards`, { role: "original", boardNumber: "BX 10-0001" });
  for (let i = 0; i < READS / PER_CHIP; i += 1) {
    const chip = await call(token, `/api/boards/${board.id}/chips`, { designator: `U${i + 1}`, bus: "spi", sizeBytes: 8 * MIB, supplyMillivolts: 3300 });
    const files = Array.from({ length: PER_CHIP }, (_, n) => path.join(folder, `image-${n}.bin`));
    const bytes = randomBytes(8 * MIB);
    for (const file of files) {
      bytes.writeUInt32LE(bytes.readUInt32LE(0) + 1, 0);
      writeFileSync(file, bytes);
    }
    await run("curl", ["-sf", "-o", "/dev/null", "-H", `Authorization: Bearer ${token}`, "-F", "stage=before", "-F", "seating=1", "-F", "reader=R1", ...files.flatMap((file) => ["-F", `file=@${file}`]), `${base}/api/chips/${chip.id}/reads`]);
  }
  return made.id;
}

const rss = (pid) => Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${pid}/status`, "utf8"))?.[1] ?? 0) / 1024;
const whole = path.join(folder, "bundle.zip");
const plain = path.join(folder, "plain.zip");
const bag = path.join(folder, "bag");
const firstByte = [];

async function bundle(token, caseId) {
  rmSync(whole, { force: true });
  firstByte.push(1000 * Number(await run("curl", ["-sf", "-X", "POST", "-o", whole, "-w", "%{time_starttransfer}", "-H", `Authorization: Bearer ${token}`, `${base}/api/cases/${caseId}/bundle`])));
}

async function zip() {
  rmSync(plain, { force: true });
  await run("zip", ["-0", "-q", "-r", plain, "."], { cwd: bag });
}

try {
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(bag, { recursive: true });
  await ensureBuilt();
  await house.prepareEmpty();
  await house.checkAppPort();
  await house.database();
  await house.migrate();
  await house.app({});
  const tokenFile = path.join(folder, "token");
  await once(process.execPath, tsArgs("scripts/bench/make-person.ts", [tokenFile, "lead"]), { env: appVariables(settings) });
  const token = readFileSync(tokenFile, "utf8").trim();
  const { pid } = runningMark(settings.dataDir, "app");
  const caseId = await caseOf(token);
  // once for the files that zip is to pack, and for the caches of both
  await bundle(token, caseId);
  await run("unzip", ["-q", whole, "-d", bag]);
  await zip();
  firstByte.length = 0;
  const [ratios, took, zipped, before, most] = [[], [], [], [], []];
  for (let round = 0; round < ROUNDS; round += 1) {
    before.push(rss(pid));
    let peak = 0;
    const watch = setInterval(() => (peak = Math.max(peak, rss(pid))), 10);
    took.push(await timed(() => bundle(token, caseId)));
    clearInterval(watch);
    most.push(peak);
    zipped.push(await timed(zip));
    ratios.push(took[round] / zipped[round]);
  }
  const bytes = statSync(whole).size;
  const files = readdirSync(bag, { recursive: true }).length;
  const checked = spawnSync("unzip", ["-tq", whole]).status === 0 && spawnSync("sh", [path.join(bag, readdirSync(bag)[0], "check.sh")]).status === 0;
  if (!checked) throw new Error("the bundle does not pass unzip -t and its own check");
  const report = `# Bundle benchmark

Made by \`npm run bench:bundle\`: production build, curl over loopback to a file, ${ROUNDS} rounds in one run, each followed by \`zip -0\` of the same
files (the unpacked bundle) on the same disk. A case with ${READS} reads of 8 MiB that all differ, ${Math.round(bytes / MIB)} MiB in ${files} files and folders. The last bundle
passed \`unzip -t\` and its own \`check.sh\`. ${os.cpus().length} cores; load average at the end ${os.loadavg()[0].toFixed(1)}.

| what | median | range |
|---|---|---|
| ratio to \`zip -0\` (aim: at most 2) | ${median(ratios).toFixed(2)} | ${range(ratios)} |
| bundle, s | ${(median(took) / 1000).toFixed(2)} | ${range(took.map((ms) => ms / 1000))} |
| of which until the first byte, s | ${(median(firstByte) / 1000).toFixed(2)} | ${range(firstByte.map((ms) => ms / 1000))} |
| \`zip -0\`, s | ${(median(zipped) / 1000).toFixed(2)} | ${range(zipped.map((ms) => ms / 1000))} |
| memory of the app's process before, MiB | ${median(before).toFixed(0)} | ${range(before)} |
| most while it streams, MiB | ${median(most).toFixed(0)} | ${range(most)} |
`;
  const text = path.join(root, "docs/bench-bundle.md");
  mkdirSync(path.dirname(text), { recursive: true });
  // what was found out by hand stays below the line
  const kept = (() => {
    try {
      return readFileSync(text, "utf8").split("\n## ").slice(1).map((part) => `\n## ${part}`).join("");
    } catch {
      return "";
    }
  })();
  writeFileSync(text, `${report}${kept}`);
  say(report);
} catch (error) {
  if (error instanceof Refusal) giveUp(error);
  throw error;
} finally {
  await house.stop();
  rmSync(folder, { recursive: true, force: true });
}
