import { spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { runningMark } from "./start/child.mjs";
import { openHouse } from "./start/house.mjs";
import { localUrl } from "./start/app.mjs";
import { ensureBuilt } from "./start/install.mjs";
import { once } from "./start/once.mjs";
import { giveUp, Refusal, root, say } from "./start/say.mjs";
import { appVariables, loadSettings, tsArgs } from "./start/settings.mjs";

// `npm run bench:upload`: how fast reads are taken in, as a ratio to sha256sum of the same bytes in the same run, and how
// much memory the server takes meanwhile. A data folder and ports of its own; the report goes to docs/bench-upload.md.
const MIB = 1024 * 1024;
const ROUNDS = 5;
const folder = path.join(root, ".data/bench");
const settings = await loadSettings({ ...process.env, TWINREAD_DATA: path.join(folder, "data"), DEMO: "1", PORT: process.env.E2E_PORT ?? "3220", DB_PORT: "33456", MAIL_PORT: "33457", DATABASE_URL: "", DATABASE_ADMIN_URL: "" });
const house = openHouse(settings, () => {});
const base = localUrl(settings);

const median = (list) => [...list].sort((a, b) => a - b)[Math.floor(list.length / 2)];
async function timed(work) {
  const from = performance.now();
  await work();
  return performance.now() - from;
}
const run = (command, args) => new Promise((resolve, reject) => spawn(command, args, { stdio: "ignore" }).once("exit", (code) => (code === 0 ? resolve() : reject(new Error(`${command} ended with ${code}`)))));

async function call(token, address, body) {
  const answer = await fetch(base + address, { method: "POST", headers: { authorization: `Bearer ${token}`, "content-type": "application/json" }, body: JSON.stringify(body) });
  if (!answer.ok) throw new Error(`${address}: ${answer.status} ${await answer.text()}`);
  return answer.json();
}

async function chipOf(token, sizeBytes) {
  const made = await call(token, "/api/cases", { customer: { name: "Bench", email: "bench@alderlane.example" }, damage: "Measured" });
  const drive = await call(token, `/api/cases/${made.id}/drives`, { partNumber: "PN 0000-0001-A" });
  const board = await call(token, `/api/drives/${drive.id}/boards`, { role: "original", boardNumber: "BX 10-0001" });
  return (await call(token, `/api/boards/${board.id}/chips`, { designator: "U1", bus: "spi", sizeBytes, supplyMillivolts: 3300 })).id;
}

let made = 0;
function newFile(sizeBytes) {
  const file = path.join(folder, `image-${(made += 1)}.bin`);
  writeFileSync(file, randomBytes(sizeBytes));
  return file;
}

/** Sent by curl, as a bench station does. */
const upload = (token, chip, files) => run("curl", ["-sf", "-o", "/dev/null", "-H", `Authorization: Bearer ${token}`, "-F", "stage=before", "-F", "seating=1", "-F", "reader=R1", ...files.flatMap((file) => ["-F", `file=@${file}`]), `${base}/api/chips/${chip}/reads`]);

const memoryOf = (pid, field) => Number(new RegExp(`${field}:\\s+(\\d+)`).exec(readFileSync(`/proc/${pid}/status`, "utf8"))?.[1] ?? 0) / 1024;

/** Ratio of taking the files in (stored, judged, answered) to sha256sum of them, median of several rounds. */
async function ratio(token, sizeBytes, count) {
  const ratios = [];
  const speeds = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    const chip = await chipOf(token, sizeBytes);
    const files = Array.from({ length: count }, () => newFile(sizeBytes));
    await run("sha256sum", files);
    const sum = await timed(() => run("sha256sum", files));
    const took = await timed(() => upload(token, chip, files));
    ratios.push(took / sum);
    speeds.push((sizeBytes * count) / MIB / (took / 1000));
  }
  return { ratio: median(ratios), speed: median(speeds) };
}

async function eightAtOnce(token, pid) {
  const chips = [];
  for (let i = 0; i < 8; i += 1) chips.push(await chipOf(token, 64 * MIB));
  const files = chips.map(() => newFile(64 * MIB));
  let peak = 0;
  const watch = setInterval(() => (peak = Math.max(peak, memoryOf(pid, "VmRSS"))), 20);
  const waits = [];
  const ask = setInterval(async () => {
    const from = performance.now();
    await fetch(`${base}/api/cases?pageSize=5`, { headers: { authorization: `Bearer ${token}` } }).then((r) => r.arrayBuffer());
    waits.push(performance.now() - from);
  }, 100);
  const before = memoryOf(pid, "VmRSS");
  const took = await timed(() => Promise.all(chips.map((chip, i) => upload(token, chip, [files[i]]))));
  clearInterval(watch);
  clearInterval(ask);
  waits.sort((a, b) => a - b);
  return { before, peak, took, p50: waits[Math.floor(waits.length / 2)], p99: waits[Math.floor(waits.length * 0.99)] };
}

try {
  mkdirSync(folder, { recursive: true });
  await ensureBuilt();
  await house.prepareEmpty();
  await house.checkAppPort();
  await house.database();
  await house.migrate();
  await house.app({});
  const tokenFile = path.join(folder, "token");
  await once(process.execPath, tsArgs("scripts/bench/make-person.ts", [tokenFile]), { env: appVariables(settings) });
  const token = readFileSync(tokenFile, "utf8").trim();
  const pid = runningMark(settings.dataDir, "app").pid;
  await ratio(token, MIB, 1);
  const one = await ratio(token, 64 * MIB, 1);
  const three = await ratio(token, 8 * MIB, 3);
  const eight = await eightAtOnce(token, pid);
  const report = `# Upload benchmark

Made by \`npm run bench:upload\`: production build, curl over loopback, median of ${ROUNDS} rounds in one run. "Taken in" means
sent, hashed twice (SHA-256 and CRC-32), written and synced to disk, inspected, compared, judged, entered in the log, answered.

| what | ratio to \`sha256sum\` of the same files | speed |
|---|---|---|
| one read of 64 MiB | ${one.ratio.toFixed(2)} | ${one.speed.toFixed(0)} MiB/s |
| one call with three different reads of 8 MiB | ${three.ratio.toFixed(2)} | ${three.speed.toFixed(0)} MiB/s |

Eight uploads of 64 MiB at once: all taken in after ${(eight.took / 1000).toFixed(1)} s; the server's memory rose from ${eight.before.toFixed(0)} MiB to at most
${eight.peak.toFixed(0)} MiB (aim: under 400). The case list asked for meanwhile answered after ${eight.p50.toFixed(0)} ms (median), ${eight.p99.toFixed(0)} ms (99th percentile).
`;
  mkdirSync(path.join(root, "docs"), { recursive: true });
  writeFileSync(path.join(root, "docs/bench-upload.md"), report);
  say(report);
} catch (error) {
  if (error instanceof Refusal) giveUp(error);
  throw error;
} finally {
  await house.stop();
}
